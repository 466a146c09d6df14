import { useState } from 'react';
import { localTime } from '@/components/session/localTime';
import { AppText } from '@/components/ui/AppText';
import { Banner } from '@/components/ui/Banner';
import { Button } from '@/components/ui/Button';
import { Card, Row, Stack } from '@/components/ui/Layout';
import { Progress } from '@/components/ui/States';
import { sendingSentence, type DeviceStanding } from './statusFacts';

export type UnsentLine = {
  id: string;
  what: string;
  when: string;
  tryCount: number;
  lastTryAt: string | null;
  lastAnswer: string | null;
  verdict: 'dispute' | 'held' | 'rejected' | null;
  whySentence: string | null;
  detail: string | null;
};

export type UnsentListProps = {
  sync: DeviceStanding & { progress?: { done: number; total: number } };
  lines: UnsentLine[];
  onSendNow: () => Promise<void>;
  /** resolves false when the file could not be made */
  onKeepCopy: () => Promise<boolean>;
  onEnrolAgain: () => void;
};

const verdictWords = { dispute: 'In dispute', held: 'Held', rejected: 'Set aside' } as const;

/** Where everything keyed on this device is: what waits, what needs a person, and the way out as a file. */
export function UnsentList({ sync, lines, onSendNow, onKeepCopy, onEnrolAgain }: UnsentListProps) {
  const [copy, setCopy] = useState<'no' | 'made' | 'failed'>('no');
  const needsPerson = lines.filter((line) => line.verdict !== null);
  const waiting = lines.filter((line) => line.verdict === null);
  // what is the same for all of them is said once, above
  const answers = new Set(waiting.map((line) => line.lastAnswer));
  const sharedAnswer = answers.size === 1 ? (waiting[0]?.lastAnswer ?? null) : null;
  return (
    <Stack gap="l">
      <Stack gap="s">
        <AppText isLive>{sendingSentence(sync)}</AppText>
        {sync.state === 'sending' && sync.progress ? (
          <Progress label="Sent" done={sync.progress.done} total={sync.progress.total} />
        ) : null}
        {sync.lastSentAt ? (
          <AppText variant="small" color="quietInk">{`Last sent ${localTime(sync.lastSentAt)}.`}</AppText>
        ) : null}
      </Stack>
      <Row gap="m">
        <Button
          title="Send now"
          kind="primary"
          icon="up"
          isBusy={sync.state === 'sending'}
          onPress={() => void onSendNow()}
        />
        <Button
          title="Keep a copy as a file"
          icon="down"
          onPress={() => void onKeepCopy().then((isMade) => setCopy(isMade ? 'made' : 'failed'))}
        />
        {sync.state === 'enrolAgain' || sync.state === 'revoked' ? (
          <Button title="Enrol this device again" icon="door" onPress={onEnrolAgain} />
        ) : null}
      </Row>
      {copy === 'made' ? (
        <Banner
          kind="done"
          sentence="The file with everything that is not sent is in the browser’s downloads. What is on the device stays there."
        />
      ) : null}
      {copy === 'failed' ? (
        <Banner
          kind="refusal"
          sentence="The file could not be made. Everything is still on this device. Free some space and try again."
        />
      ) : null}
      {needsPerson.length > 0 ? (
        <LineList
          title={needsPerson.length === 1 ? '1 needs a person' : `${needsPerson.length} need a person`}
          lines={needsPerson}
        />
      ) : null}
      {waiting.length > 0 ? (
        <LineList
          title={`${sync.unsentCount} waiting to be sent`}
          lines={waiting.map((line) => (sharedAnswer ? { ...line, lastAnswer: null } : line))}
          note={sharedAnswer ? `Last answer: ${sharedAnswer}` : undefined}
          moreCount={sync.unsentCount - waiting.length}
        />
      ) : (
        <AppText color="quietInk">Nothing waits to be sent.</AppText>
      )}
    </Stack>
  );
}

function LineList({
  title,
  lines,
  note,
  moreCount = 0,
}: {
  title: string;
  lines: UnsentLine[];
  /** said of all of them */
  note?: string;
  moreCount?: number;
}) {
  return (
    <Stack gap="s">
      <AppText variant="heading" level={2}>
        {title}
      </AppText>
      {note ? <AppText color="quietInk">{note}</AppText> : null}
      <Card label={title} gap="l">
        {lines.map((line) => (
          <UnsentEntry key={line.id} line={line} />
        ))}
        {moreCount > 0 ? <AppText color="quietInk">{`and ${moreCount} more`}</AppText> : null}
      </Card>
    </Stack>
  );
}

function UnsentEntry({ line }: { line: UnsentLine }) {
  const tries =
    line.tryCount === 0
      ? 'not tried yet'
      : line.tryCount === 1
        ? 'tried once'
        : `tried ${line.tryCount} times`;
  const lastTry = line.lastTryAt ? `, last ${localTime(line.lastTryAt)}` : '';
  const answer = line.whySentence ?? line.lastAnswer;
  return (
    <Stack gap="xs">
      <AppText weight="600">
        {line.verdict ? (
          <AppText weight="800" color={line.verdict === 'held' ? 'brass' : 'redOxide'}>
            {`${verdictWords[line.verdict]}. `}
          </AppText>
        ) : null}
        {line.what}
      </AppText>
      <AppText variant="small" color="quietInk">{`${localTime(line.when)}; ${tries}${lastTry}`}</AppText>
      {answer ? (
        <AppText variant="small">{line.detail ? `${answer} (${line.detail})` : answer}</AppText>
      ) : null}
    </Stack>
  );
}
