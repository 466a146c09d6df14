import { type Budget, type Contribution, type PartName } from '@/shared/flow/uncertainty/budget';
import { effectiveFreedom, expandedUncertainty, rootSumSquares } from '@/shared/flow/uncertainty/propagation';
import { positive } from '@/shared/units/outOfRange';

/** What two results have in common. Only where all of the bench is alike do its errors drop out. */
export type InCommon = {
  bench: boolean;
  calibration: boolean;
  setting: boolean;
  range: boolean;
  direction: boolean;
  element: boolean;
  /** test pressures within 1 inH2O at that lift */
  likePressure: boolean;
  /** the same gauge, barometer and thermometer */
  instruments: boolean;
  /** the same run, head not lifted off */
  run: boolean;
};

/** Everything of the bench alike, the head lifted off between: two stages, or two ports of one day. */
export const likeOnOneBench: InCommon = {
  bench: true,
  calibration: true,
  setting: true,
  range: true,
  direction: true,
  element: true,
  likePressure: true,
  instruments: true,
  run: false,
};

export type DifferencePart = {
  name: PartName;
  /** true when both results carry this one error, so that only what differs of it stays */
  isShared: boolean;
  degreesOfFreedom: number;
  /** what it does to the difference, m³/s */
  contributionM3PerS: number;
  /** what it does to the difference as a share of the first */
  contributionRatio: number;
};

export type Difference = {
  /** second less first */
  differenceM3PerS: number;
  /** the same as a share of the first */
  ratio: number;
  parts: DifferencePart[];
  standardUncertaintyM3PerS: number;
  expandedM3PerS: number;
  standardUncertaintyRatio: number;
  /** half width of the 95 % interval of `ratio` */
  expandedRatio: number;
  degreesOfFreedom: number;
  /** false when a calibration that is not known stays in the difference */
  isKnown: boolean;
  cautions: string[];
};

const instrumentParts: readonly PartName[] = ['gaugeZero', 'gaugeSpan', 'air'];

function isShared(part: Contribution, inCommon: InCommon): boolean {
  const { run, instruments, ...bench } = inCommon;
  if (part.sharedBy === 'reading') return false;
  if (part.sharedBy === 'run') return run;
  return Object.values(bench).every(Boolean) && (instruments || !instrumentParts.includes(part.name));
}

/** Sentences for what keeps the bench's errors in a difference. */
function cautionsOf(inCommon: InCommon): string[] {
  const { bench, calibration, setting, range, direction, element, likePressure, instruments } = inCommon;
  const cautions: string[] = [];
  if (!bench) cautions.push('Two benches: the errors of both stay in the difference.');
  else if (!(calibration && setting && range && direction && element))
    cautions.push('Calibration, setting, range, direction or element changed: the bench’s error stays.');
  if (!likePressure) cautions.push('Unlike test pressures: the root flatters the deeper pull.');
  if (!instruments) cautions.push('Not the same gauge, barometer and thermometer: their errors stay.');
  return cautions;
}

/** Difference of two flows or figures with what they share left out. With D = Q2 − Q1 and g = Q2/Q1 − 1, a shared error
 * adds c2 − c1 to D and c2/Q1 − Q2·c1/Q1² to g: a pure factor drops out of g, of a line only its slope between the two
 * flows stays in D. Errors that are not shared add by squares.
 * @param first budget of the first, above 0, m³/s @param second budget of the second, m³/s @param inCommon what is alike
 * @returns difference in m³/s and as a share of the first, each part, uncertainties with ν and U at 95 %, cautions
 * @throws OutOfRangeError (a RangeError) unless the first flow is above 0
 * Range: uncertainties small against the flows. Source: GUM 5.1.2, 5.2.2, F.1.2.3.
 * @example differenceOf(budgetOf(0.1, [{ name: 'calibration', sharedBy: 'calibration', degreesOfFreedom: 9, contributionM3PerS: 0.003 }]), budgetOf(0.11, [{ name: 'calibration', sharedBy: 'calibration', degreesOfFreedom: 9, contributionM3PerS: 0.0033 }]), likeOnOneBench).ratio // 0.1
 */
export function differenceOf(first: Budget, second: Budget, inCommon: InCommon): Difference {
  const q1 = positive(first.flowM3PerS, 'first flow');
  const q2 = second.flowM3PerS;
  const names = [...new Set([...first.parts, ...second.parts].map(({ name }) => name))];
  const parts = names.flatMap((name): DifferencePart[] => {
    const a = first.parts.find((part) => part.name === name);
    const b = second.parts.find((part) => part.name === name);
    const known = a ?? b;
    if (!known) return [];
    const c1 = a?.contributionM3PerS ?? 0;
    const c2 = b?.contributionM3PerS ?? 0;
    const shared = isShared(known, inCommon);
    const onRatio = [c2 / q1, (q2 * c1) / q1 ** 2] as const;
    // on one bench one pooled spread stands behind both sides; on two benches each has its own
    const degreesOfFreedom =
      shared || inCommon.bench
        ? Math.min(a?.degreesOfFreedom ?? Infinity, b?.degreesOfFreedom ?? Infinity)
        : effectiveFreedom(
            [a, b].flatMap((part) =>
              part
                ? [{ contribution: part.contributionM3PerS, degreesOfFreedom: part.degreesOfFreedom }]
                : [],
            ),
          );
    return [
      {
        name,
        isShared: shared,
        degreesOfFreedom,
        contributionM3PerS: shared ? c2 - c1 : Math.hypot(c1, c2),
        contributionRatio: shared ? onRatio[0] - onRatio[1] : rootSumSquares(onRatio),
      },
    ];
  });
  const inFlow = parts.map((part) => ({ ...part, contribution: part.contributionM3PerS }));
  const inRatio = parts.map((part) => ({ ...part, contribution: part.contributionRatio }));
  const uOf = (list: readonly { contribution: number }[]) => rootSumSquares(list.map((p) => p.contribution));
  const flow = expandedUncertainty(uOf(inFlow), effectiveFreedom(inFlow));
  const ratioFreedom = effectiveFreedom(inRatio);
  const ratio = expandedUncertainty(uOf(inRatio), ratioFreedom);
  const calibrationDrops = parts.some(({ name, isShared: shared }) => name === 'calibration' && shared);
  const isKnown = calibrationDrops || (first.isAbsoluteKnown && second.isAbsoluteKnown);
  return {
    differenceM3PerS: q2 - q1,
    ratio: q2 / q1 - 1,
    parts,
    standardUncertaintyM3PerS: uOf(inFlow),
    expandedM3PerS: flow.expandedUncertainty,
    standardUncertaintyRatio: uOf(inRatio),
    expandedRatio: ratio.expandedUncertainty,
    degreesOfFreedom: ratioFreedom,
    isKnown,
    cautions: cautionsOf(inCommon),
  };
}
