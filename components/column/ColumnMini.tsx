import { View } from 'react-native';
import Svg, { Path } from 'react-native-svg';
import { useTheme } from '@/components/ui/ThemeProvider';
import { RungMark } from './RungMark';
import { columnLabel, rungState, waterLevel, type ColumnRung } from './rungState';

/** The column laid down small, for a line in a list: lowest lift at the left. */
export function ColumnMini({ rungs, width = 184 }: { rungs: ColumnRung[]; width?: number }) {
  const { colors } = useTheme();
  const height = 18;
  const step = Math.min(18, (width - 4) / Math.max(1, rungs.length));
  const length = step * rungs.length;
  const wet = waterLevel(rungs) * step;
  return (
    <View role="img" aria-label={columnLabel(rungs)} style={{ width: length + 4, height }}>
      <Svg width={length + 4} height={height} aria-hidden>
        <Path
          d={`M${length + 3} 4H6a5 5 0 0 0 0 10H${length + 3}`}
          fill={colors.surface}
          stroke={colors.line}
          strokeWidth={1.5}
        />
        {wet > 0 ? (
          <Path d={`M${wet + 3} 5Q${wet} 9 ${wet + 3} 13H6a4 4 0 0 1 0-8Z`} fill={colors.water} />
        ) : null}
        {rungs.map((rung, at) => {
          const state = rungState(rung);
          const x = 2 + (at + 0.5) * step;
          if (!state.mark) {
            return <Path key={rung.id} d={`M${x} 6V12`} stroke={colors.line} strokeWidth={1.5} />;
          }
          const size = Math.max(3, Math.min(8, step - 6));
          return (
            <RungMark
              key={rung.id}
              mark={state.mark}
              hasDoubt={state.hasDoubt}
              x={x - size / 2}
              y={5}
              width={size}
              height={8}
            />
          );
        })}
      </Svg>
    </View>
  );
}
