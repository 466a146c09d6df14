import { useEffect, useRef } from 'react';
import { ScrollView, View } from 'react-native';
import Svg, { Path } from 'react-native-svg';
import { AppText } from '@/components/ui/AppText';
import { PressArea } from '@/components/ui/PressArea';
import { Spoken } from '@/components/ui/Spoken';
import { useTheme } from '@/components/ui/ThemeProvider';
import { space, stroke } from '@/components/ui/tokens';
import { CurrentMark, RungMark } from './RungMark';
import { columnLabel, rungState, rungWords, waterLevel, type ColumnRung } from './rungState';

export type RungListProps = {
  /** lowest lift first; drawn from the bottom up */
  rungs: ColumnRung[];
  currentRungId?: string | null;
  flowUnit: string;
  rowHeight?: number;
  /** too narrow for units beside the figures; they stay in the spoken label */
  isCompact?: boolean;
  onGoToRung: (rungId: string) => void;
};

const tubeWidth = 36;

/** The column at full size: every rung can be pressed. Opens on the rung that is being keyed. */
export function RungList({
  rungs,
  currentRungId,
  flowUnit,
  rowHeight = 64,
  isCompact = false,
  onGoToRung,
}: RungListProps) {
  const scroller = useRef<ScrollView>(null);
  const level = waterLevel(rungs);
  const fromTop = rungs.length - 1 - rungs.findIndex((rung) => rung.id === currentRungId);
  useEffect(() => {
    scroller.current?.scrollTo({ y: Math.max(0, (fromTop - 2) * rowHeight), animated: false });
  }, [fromTop, rowHeight]);
  return (
    <ScrollView ref={scroller} role="group" aria-label={`Lifts: ${columnLabel(rungs)}`} style={{ flex: 1 }}>
      {rungs
        .map((rung, at) => (
          <RungRow
            key={rung.id}
            rung={rung}
            isUnderWater={at < level}
            isSurface={at === level - 1}
            isBottom={at === 0}
            isCurrent={rung.id === currentRungId}
            flowUnit={flowUnit}
            isCompact={isCompact}
            height={rowHeight}
            onPress={() => onGoToRung(rung.id)}
          />
        ))
        .reverse()}
    </ScrollView>
  );
}

type RungRowProps = {
  rung: ColumnRung;
  isUnderWater: boolean;
  isSurface: boolean;
  isBottom: boolean;
  isCurrent: boolean;
  flowUnit: string;
  isCompact: boolean;
  height: number;
  onPress: () => void;
};

function RungRow({
  rung,
  isUnderWater,
  isSurface,
  isBottom,
  isCurrent,
  flowUnit,
  isCompact,
  height,
  onPress,
}: RungRowProps) {
  const { colors, isTablet } = useTheme();
  const state = rungState(rung);
  const figure = state.reading?.correctedText ?? null;
  const lift = `${rung.liftText} ${rung.liftUnit}`;
  const words = isCurrent && state.kind === 'empty' ? 'keying now' : rungWords(rung);
  const small = isTablet ? 22 : 20;
  return (
    <PressArea onPress={onPress} web={{ 'aria-current': isCurrent ? 'step' : undefined }}>
      {(isPressed) => (
        <View
          style={{
            height,
            flexDirection: 'row',
            alignItems: 'center',
            gap: space.s,
            backgroundColor: isPressed || isCurrent ? colors.pressed : 'transparent',
          }}
        >
          <TubeSegment {...{ rung, isUnderWater, isSurface, isBottom, isCurrent, height }} />
          <View
            style={{
              flex: 1,
              height,
              justifyContent: 'center',
              borderBottomWidth: stroke.line,
              borderBottomColor: colors.line,
              paddingRight: space.s,
            }}
          >
            <View style={{ flexDirection: 'row', alignItems: 'baseline', justifyContent: 'space-between' }}>
              <AppText
                size={small}
                lineHeight={30}
                weight={isCurrent ? '800' : '600'}
                color={isCurrent ? 'markingBlue' : 'ink'}
              >
                {isCompact ? rung.liftText : lift}
              </AppText>
              {isCompact ? <Spoken>{rung.liftUnit}</Spoken> : null}
              {figure ? (
                <AppText size={26} lineHeight={30} weight="800">
                  {figure}
                  <Spoken>{` ${flowUnit}`}</Spoken>
                </AppText>
              ) : null}
            </View>
            <AppText size={small} lineHeight={26} lines={1} color="quietInk">
              {words}
            </AppText>
          </View>
        </View>
      )}
    </PressArea>
  );
}

function TubeSegment({
  rung,
  isUnderWater,
  isSurface,
  isBottom,
  isCurrent,
  height,
}: Omit<RungRowProps, 'flowUnit' | 'isCompact' | 'onPress'>) {
  const { colors } = useTheme();
  const state = rungState(rung);
  const [left, right, centre] = [6, tubeWidth - 6, tubeWidth / 2];
  const round = right - centre;
  const end = isBottom ? height - 4 - round : height;
  const bottom = (inset: number) =>
    isBottom ? `a${round - inset} ${round - inset} 0 0 0 ${2 * (round - inset)} 0` : `H${right - inset}`;
  const water = isSurface
    ? `M${left + 1} 2V${end}${bottom(1)}V2Q${centre} 12 ${left + 1} 2Z`
    : `M${left + 1} 0V${end}${bottom(1)}V0Z`;
  return (
    <Svg width={tubeWidth} height={height} aria-hidden>
      {isUnderWater ? <Path d={water} fill={colors.water} /> : null}
      <Path
        d={`M${left} 0V${end}${isBottom ? bottom(0) : `M${right} ${end}`}V0`}
        fill="none"
        stroke={colors.line}
        strokeWidth={2}
      />
      {state.mark ? (
        <RungMark
          mark={state.mark}
          hasDoubt={state.hasDoubt}
          x={centre - 11}
          y={height / 2 - 9}
          width={22}
          height={18}
        />
      ) : (
        <Path
          d={`M${left} ${height / 2}H${right}`}
          stroke={isUnderWater ? colors.surface : colors.line}
          strokeWidth={2.5}
          strokeDasharray={state.kind === 'skipped' ? '4 4' : undefined}
        />
      )}
      {isCurrent ? (
        <CurrentMark x={centre} y={state.mark ? 8 : height / 2} size={state.mark ? 14 : 24} />
      ) : null}
    </Svg>
  );
}
