/** Colour roles of a theme. Components name a role, never a colour. */
export type Colors = {
  ground: string;
  surface: string;
  ink: string;
  quietInk: string;
  markingBlue: string;
  /** text and icons on marking blue */
  onMarkingBlue: string;
  water: string;
  brass: string;
  line: string;
  redOxide: string;
  /** pressed key or row */
  pressed: string;
};
export type ThemeName = 'daylight' | 'shed';

/** Both themes; `tests/components/contrast.test.ts` computes the contrast every role has to keep. */
export const themes: Record<ThemeName, Colors> = {
  daylight: {
    ground: '#F6F3EC',
    surface: '#FFFFFF',
    ink: '#12181D',
    quietInk: '#434F57',
    markingBlue: '#2440A8',
    onMarkingBlue: '#FFFFFF',
    water: '#095A56',
    brass: '#6A4300',
    line: '#5F6B73',
    redOxide: '#8F2613',
    pressed: '#DCE4FF',
  },
  shed: {
    ground: '#10151A',
    surface: '#1A2229',
    ink: '#F2F5F3',
    quietInk: '#B4C0C6',
    markingBlue: '#8FB4FF',
    onMarkingBlue: '#10151A',
    water: '#6FD0C8',
    brass: '#E7B866',
    line: '#84949E',
    redOxide: '#FF9C8A',
    pressed: '#22304A',
  },
};

/** Distances in px, on a grid of four. */
export const space = { hair: 2, xs: 4, s: 8, m: 12, l: 16, xl: 24, xxl: 40 } as const;
export const radius = { key: 10, card: 8, field: 6 } as const;
/** Width of borders and of the focus ring. */
export const stroke = { line: 1.5, strong: 2.5, focus: 3 } as const;

/** Where a screen is used: at the bench with a glove on, or at a desk. */
export type Place = 'bench' | 'desk';

export type TextVariant = 'display' | 'title' | 'heading' | 'body' | 'label' | 'small' | 'data';

/** Text sizes in px by place. The bench never goes under 20; the desk is a scale of 1.25 from 16. */
export const textSizes: Record<Place, Record<TextVariant, number>> = {
  bench: { display: 48, title: 28, heading: 24, body: 20, label: 20, small: 20, data: 20 },
  desk: { display: 39, title: 25, heading: 20, body: 16, label: 15, small: 14, data: 15 },
};
export const lineHeightRatio: Record<TextVariant, number> = {
  display: 1.1,
  title: 1.2,
  heading: 1.25,
  body: 1.4,
  label: 1.3,
  small: 1.35,
  data: 1.3,
};

/** Least height of anything pressable, px. */
export const targetSize: Record<Place, number> = { bench: 64, desk: 44 };

export type FontWeight = '400' | '600' | '800';
/** Scripts JetBrains Mono lacks fall through to what the device has. */
const fallback =
  'ui-monospace, "Noto Sans Mono", "DejaVu Sans Mono", "Noto Sans", "Segoe UI", system-ui, sans-serif';
export const fontFamilies: Record<FontWeight, string> = {
  '400': `JetBrainsMono_400Regular, ${fallback}`,
  '600': `JetBrainsMono_600SemiBold, ${fallback}`,
  '800': `JetBrainsMono_800ExtraBold, ${fallback}`,
};
/** Advance of every glyph of the family, in em: lets sizes be worked out instead of measured. */
export const glyphAdvanceEm = 0.6;
