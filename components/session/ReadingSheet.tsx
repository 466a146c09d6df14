import { markWords } from '@/components/column/rungState';
import { AppText } from '@/components/ui/AppText';
import { Stack } from '@/components/ui/Layout';
import { Sheet } from '@/components/ui/Sheet';
import { localTime } from './localTime';
import type { RunTableRow } from './readingRows';

/** One reading with its working, step by step. */
export function ReadingSheet({ row, onClose }: { row: RunTableRow; onClose: () => void }) {
  const { reading, corrected, notes, keyedBy } = row;
  return (
    <Sheet title={`Lift ${reading.liftText} ${reading.liftUnit}`} onClose={onClose}>
      {corrected ? (
        <>
          <AppText variant="display">{`${corrected.text} ${corrected.unit}`}</AppText>
          <AppText variant="heading" level={3}>
            Working
          </AppText>
          <Stack gap="s">
            {corrected.working.map((step, at) => (
              <AppText key={step.name}>{`${at + 1}. ${step.sentence}`}</AppText>
            ))}
          </Stack>
        </>
      ) : (
        <AppText>
          {`Keyed: ${reading.flowText} ${reading.flowUnit} at ${reading.pressureText} ${reading.pressureUnit}. It cannot be brought to the standard pressure: that needs a test pressure above zero and a volume flow. The keyed values stay.`}
        </AppText>
      )}
      <AppText color="quietInk">
        {`Keyed by ${keyedBy}, ${localTime(reading.at)}; ${markWords[reading.mark]}${notes.length > 0 ? `, ${notes.join(', ')}` : ''}.`}
      </AppText>
    </Sheet>
  );
}
