import Svg, { Path } from 'react-native-svg';
import { useTheme } from './ThemeProvider';
import type { Colors } from './tokens';

/** Own drawings on a 24 grid, strokes 2.5 wide, square ends like a scriber's. */
const paths = {
  back: 'M15 4 7 12l8 8',
  forward: 'M9 4l8 8-8 8',
  close: 'M5 5l14 14M19 5 5 19',
  more: 'M4 6h16M4 12h16M4 18h10',
  check: 'M4 13l5 5L20 6',
  backspace: 'M9 5h12v14H9l-6-7zM12 9l6 6M18 9l-6 6',
  undo: 'M9 5 4 10l5 5M4 10h10a5 5 0 0 1 0 10h-4',
  /** a point of a triangle with a bar: a person is needed */
  attention: 'M12 3 2 21h20zM12 10v5M12 17.5v1.5',
  info: 'M12 3h9v18H3V3zM12 11v6M12 7v1.5',
  refusal: 'M8 3h8l5 5v8l-5 5H8l-5-5V8zM8 8l8 8M16 8l-8 8',
  copy: 'M8 8V3h13v13h-5M3 8h13v13H3z',
  add: 'M12 4v16M4 12h16',
  repeat: 'M4 9h13l-4-4M20 15H7l4 4',
  skip: 'M4 5l8 7-8 7zM16 5v14M20 5v14',
  sort: 'M8 4v16M4 8l4-4 4 4M16 20V4M12 16l4 4 4-4',
  up: 'M12 20V4M5 11l7-7 7 7',
  down: 'M12 4v16M5 13l7 7 7-7',
  note: 'M4 4h16v11l-5 5H4zM8 9h8M8 13h5',
  /** the water column with three rungs */
  column: 'M8 2v17a4 4 0 0 0 8 0V2M8 12h8M11 7h2M11 16h2',
  door: 'M13 4h7v16h-7M4 12h10M10 8l4 4-4 4',
} as const;
export type IconName = keyof typeof paths;

/** A drawing beside a word; never the only bearer of a meaning, so hidden from screen readers. */
export function Icon({
  name,
  size = 24,
  color = 'ink',
}: {
  name: IconName;
  size?: number;
  color?: keyof Colors;
}) {
  const { colors } = useTheme();
  return (
    <Svg width={size} height={size} viewBox="0 0 24 24" fill="none" aria-hidden>
      <Path d={paths[name]} stroke={colors[color]} strokeWidth={2.5} />
    </Svg>
  );
}
