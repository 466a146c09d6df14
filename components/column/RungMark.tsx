import { G, Path } from 'react-native-svg';
import { useTheme } from '@/components/ui/ThemeProvider';
import type { Mark } from '@/shared/schema/views';

type MarkProps = { mark: Mark; hasDoubt: boolean; x: number; y: number; width: number; height: number };

/**
 * Where a rung's readings live, told by shape: hollow on this device, solid sent, split in dispute, barred held,
 * crossed set aside; a notch at the right is a doubt. A halo keeps the shape readable on water.
 */
export function RungMark({ mark, hasDoubt, x, y, width: w, height: h }: MarkProps) {
  const { colors } = useTheme();
  const [r, b] = [x + w, y + h];
  const notch = hasDoubt ? `L${r} ${y + h * 0.2}L${r - w * 0.45} ${y + h / 2}L${r} ${b - h * 0.2}` : '';
  const outline = `M${x} ${y}L${r} ${y}${notch}L${r} ${b}L${x} ${b}Z`;
  const inner: Record<Mark, string> = {
    onDevice: '',
    sent: '',
    dispute: '',
    held: `M${x} ${y + h * 0.36}H${r - (hasDoubt ? w * 0.3 : 0)}M${x} ${y + h * 0.68}H${r - (hasDoubt ? w * 0.3 : 0)}`,
    setAside: `M${x} ${y}L${r} ${b}M${r} ${y}L${x} ${b}`,
  };
  const stroke = Math.max(1.5, Math.min(2.5, w / 9));
  return (
    <G>
      <Path d={outline} fill={colors.surface} stroke={colors.surface} strokeWidth={stroke * 2 + 2.5} />
      <Path
        d={outline}
        fill={mark === 'sent' ? colors.ink : colors.surface}
        stroke={colors.ink}
        strokeWidth={stroke}
      />
      {mark === 'dispute' ? <Path d={`M${x} ${y}L${r} ${y}L${x} ${b}Z`} fill={colors.ink} /> : null}
      {inner[mark] ? <Path d={inner[mark]} stroke={colors.ink} strokeWidth={stroke} fill="none" /> : null}
    </G>
  );
}

/** The rung that is being keyed: a diamond in marking blue. */
export function CurrentMark({ x, y, size }: { x: number; y: number; size: number }) {
  const { colors } = useTheme();
  const half = size / 2;
  return (
    <Path
      d={`M${x} ${y - half}L${x + half} ${y}L${x} ${y + half}L${x - half} ${y}Z`}
      fill={colors.markingBlue}
      stroke={colors.surface}
      strokeWidth={2}
    />
  );
}
