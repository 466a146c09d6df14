import { useState } from 'react';
import { unitLabel } from '@/components/capture/captureProps';
import { AppText } from '@/components/ui/AppText';
import { Banner } from '@/components/ui/Banner';
import { Button } from '@/components/ui/Button';
import { Row, Stack } from '@/components/ui/Layout';
import { ConfirmSheet } from '@/components/ui/Sheet';
import { EmptyState } from '@/components/ui/States';
import type { SessionView } from '@/shared/schema/views';
import { nextPort, proposeRun, type RunProposal } from '@/shared/session/nextPort';
import { BenchNewRun } from './BenchNewRun';
import { BenchRunLine } from './BenchRunLine';
import { StateWord } from './StateWord';
import { stateWord } from './words';

export type BenchSessionProps = {
  view: SessionView;
  runHref: (runId: string) => string;
  onOpenRun: (runId: string) => void;
  /** resolves with a sentence when it did not work */
  onStartRun: (run: RunProposal) => Promise<string | null>;
  onHandIn: () => Promise<string | null>;
};

/** A session at the bench: its runs, the next one, and handing it in. */
export function BenchSession({ view, runHref, onOpenRun, onStartRun, onHandIn }: BenchSessionProps) {
  const { session, bench } = view;
  const [panel, setPanel] = useState<'newRun' | 'handIn' | null>(null);
  const [isBusy, setIsBusy] = useState(false);
  const [problem, setProblem] = useState<string | null>(null);
  const readings = view.runs.flatMap((run) => run.readings);
  const notSentCount = readings.filter((reading) => reading.mark !== 'sent').length;
  const isKeyable = session.state === 'open' || session.state === 'returned';
  const port = nextPort(view);
  const { settings } = session;
  const standard = `${settings.standardPressureText} ${unitLabel(settings.standardPressureUnit)}`;

  const work = async (act: () => Promise<string | null>) => {
    setIsBusy(true);
    setProblem(null);
    const sentence = await act();
    setIsBusy(false);
    setProblem(sentence);
    if (sentence === null) setPanel(null);
  };

  return (
    <Stack gap="l">
      <Stack gap="xs">
        <Row gap="m">
          <StateWord word={stateWord({ state: session.state, readingCount: readings.length })} />
          <AppText color="quietInk">{`${bench.name}, at ${standard}`}</AppText>
        </Row>
        {session.note ? <AppText>{session.note}</AppText> : null}
        {bench.status === 'inUse' ? null : (
          <Banner
            kind="attention"
            sentence={`${bench.name} ${bench.status === 'outOfUse' ? 'is out of use' : 'needs a check'}. ${bench.statusWhy}`.trim()}
          />
        )}
      </Stack>
      {problem && panel === null ? <Banner kind="refusal" sentence={problem} /> : null}
      {isKeyable ? null : (
        <Banner
          sentence={
            session.state === 'approved'
              ? 'This session is approved. Its readings stay as they are.'
              : 'This session is handed in. The supervisor looks at it; what is keyed now would wait for them.'
          }
        />
      )}
      {view.runs.length === 0 ? (
        <EmptyState
          title="No run yet"
          sentence={
            port
              ? `The first port is ${port.side} ${port.port}, with ${session.liftPlan.length} lifts.`
              : 'This head has no ports. Name them at the desk.'
          }
        />
      ) : (
        <Stack gap="m">
          {view.runs.map((run) => (
            <BenchRunLine
              key={run.run.id}
              run={run}
              view={view}
              href={runHref(run.run.id)}
              onOpen={() => onOpenRun(run.run.id)}
            />
          ))}
        </Stack>
      )}
      {isKeyable && port ? (
        <Button
          title={`New run: ${port.side} ${port.port}`}
          kind="primary"
          icon="add"
          isWide
          onPress={() => setPanel('newRun')}
        />
      ) : null}
      {isKeyable && readings.length > 0 ? (
        <Button title={`Hand in session ${session.label}`} isWide onPress={() => setPanel('handIn')} />
      ) : null}
      {panel === 'newRun' && port ? (
        <BenchNewRun
          view={view}
          start={proposeRun(view, port)}
          isBusy={isBusy}
          problem={problem}
          onStart={(run) => void work(() => onStartRun(run))}
          onClose={() => setPanel(null)}
        />
      ) : null}
      {panel === 'handIn' ? (
        <ConfirmSheet
          title={`Hand in session ${session.label}?`}
          sentence={handInSentence(view, notSentCount)}
          actionTitle={`Hand in session ${session.label}`}
          isBusy={isBusy}
          onConfirm={() => void work(onHandIn)}
          onClose={() => setPanel(null)}
        />
      ) : null}
    </Stack>
  );
}

function handInSentence(view: SessionView, notSentCount: number): string {
  const runs = view.runs.length === 1 ? '1 run' : `${view.runs.length} runs`;
  const readings = view.runs.reduce((sum, run) => sum + run.readings.length, 0);
  const what = `${runs} with ${readings === 1 ? '1 reading' : `${readings} readings`} go to the supervisor.`;
  const open = view.runs.reduce((sum, run) => {
    const keyed = new Set(run.readings.map((reading) => reading.rungId));
    return sum + run.rungs.filter((rung) => !rung.isSkipped && !keyed.has(rung.id)).length;
  }, 0);
  return [
    what,
    ...(open > 0 ? [`${open === 1 ? '1 planned lift is' : `${open} planned lifts are`} not keyed.`] : []),
    ...(notSentCount > 0
      ? [
          `${notSentCount === 1 ? '1 reading is' : `${notSentCount} readings are`} not sent yet: they go first, then the hand-in.`,
        ]
      : []),
  ].join(' ');
}
