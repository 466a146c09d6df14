/** Every height and width of the capture screen, px. Worked out from the window, never measured, so nothing jumps. */
export type CaptureLayout = {
  arrangement: 'phone' | 'phoneSide' | 'tablet' | 'tabletSide';
  statusHeight: number;
  promptHeight: number;
  valuesHeight: number;
  resultHeight: number;
  keyHeight: number;
  keyGap: number;
  /** between the faces of the last row and of SAVE */
  padToSave: number;
  saveHeight: number;
  bottom: number;
  /** the column at the edge: a strip on a phone, rungs to press on a tablet */
  columnWidth: number;
  /** cells of the pad, whole */
  padWidth: number;
  /** prompt, values, result */
  contentWidth: number;
  /** other bench controls */
  control: number;
  size: { value: number; figure: number; key: number; prompt: number; small: number; save: number };
  /** the window is lower than the least that a glove needs */
  isScrolling: boolean;
};

const phone = {
  statusHeight: 40,
  promptHeight: 64,
  valuesHeight: 88,
  resultHeight: 64,
  keyHeight: 72,
  keyGap: 8,
  padToSave: 16,
  saveHeight: 80,
  bottom: 0,
  columnWidth: 18,
  control: 64,
  size: { value: 64, figure: 48, key: 40, prompt: 36, small: 20, save: 40 },
};
const tablet = {
  statusHeight: 56,
  promptHeight: 80,
  valuesHeight: 128,
  resultHeight: 96,
  keyHeight: 88,
  keyGap: 12,
  padToSave: 24,
  saveHeight: 120,
  bottom: 8,
  control: 80,
  size: { value: 96, figure: 64, key: 48, prompt: 48, small: 22, save: 44 },
};

type Heights = 'keyHeight' | 'saveHeight' | 'bottom' | 'resultHeight' | 'valuesHeight' | 'promptHeight';

/** Height of the pad with half a gap under it. */
export function padHeight(layout: Pick<CaptureLayout, 'keyHeight' | 'keyGap'>): number {
  return 4 * layout.keyHeight + 3.5 * layout.keyGap;
}

/** Everything under each other, without spare room. */
export function stackHeight(layout: Omit<CaptureLayout, 'arrangement' | 'isScrolling'>): number {
  return (
    layout.statusHeight +
    layout.promptHeight +
    layout.valuesHeight +
    layout.resultHeight +
    padHeight(layout) +
    (layout.padToSave - layout.keyGap / 2) +
    layout.saveHeight +
    layout.bottom
  );
}

/** Gives spare height away in order of use: first to the keys, then to SAVE, then to what is read. */
function grow<T extends Record<Heights, number>>(base: T, spare: number, order: [Heights, number][]): T {
  const grown = { ...base };
  let left = Math.max(0, spare);
  for (const [part, most] of order) {
    const share = part === 'keyHeight' ? 4 : 1;
    const by = Math.min(most, Math.floor(left / share));
    grown[part] += by;
    left -= by * share;
  }
  return grown;
}

/** Lays the capture screen out for a window. */
export function captureLayout(width: number, height: number): CaptureLayout {
  const layout = arrange(width, height);
  // the lift is read first: it takes what its row has beside the line under it
  const prompt = Math.min(72, Math.max(layout.size.prompt, layout.promptHeight - layout.size.small - 10));
  return { ...layout, size: { ...layout.size, prompt } };
}

function arrange(width: number, height: number): CaptureLayout {
  if (width >= 700 && height >= 600) return tabletLayout(width, height);
  return width > height && width >= 560 ? phoneSideLayout(width, height) : phoneLayout(width, height);
}

function phoneLayout(width: number, height: number): CaptureLayout {
  const padWidth = Math.min(520, width - phone.columnWidth);
  const widths = { padWidth, contentWidth: padWidth - phone.keyGap };
  const full = { ...phone, ...widths };
  if (height >= stackHeight(full)) {
    const grown = grow(full, height - stackHeight(full), [
      ['keyHeight', 16],
      ['saveHeight', 16],
      ['bottom', 12],
      ['valuesHeight', 24],
      ['promptHeight', 12],
      ['resultHeight', 12],
      ['keyHeight', 4],
    ]);
    return { ...grown, arrangement: 'phone', isScrolling: false };
  }
  const low = { ...full, statusHeight: 32, valuesHeight: 72, saveHeight: 64 };
  const lowest = stackHeight(low);
  const grown = grow(low, height - lowest, [
    ['saveHeight', 16],
    ['valuesHeight', 16],
  ]);
  return {
    ...grown,
    size: { ...phone.size, value: 52 },
    arrangement: 'phone',
    isScrolling: height < lowest,
  };
}

/** A phone lying on its side: reading at the left, pad at the right. */
function phoneSideLayout(width: number, height: number): CaptureLayout {
  const padWidth = Math.min(372, Math.floor(width * 0.45));
  const free = height - phone.statusHeight - phone.bottom;
  const keyHeight = Math.min(88, Math.max(72, Math.floor((free - 4 - 3.5 * phone.keyGap) / 4)));
  return {
    ...phone,
    keyHeight,
    padWidth,
    contentWidth: width - padWidth - phone.columnWidth - 2 * phone.keyGap,
    arrangement: 'phoneSide',
    isScrolling: free < padHeight({ keyHeight, keyGap: phone.keyGap }),
  };
}

function tabletLayout(width: number, height: number): CaptureLayout {
  const padWidth = 3 * (148 + tablet.keyGap);
  const isSide = width > height;
  const order: [Heights, number][] = [
    ['keyHeight', 32],
    ['valuesHeight', 24],
    ['resultHeight', 16],
    ['promptHeight', 16],
  ];
  if (isSide) {
    const columnWidth = Math.min(340, Math.max(232, Math.floor(width * 0.24)));
    const contentWidth = width - padWidth - columnWidth - 3 * 16;
    const least = tablet.statusHeight + padHeight(tablet) + 18 + tablet.saveHeight + tablet.bottom;
    const keyed = grow({ ...tablet, padWidth, columnWidth, contentWidth }, height - least, [
      ['keyHeight', 32],
    ]);
    // the reading part has the height for itself: flow and pressure under each other, the rest to be read from afar
    const reading = tablet.promptHeight + 2 * tablet.valuesHeight + 4 + tablet.resultHeight;
    const spare = height - tablet.statusHeight - reading - 24;
    const values = Math.min(40, Math.max(0, Math.floor(spare / 4)));
    const grown = grow({ ...keyed, valuesHeight: keyed.valuesHeight + values }, spare - 2 * values, [
      ['promptHeight', 40],
      ['resultHeight', 24],
    ]);
    return { ...grown, arrangement: 'tabletSide', isScrolling: height < least };
  }
  const contentWidth = Math.min(560, Math.max(padWidth, width - 300));
  const base = { ...tablet, padWidth, contentWidth, columnWidth: Math.min(340, width - contentWidth - 48) };
  const least = stackHeight(base);
  return { ...grow(base, height - least, order), arrangement: 'tablet', isScrolling: height < least };
}
