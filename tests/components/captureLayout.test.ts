import { captureLayout, padHeight, stackHeight } from '@/components/capture/captureLayout';

const phones = [
  [390, 664],
  [390, 763],
  [390, 844],
  [360, 664],
  [412, 915],
] as const;

it.each(phones)('fits a phone of %i x %i without scrolling, keys at least 72 high', (width, height) => {
  const layout = captureLayout(width, height);
  expect(layout.arrangement).toBe('phone');
  expect(layout.isScrolling).toBe(false);
  expect(stackHeight(layout)).toBeLessThanOrEqual(height);
  expect(layout.columnWidth + layout.padWidth).toBeLessThanOrEqual(width);
  expect(layout.keyHeight).toBeGreaterThanOrEqual(72);
  expect(layout.saveHeight).toBeGreaterThanOrEqual(80);
  expect(layout.control).toBeGreaterThanOrEqual(64);
  expect(layout.resultHeight).toBeGreaterThanOrEqual(64);
});

it('shows keys of 116 px on a phone of 390, 88 high once installed', () => {
  const inTab = captureLayout(390, 664);
  expect(inTab.padWidth / 3 - inTab.keyGap).toBe(116);
  const installed = captureLayout(390, 763);
  expect([installed.keyHeight, installed.saveHeight]).toEqual([88, 96]);
});

it.each([
  [820, 1180, 'tablet'],
  [768, 954, 'tablet'],
  [1180, 820, 'tabletSide'],
  [1024, 690, 'tabletSide'],
  [1280, 800, 'tabletSide'],
] as const)('fits a tablet of %i x %i', (width, height, arrangement) => {
  const layout = captureLayout(width, height);
  expect(layout.arrangement).toBe(arrangement);
  expect(layout.isScrolling).toBe(false);
  expect(layout.control).toBe(80);
  expect(layout.padWidth / 3 - layout.keyGap).toBe(148);
  const beside = arrangement === 'tablet' ? 0 : layout.padWidth;
  expect(layout.columnWidth + layout.contentWidth + beside).toBeLessThanOrEqual(width);
  if (arrangement === 'tablet') expect(stackHeight(layout)).toBeLessThanOrEqual(height);
  const reading = layout.promptHeight + 2 * layout.valuesHeight + layout.resultHeight;
  if (arrangement === 'tabletSide') expect(layout.statusHeight + reading + 12).toBeLessThanOrEqual(height);
});

it('a tall tablet has the full keys of look.md', () => {
  expect(captureLayout(820, 1180)).toMatchObject({ keyHeight: 120, saveHeight: 120, padToSave: 24 });
});

it('a phone lying on its side keeps the pad and SAVE in sight', () => {
  const layout = captureLayout(844, 390);
  expect(layout.arrangement).toBe('phoneSide');
  expect(layout.statusHeight + padHeight(layout)).toBeLessThanOrEqual(390);
  const reading = layout.promptHeight + layout.valuesHeight + layout.resultHeight + layout.saveHeight;
  expect(layout.statusHeight + reading).toBeLessThanOrEqual(390);
});

it('a window lower than a glove can use scrolls instead of shrinking the keys', () => {
  const layout = captureLayout(360, 560);
  expect(layout.isScrolling).toBe(true);
  expect(layout.keyHeight).toBe(72);
});
