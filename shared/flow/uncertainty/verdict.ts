import { type Budget, type PartName } from '@/shared/flow/uncertainty/budget';
import { type Difference, type InCommon, differenceOf } from '@/shared/flow/uncertainty/difference';
import { OutOfRangeError } from '@/shared/units/outOfRange';

/** The decision rule as it stands beside every verdict. */
export const decisionRule =
  'Larger only when the difference in percent lies outside its expanded uncertainty (95 %, repeat and set-up included); on this one declared figure, not lift by lift.';

/** The words of each verdict. */
export const verdictWords = {
  larger: 'larger than this bench’s error',
  tooSmall: 'too small to tell on this bench',
  cannotTell: 'cannot be told: these results share no calibration',
} as const;

export type Verdict = {
  /** the one figure that was declared, in words */
  figure: string;
  verdict: keyof typeof verdictWords;
  words: string;
  rule: string;
  difference: Difference;
};

const needed: readonly PartName[] = ['repeat', 'setUp'];

/** Verdict on one declared figure before and after: |g| > U(g) is larger, otherwise too small to tell; g = Q2/Q1 − 1 with
 * what both share left out, U at 95 %.
 * @param figure the declared figure in words, such as "mean 0.200 to 0.500 in"
 * @param before its budget, above 0, m³/s @param after its budget, m³/s @param inCommon what is alike
 * @returns verdict with its words, the rule and the difference behind it
 * @throws OutOfRangeError (a RangeError) when a budget lacks repeat or set-up, or the first figure is not above 0
 * Range: one figure declared before looking; twelve lifts judged one by one would shout in every second comparison of
 * equal ports. Source: JCGM 106:2012 for decision rules; ISO 5725-6 for the critical difference.
 * @example verdictOn('mean', budgetOf(0.1, [{ name: 'repeat', sharedBy: 'reading', degreesOfFreedom: 9, contributionM3PerS: 0.001 }, { name: 'setUp', sharedBy: 'run', degreesOfFreedom: 9, contributionM3PerS: 0.001 }]), budgetOf(0.12, [{ name: 'repeat', sharedBy: 'reading', degreesOfFreedom: 9, contributionM3PerS: 0.001 }, { name: 'setUp', sharedBy: 'run', degreesOfFreedom: 9, contributionM3PerS: 0.001 }]), likeOnOneBench).verdict // 'larger'
 */
export function verdictOn(figure: string, before: Budget, after: Budget, inCommon: InCommon): Verdict {
  for (const { parts } of [before, after])
    for (const name of needed)
      if (!parts.some((part) => part.name === name))
        throw new OutOfRangeError(
          name,
          'A verdict needs repeat and set-up in the uncertainty of both figures.',
        );
  const difference = differenceOf(before, after, inCommon);
  const isOutside = Math.abs(difference.ratio) > difference.expandedRatio;
  const told = isOutside ? 'larger' : 'tooSmall';
  const verdict = difference.isKnown ? told : 'cannotTell';
  return { figure, verdict, words: verdictWords[verdict], rule: decisionRule, difference };
}
