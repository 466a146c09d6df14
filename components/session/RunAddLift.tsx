import { useState } from 'react';
import { Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { Sheet } from '@/components/ui/Sheet';
import { TextField } from '@/components/ui/TextField';
import { KeyedText, type LiftUnit } from '@/shared/schema/primitives';
import type { RunView } from '@/shared/schema/views';
import { readNumber } from '@/shared/units/quantity';

/** A lift that was not planned: it takes its place on the column and is keyed next. */
export function RunAddLift({
  run,
  unit: startUnit,
  onAdd,
  onGoToRung,
  onClose,
}: {
  run: RunView;
  unit: LiftUnit;
  onAdd: (text: string, unit: LiftUnit) => void;
  /** the lift is on the column already */
  onGoToRung: (rungId: string) => void;
  onClose: () => void;
}) {
  const [text, setText] = useState('');
  const [unit, setUnit] = useState(startUnit);
  const [problem, setProblem] = useState<string | null>(null);
  const add = () => {
    const typed = text.trim();
    if (typed === '') return setProblem('Key the lift.');
    if (!KeyedText.safeParse(typed).success)
      return setProblem(`“${typed}” is not one number: digits with at most one decimal mark.`);
    if (readNumber(typed) === 0) return setProblem('A lift must be above zero.');
    const same = run.rungs.find(
      (rung) => rung.liftUnit === unit && readNumber(rung.liftText) === readNumber(typed),
    );
    if (same) onGoToRung(same.id);
    else onAdd(typed, unit);
  };
  return (
    <Sheet title="Add a lift" isFullScreen closeTitle="Back to the pad" onClose={onClose}>
      <TextField
        label="Lift"
        kind="decimal"
        unit={unit}
        value={text}
        onChange={setText}
        problem={problem}
        maxLength={12}
        isFocusedFirst
        onSubmit={add}
      />
      <Choice<LiftUnit>
        label="Unit"
        layout="row"
        options={[
          { value: 'in', title: 'in' },
          { value: 'mm', title: 'mm' },
          { value: 'L/D', title: 'L/D' },
        ]}
        value={unit}
        onChange={setUnit}
      />
      <Button title="Key this lift" kind="primary" isWide onPress={add} />
    </Sheet>
  );
}
