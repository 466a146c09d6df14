import { useState } from 'react';
import { v7 } from 'uuid';
import { Banner } from '@/components/ui/Banner';
import { Button } from '@/components/ui/Button';
import { Sheet } from '@/components/ui/Sheet';
import { TextField, type TextFieldProps } from '@/components/ui/TextField';
import type { DeskChange } from '@/shared/schema/api';
import type { VerdictOf } from '@/shared/sync/protocol';
import { whySentence } from '@/shared/sync/whySentence';
import { problemOf } from './problemOf';

export type NewField = {
  name: string;
  label: string;
  hint?: string;
  kind?: TextFieldProps['kind'];
  unit?: string;
  start?: string;
  isMultiline?: boolean;
  /** what is wrong with a text, in a sentence; null when nothing is */
  check: (text: string) => string | null;
};

/** Ids for a record and for up to two that come with it. */
export type NewIds = [own: string, second: string, third: string];

type Props = {
  title: string;
  actionTitle: string;
  fields: NewField[];
  /** the changes that make it, for ids that stay the same however often they are sent; the first is the record's own */
  changesFor: (ids: NewIds, texts: Record<string, string>) => DeskChange[];
  send: (changes: DeskChange[]) => Promise<{ verdicts: VerdictOf[] }>;
  onMade: (rid: string) => void;
  onClose: () => void;
};

/** A small form for something that the shop does not know yet. */
export function NewRecordSheet({ title, actionTitle, fields, changesFor, send, onMade, onClose }: Props) {
  const [ids] = useState<NewIds>(() => [v7(), v7(), v7()]);
  const [texts, setTexts] = useState<Record<string, string>>(() =>
    Object.fromEntries(fields.map((field) => [field.name, field.start ?? ''])),
  );
  const [isChecked, setIsChecked] = useState(false);
  const [isBusy, setIsBusy] = useState(false);
  const [refusal, setRefusal] = useState<string | null>(null);
  const problems = fields.map((field) => field.check(texts[field.name] ?? ''));

  const submit = async () => {
    setIsChecked(true);
    setRefusal(null);
    if (isBusy || problems.some((problem) => problem !== null)) return;
    setIsBusy(true);
    try {
      const { verdicts } = await send(changesFor(ids, trimmed(texts)));
      const refused = verdicts.find((verdict) => verdict.verdict !== 'applied');
      if (refused) {
        const why = refused.why ? whySentence(refused.why) : 'The shop could not take it.';
        setRefusal(refused.detail ? `${why} ${refused.detail}` : why);
      } else onMade(ids[0]);
    } catch (error) {
      setRefusal(problemOf(error).sentence);
    } finally {
      setIsBusy(false);
    }
  };

  return (
    <Sheet title={title} onClose={onClose} closeTitle="Not now">
      {refusal ? <Banner kind="refusal" sentence={refusal} /> : null}
      {fields.map((field, at) => (
        <TextField
          key={field.name}
          label={field.label}
          {...(field.hint ? { hint: field.hint } : {})}
          {...(field.kind ? { kind: field.kind } : {})}
          {...(field.unit ? { unit: field.unit } : {})}
          isMultiline={field.isMultiline ?? false}
          value={texts[field.name] ?? ''}
          onChange={(text) => setTexts((before) => ({ ...before, [field.name]: text }))}
          problem={isChecked ? (problems[at] ?? null) : null}
          {...(field.isMultiline ? {} : { onSubmit: () => void submit() })}
          isFocusedFirst={at === 0}
        />
      ))}
      <Button title={actionTitle} kind="primary" isWide isBusy={isBusy} onPress={() => void submit()} />
    </Sheet>
  );
}

const trimmed = (texts: Record<string, string>) =>
  Object.fromEntries(Object.entries(texts).map(([name, text]) => [name, text.trim()]));
