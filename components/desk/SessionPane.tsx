import { Button } from '@/components/ui/Button';
import { Row } from '@/components/ui/Layout';
import { Screen } from '@/components/ui/Screen';
import { SessionDetail } from '@/components/session/SessionDetail';
import { StateWord } from '@/components/session/StateWord';
import { stateWord } from '@/components/session/words';
import type { SessionView } from '@/shared/schema/views';
import { Loaded, type Asked } from './Loaded';

type Props = {
  asked: Asked<SessionView>;
  /** phone: leads back to the list */
  onBack: (() => void) | null;
  backHref: string;
  onEarlier: (() => void) | null;
  onLater: (() => void) | null;
};

/** One session as a screen of its own, or as the right half of two. */
export function SessionPane({ asked, onBack, backHref, onEarlier, onLater }: Props) {
  const view = asked.data;
  const readingCount = view?.runs.reduce((sum, run) => sum + run.readings.length, 0) ?? 0;
  return (
    <Screen
      title={view ? `Session ${view.session.label}` : 'Session'}
      subtitle={view ? `${view.customer.name}: ${view.head.name}, ${view.stage.name}` : undefined}
      {...(onBack ? { onBack, backHref, backLabel: 'Back to sessions' } : {})}
      actions={
        <Row>
          {view ? <StateWord word={stateWord({ state: view.session.state, readingCount })} /> : null}
          {onEarlier ? <Button title="Previous" onPress={onEarlier} /> : null}
          {onLater ? <Button title="Next" onPress={onLater} /> : null}
        </Row>
      }
    >
      <Loaded
        asked={asked}
        name="Runs and readings"
        sentences={{
          no_such_record:
            'There is no such session in this shop. Check the address, or choose a session from the list.',
          not_found: 'That is not the address of a session. Choose one from the list.',
          invalid: 'That is not the address of a session. Choose one from the list.',
          bad_request: 'That is not the address of a session. Choose one from the list.',
        }}
      >
        {(data) => <SessionDetail view={data} />}
      </Loaded>
    </Screen>
  );
}
