import { View } from 'react-native';
import { localTime } from '@/components/session/localTime';
import { StateWord } from '@/components/session/StateWord';
import { stateWord } from '@/components/session/words';
import { AppText } from '@/components/ui/AppText';
import { Row } from '@/components/ui/Layout';
import { PressArea } from '@/components/ui/PressArea';
import { useTheme } from '@/components/ui/ThemeProvider';
import { radius, space, stroke } from '@/components/ui/tokens';
import type { SessionSummary } from '@/shared/schema/views';

type Props = {
  session: SessionSummary;
  isSelected: boolean;
  href: string;
  onGo: (href: string) => void;
};

/** One session in the list. */
export function SessionCard({ session, isSelected, href, onGo }: Props) {
  const { colors } = useTheme();
  const keyedBy = session.keyedBy.length > 0 ? `keyed by ${session.keyedBy.join(', ')}` : '';
  return (
    <View role="listitem">
      <PressArea href={href} onPress={() => onGo(href)} web={isSelected ? { 'aria-current': 'page' } : {}}>
        {(isPressed) => (
          <View
            style={{
              gap: space.xs,
              padding: space.m,
              borderRadius: radius.card,
              borderWidth: stroke.line,
              borderLeftWidth: isSelected ? 6 : stroke.line,
              borderColor: isSelected ? colors.markingBlue : colors.line,
              backgroundColor: isSelected || isPressed ? colors.pressed : colors.surface,
            }}
          >
            <Row justify="space-between">
              <AppText weight="800">{session.label}</AppText>
              <StateWord word={stateWord(session)} />
            </Row>
            <AppText weight="600">{`${session.customerName}: ${session.headName}`}</AppText>
            <AppText variant="small" color="quietInk">
              {`${session.stageName}, ${session.benchName}`}
            </AppText>
            <AppText variant="small">{countsOf(session)}</AppText>
            {keyedBy ? (
              <AppText variant="small" color="quietInk">
                {keyedBy}
              </AppText>
            ) : null}
            {session.notSentCount > 0 ? (
              <AppText variant="small" weight="600" color="redOxide">
                {`${session.notSentCount} need a person`}
              </AppText>
            ) : null}
          </View>
        )}
      </PressArea>
    </View>
  );
}

function countsOf({ runCount, rungCount, readingCount, lastReadingAt }: SessionSummary): string {
  if (readingCount === 0 && runCount === 0) return 'no run yet';
  const runs = runCount === 1 ? '1 run' : `${runCount} runs`;
  // repeats make more readings than lifts
  const hasRepeats = rungCount > 0 && readingCount > rungCount;
  const ofPlan =
    rungCount === 0 ? '' : hasRepeats ? ` for ${rungCount} planned lifts` : ` of ${rungCount} planned`;
  const readings = `${readingCount} readings${ofPlan}`;
  return [runs, readings, ...(lastReadingAt ? [`last ${localTime(lastReadingAt)}`] : [])].join(', ');
}
