import Svg from 'react-native-svg';
import { RungMark } from '@/components/column/RungMark';
import { markWords } from '@/components/column/rungState';
import { AppText } from '@/components/ui/AppText';
import { Row } from '@/components/ui/Layout';
import type { Mark } from '@/shared/schema/views';

/** Where a reading lives: the shape it has on the column, and its word. */
export function MarkWord({ mark, hasDoubt, isNew }: { mark: Mark; hasDoubt: boolean; isNew: boolean }) {
  return (
    <Row gap="xs" isWrapping={false}>
      <Svg width={16} height={16} viewBox="0 0 16 16" aria-hidden>
        <RungMark mark={mark} hasDoubt={hasDoubt} x={2} y={3} width={12} height={10} />
      </Svg>
      <AppText variant="small">{markWords[mark]}</AppText>
      {isNew ? (
        <AppText variant="small" weight="800" color="markingBlue">
          new
        </AppText>
      ) : null}
    </Row>
  );
}
