import { themes, type Colors } from '@/components/ui/tokens';

/** Relative luminance of an sRGB colour. Source: WCAG 2.2, definition of relative luminance. */
function luminance(hex: string): number {
  const channel = (at: number) => {
    const c = parseInt(hex.slice(at, at + 2), 16) / 255;
    return c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4;
  };
  return 0.2126 * channel(1) + 0.7152 * channel(3) + 0.0722 * channel(5);
}
function contrast(a: string, b: string): number {
  const [x, y] = [luminance(a), luminance(b)];
  return (Math.max(x, y) + 0.05) / (Math.min(x, y) + 0.05);
}

// source: WCAG 2.2 worked values: black on white is 21:1, #767676 on white is 4.54:1
it('computes contrast as WCAG does', () => {
  expect(contrast('#000000', '#FFFFFF')).toBeCloseTo(21, 5);
  expect(contrast('#767676', '#FFFFFF')).toBeCloseTo(4.54, 2);
});

type Role = keyof Colors;
const grounds: Role[] = ['ground', 'surface'];
const needs: { what: string; fg: Role[]; bg: Role[]; least: number }[] = [
  { what: 'keyed value and key labels', fg: ['ink'], bg: [...grounds, 'pressed'], least: 12 },
  {
    what: 'other text',
    fg: ['quietInk', 'markingBlue', 'water', 'brass', 'redOxide'],
    bg: grounds,
    least: 7,
  },
  { what: 'pressed text', fg: ['markingBlue', 'redOxide'], bg: ['pressed'], least: 4.5 },
  { what: 'the SAVE label', fg: ['onMarkingBlue'], bg: ['markingBlue'], least: 7 },
  {
    what: 'borders, focus, chart lines',
    fg: ['line', 'markingBlue', 'water', 'brass'],
    bg: grounds,
    least: 4.5,
  },
  { what: 'marks with their halo on water', fg: ['surface'], bg: ['water', 'ink'], least: 4.5 },
];
const cases = Object.entries(themes).flatMap(([theme, colors]) =>
  needs.flatMap(({ what, fg, bg, least }) =>
    fg.flatMap((f) => bg.map((b) => ({ theme, what, f, b, least, got: contrast(colors[f], colors[b]) }))),
  ),
);

it.each(cases)('$theme: $what, $f on $b, keeps $least:1', ({ got, least }) => {
  expect(got).toBeGreaterThanOrEqual(least);
});
