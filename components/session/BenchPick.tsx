import { useState } from 'react';
import { AppText } from '@/components/ui/AppText';
import { Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { Stack } from '@/components/ui/Layout';
import { TextField } from '@/components/ui/TextField';

const shownAtMost = 6;

/** One of what the shop knows, or a new one. Once chosen only the choice stands there; a long list is narrowed by letters. */
export function BenchPick({
  label,
  items,
  value,
  newTitle,
  problem,
  onChange,
}: {
  label: string;
  items: { id: string; title: string; detail?: string }[];
  /** an id, "new", or null */
  value: string | null;
  newTitle: string;
  problem?: string;
  onChange: (value: string | null) => void;
}) {
  const [letters, setLetters] = useState('');
  const chosen = items.find((item) => item.id === value);
  if (chosen || value === 'new')
    return (
      <Stack gap="s">
        <Choice
          label={label}
          options={[
            chosen
              ? { value: chosen.id, title: chosen.title, ...(chosen.detail ? { detail: chosen.detail } : {}) }
              : { value: 'new', title: newTitle },
          ]}
          value={value}
          onChange={() => undefined}
          problem={problem ?? null}
        />
        {items.length > 0 ? (
          <Button title="Change" label={`Change the ${label.toLowerCase()}`} onPress={() => onChange(null)} />
        ) : null}
      </Stack>
    );
  const fitting = items.filter((item) =>
    `${item.title} ${item.detail ?? ''}`.toLowerCase().includes(letters.trim().toLowerCase()),
  );
  const shown = fitting.slice(0, shownAtMost);
  return (
    <Stack gap="s">
      {items.length > shownAtMost ? (
        <TextField label={`Find the ${label.toLowerCase()}`} value={letters} onChange={setLetters} />
      ) : null}
      <Choice
        label={label}
        options={[
          ...shown.map(({ id, title, detail }) => ({ value: id, title, ...(detail ? { detail } : {}) })),
          { value: 'new', title: newTitle },
        ]}
        value={null}
        onChange={onChange}
        problem={problem ?? null}
      />
      {fitting.length > shown.length ? (
        <AppText color="quietInk">{`${fitting.length - shown.length} more: type a few letters.`}</AppText>
      ) : null}
    </Stack>
  );
}
