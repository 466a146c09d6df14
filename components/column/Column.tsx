import { useState } from 'react';
import { View } from 'react-native';
import Svg, { Path } from 'react-native-svg';
import { useTheme } from '@/components/ui/ThemeProvider';
import { webProps } from '@/components/ui/webProps';
import { CurrentMark, RungMark } from './RungMark';
import { columnLabel, rungState, waterLevel, type ColumnRung } from './rungState';

export type ColumnProps = {
  /** lowest lift first */
  rungs: ColumnRung[];
  currentRungId?: string | null;
  width?: number;
  height: number;
  /** changes when a reading was saved: the water flashes once */
  flashId?: string | null;
};

/** The water column of a run as a strip for the eye: rungs from the bottom up, water to the last one done. */
export function Column({ rungs, currentRungId, width = 18, height, flashId }: ColumnProps) {
  const { colors } = useTheme();
  const [firstFlashId] = useState(flashId);
  const pad = 6;
  const step = (height - 2 * pad) / Math.max(1, rungs.length);
  const centre = width / 2;
  const tube = { left: centre - width * 0.3, right: centre + width * 0.3, top: 2, bottom: height - 2 };
  const level = waterLevel(rungs);
  const waterY = tube.bottom - (level === 0 ? 0 : pad - 2 + level * step);
  const markHeight = Math.max(4, Math.min(width * 0.8, step - 3));
  const round = width * 0.3;
  return (
    <View role="img" aria-label={columnLabel(rungs)} style={{ width, height }}>
      <Svg width={width} height={height} aria-hidden>
        <Path
          d={`M${tube.left} ${tube.top}V${tube.bottom - round}a${round} ${round} 0 0 0 ${2 * round} 0V${tube.top}`}
          fill={colors.surface}
          stroke={colors.line}
          strokeWidth={1.5}
        />
        {level > 0 ? (
          <Path
            d={`M${tube.left + 1} ${waterY - 2}Q${centre} ${waterY + 3} ${tube.right - 1} ${waterY - 2}V${tube.bottom - round}a${round - 1} ${round - 1} 0 0 1 ${2 - 2 * round} 0Z`}
            fill={colors.water}
          />
        ) : null}
        {rungs.map((rung, at) => {
          const y = height - pad - (at + 0.5) * step;
          const state = rungState(rung);
          if (state.mark) {
            return (
              <RungMark
                key={rung.id}
                mark={state.mark}
                hasDoubt={state.hasDoubt}
                x={centre - width * 0.36}
                y={y - markHeight / 2}
                width={width * 0.72}
                height={markHeight}
              />
            );
          }
          const dash = state.kind === 'skipped' ? '2 2' : undefined;
          return (
            <Path
              key={rung.id}
              d={`M${tube.left} ${y}H${tube.right}`}
              stroke={state.kind === 'skipped' ? colors.surface : colors.line}
              strokeWidth={2}
              strokeDasharray={dash}
            />
          );
        })}
        {rungs.map((rung, at) =>
          rung.id === currentRungId ? (
            <CurrentMark
              key={rung.id}
              x={centre}
              y={height - pad - (at + 0.5) * step}
              size={Math.min(width, Math.max(8, step * 0.9))}
            />
          ) : null,
        )}
      </Svg>
      {flashId && flashId !== firstFlashId ? (
        <View
          key={flashId}
          {...webProps({ dataSet: { flash: 'once' } })}
          style={{
            position: 'absolute',
            left: 0,
            right: 0,
            top: 0,
            bottom: 0,
            borderRadius: round,
            opacity: 0,
            backgroundColor: colors.markingBlue,
            pointerEvents: 'none',
          }}
        />
      ) : null}
    </View>
  );
}
