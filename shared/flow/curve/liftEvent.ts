import { pchip, pchipValue } from '@/shared/flow/curve/pchip';
import { OutOfRangeError, finite, positive } from '@/shared/units/outOfRange';

/** Shapes of a lift curve that can be chosen when no lift table is at hand. */
export type LiftLaw = 'halfSine' | 'sineSquared' | 'cycloidal' | 'polynomial345';

/** How a valve opens and closes: the lift over the event, cut into stretches on which it only rises or only falls. */
export type LiftEvent = {
  peakLiftM: number;
  /** ends of the stretches, a share of the event each; a law is symmetric, so its first half stands for both */
  ends: readonly number[];
  liftAt: (share: number) => number;
};

/** Lift as a share of its peak, at a share s of the rise, 0..1. */
const rise: Record<LiftLaw, (s: number) => number> = {
  halfSine: (s) => Math.sin((Math.PI * s) / 2),
  sineSquared: (s) => Math.sin((Math.PI * s) / 2) ** 2,
  cycloidal: (s) => s - Math.sin(2 * Math.PI * s) / (2 * Math.PI),
  polynomial345: (s) => s ** 3 * (10 - 15 * s + 6 * s * s),
};

/** Lift event of a chosen law: half sine L = Lp·sin(πu); sin²; cycloidal s − sin(2πs)/2π; 3-4-5 polynomial
 * 10s³ − 15s⁴ + 6s⁵, with u the share of the event and s = 2u on the opening half, mirrored on the closing half.
 * @param law which @param peakLiftM peak lift, m
 * @returns the event @throws OutOfRangeError (a RangeError) unless the peak is above 0
 * Range: symmetric events without dwell. Source: Norton, Cam Design and Manufacturing Handbook, ch. 2 and 3.
 * @example liftEventOfLaw('sineSquared', 0.012).liftAt(0.25) // 0.006
 */
export function liftEventOfLaw(law: LiftLaw, peakLiftM: number): LiftEvent {
  positive(peakLiftM, 'peak lift');
  const shape = rise[law];
  return {
    peakLiftM,
    ends: [0, 0.5],
    liftAt: (share) => peakLiftM * shape(2 * Math.min(share, 1 - share)),
  };
}

/** Lift event of a pasted table, a PCHIP curve through its rows. Rows of zero lift before and after are cut away but one.
 * @param rows two or more by rising angle: `angle` in any unit (only its proportions count), `liftM` in m, 0 or above
 * @returns the event @throws OutOfRangeError (a RangeError) for fewer rows, angles that do not rise, a negative lift, or no lift at all
 * Range: one opening and closing. Source: as pchipSlopes.
 * @example liftEventOfTable([{ angle: 0, liftM: 0 }, { angle: 90, liftM: 0.01 }, { angle: 180, liftM: 0 }]).peakLiftM // 0.01
 */
export function liftEventOfTable(rows: readonly { angle: number; liftM: number }[]): LiftEvent {
  rows.forEach(({ liftM }) => {
    if (!(finite(liftM, 'lift') >= 0))
      throw new OutOfRangeError('lift table', 'A lift in the table is negative.');
  });
  const open = rows.flatMap(({ liftM }, i) => (liftM > 0 ? [i] : []));
  const first = open[0];
  const last = open.at(-1);
  if (first === undefined || last === undefined)
    throw new OutOfRangeError('lift table', 'The table holds no lift above 0.');
  const used = rows.slice(Math.max(0, first - 1), last + 2);
  const curve = pchip(
    used.map(({ angle }) => angle),
    used.map(({ liftM }) => liftM),
  );
  const start = curve.xs[0] ?? 0;
  const length = (curve.xs.at(-1) ?? 0) - start;
  const end = start + length;
  return {
    peakLiftM: Math.max(...curve.ys),
    ends: curve.xs.map((x) => (x - start) / length),
    liftAt: (share) => pchipValue(curve, Math.min(end, start + share * length)),
  };
}
