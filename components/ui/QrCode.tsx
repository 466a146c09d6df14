import { create } from 'qrcode';
import { useMemo } from 'react';
import { Path, Rect, Svg } from 'react-native-svg';

type Props = {
  /** what a camera reads */
  text: string;
  sizePx: number;
  /** what it is, for those who do not see it */
  label: string;
};

/** Modules of white around the code that cameras need. */
const quiet = 4;

/** A QR code, dark on white in both themes: many cameras do not read the reverse. */
export function QrCode({ text, sizePx, label }: Props) {
  const { path, side } = useMemo(() => outlineOf(text), [text]);
  return (
    <Svg
      width={sizePx}
      height={sizePx}
      viewBox={`0 0 ${side} ${side}`}
      role="img"
      aria-label={label}
      accessibilityLabel={label}
    >
      <Rect width={side} height={side} fill="#FFFFFF" />
      <Path d={path} fill="#000000" />
    </Svg>
  );
}

/** The code's dark modules as one path, one run of modules a stroke. */
export function outlineOf(text: string): { path: string; side: number } {
  const { modules } = create(text, { errorCorrectionLevel: 'M' });
  const steps: string[] = [];
  for (let row = 0; row < modules.size; row += 1) {
    for (let column = 0; column < modules.size; column += 1) {
      if (!modules.get(row, column)) continue;
      const start = column;
      while (column + 1 < modules.size && modules.get(row, column + 1)) column += 1;
      const width = column - start + 1;
      steps.push(`M${start + quiet} ${row + quiet}h${width}v1h-${width}z`);
    }
  }
  return { path: steps.join(''), side: modules.size + 2 * quiet };
}
