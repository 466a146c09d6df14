import { useState } from 'react';
import { AppText } from '@/components/ui/AppText';
import { Banner } from '@/components/ui/Banner';
import { Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { Sheet } from '@/components/ui/Sheet';
import type { Direction, Side } from '@/shared/schema/primitives';
import type { SessionView } from '@/shared/schema/views';
import { proposeRun, type RunProposal } from '@/shared/session/nextPort';

/** Which port comes next, how the air goes and how many valves are open: proposed, to be changed where it is not so. */
export function BenchNewRun({
  view,
  start,
  isBusy,
  problem,
  onStart,
  onClose,
}: {
  view: SessionView;
  start: RunProposal;
  isBusy: boolean;
  problem: string | null;
  onStart: (run: RunProposal) => void;
  onClose: () => void;
}) {
  const [run, setRun] = useState(start);
  const { head } = view;
  const sides = (['intake', 'exhaust'] as const).filter((side) =>
    head.ports.some((name) => name.side === side),
  );
  const portsOf = (side: Side) => head.ports.filter((name) => name.side === side).map((name) => name.port);
  const valveCount = run.side === 'intake' ? head.intakeValveCount : head.exhaustValveCount;
  const changeSide = (side: Side) => {
    const port = portsOf(side)[0];
    if (side !== run.side && port !== undefined) setRun(proposeRun(view, { side, port }));
  };
  const alreadyRun = view.runs.filter((each) => each.run.side === run.side && each.run.port === run.port);
  return (
    <Sheet title="New run" isFullScreen closeTitle="Not now" onClose={onClose}>
      {sides.length > 1 ? (
        <Choice<Side>
          label="Side"
          layout="row"
          options={[
            { value: 'intake', title: 'Intake' },
            { value: 'exhaust', title: 'Exhaust' },
          ]}
          value={run.side}
          onChange={changeSide}
        />
      ) : null}
      <Choice
        label="Port"
        layout={portsOf(run.side).length <= 4 ? 'row' : 'list'}
        options={portsOf(run.side).map((port) => ({ value: port, title: port }))}
        value={run.port}
        onChange={(port) => setRun({ ...run, port })}
      />
      {alreadyRun.length > 0 ? (
        <AppText color="quietInk">{`This port has ${alreadyRun.length === 1 ? 'a run' : `${alreadyRun.length} runs`} already; the new one stands beside.`}</AppText>
      ) : null}
      <Choice<Direction>
        label="Direction of the air"
        layout="row"
        options={[
          { value: 'drawing', title: 'Drawing' },
          { value: 'blowing', title: 'Blowing' },
        ]}
        value={run.direction}
        onChange={(direction) => setRun({ ...run, direction })}
      />
      {valveCount > 1 ? (
        <Choice
          label="Valves open"
          layout="row"
          options={Array.from({ length: valveCount }, (_, at) => ({
            value: String(at + 1),
            title: String(at + 1),
          }))}
          value={String(run.valvesOpenCount)}
          onChange={(count) => setRun({ ...run, valvesOpenCount: Number(count) })}
        />
      ) : null}
      {problem ? <Banner kind="refusal" sentence={problem} /> : null}
      <Button
        title={`Start ${run.side} ${run.port}`}
        kind="primary"
        isWide
        isBusy={isBusy}
        onPress={() => onStart(run)}
      />
    </Sheet>
  );
}
