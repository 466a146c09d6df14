import { useState } from 'react';
import { AppText } from '@/components/ui/AppText';
import { Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { Stack } from '@/components/ui/Layout';
import { TextField } from '@/components/ui/TextField';

type Item = { id: string; title: string; detail?: string };
type Props = {
  label: string;
  items: Item[];
  value: string | null;
  onChange: (id: string) => void;
  problem: string | null;
  /** null when this person may not add one */
  addTitle: string | null;
  onAdd: () => void;
};

const shownAtMost = 8;

/** One of what the shop knows, or a new one. A long list is narrowed by words; what is chosen always shows. */
export function PickList({ label, items, value, onChange, problem, addTitle, onAdd }: Props) {
  const [words, setWords] = useState('');
  const fitting = items.filter(
    (item) =>
      item.id === value ||
      `${item.title} ${item.detail ?? ''}`.toLowerCase().includes(words.trim().toLowerCase()),
  );
  const chosenFirst = [...fitting].sort((a, b) => Number(b.id === value) - Number(a.id === value));
  const shown = items.length > shownAtMost ? chosenFirst.slice(0, shownAtMost) : items;
  const hiddenCount = items.length > shownAtMost ? fitting.length - shown.length : 0;
  return (
    <Stack gap="s">
      {items.length > shownAtMost ? (
        <TextField label={`Find a ${label.toLowerCase()}`} value={words} onChange={setWords} />
      ) : null}
      {shown.length > 0 ? (
        <Choice
          label={label}
          value={value}
          onChange={onChange}
          options={shown.map(({ id, title, detail }) => ({
            value: id,
            title,
            ...(detail ? { detail } : {}),
          }))}
          problem={problem}
        />
      ) : (
        <AppText color="quietInk">
          {nothingThere(label.toLowerCase(), items.length > 0, addTitle !== null)}
        </AppText>
      )}
      {hiddenCount > 0 ? (
        <AppText
          variant="small"
          color="quietInk"
        >{`${hiddenCount} more; write a few letters to find them.`}</AppText>
      ) : null}
      {addTitle ? <Button title={addTitle} icon="add" onPress={onAdd} /> : null}
    </Stack>
  );
}

function nothingThere(what: string, areThereAny: boolean, mayAdd: boolean): string {
  if (areThereAny) return `No ${what} fits these letters.`;
  return mayAdd ? `No ${what} yet.` : `No ${what} yet. Somebody who keys at the bench can add one.`;
}
