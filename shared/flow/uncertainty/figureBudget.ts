import { type MeanWeights, meanFlow, meanSensitivities } from '@/shared/flow/curve/flowCurve';
import { type Pchip } from '@/shared/flow/curve/pchip';
import { type Budget, type Contribution, type PartName, budgetOf } from '@/shared/flow/uncertainty/budget';
import { rootSumSquares } from '@/shared/flow/uncertainty/propagation';
import { OutOfRangeError } from '@/shared/units/outOfRange';

/** Joins one part of several flows: errors of single readings by squares, errors they share with their signs. */
function joined(parts: readonly { part: Contribution; weight: number }[]): Contribution | null {
  const first = parts[0]?.part;
  if (!first) return null;
  const shares = parts.map(({ part, weight }) => weight * part.contributionM3PerS);
  const contributionM3PerS =
    first.sharedBy === 'reading' ? rootSumSquares(shares) : shares.reduce((sum, share) => sum + share, 0);
  // one pooled spread stands behind every lift, so its freedom does not grow with the number of lifts
  const degreesOfFreedom = Math.min(...parts.map(({ part }) => part.degreesOfFreedom));
  return { name: first.name, sharedBy: first.sharedBy, degreesOfFreedom, contributionM3PerS };
}

/** Budget of a figure made of several flows of one run: Σ w_i·Q_i. Parts of single readings √Σ(w_i·c_i)²; parts that the
 * run, the bench or the calibration share Σ w_i·c_i, which does not shrink with the number of lifts.
 * @param figureM3PerS the figure, m³/s @param budgets one a flow, from flowBudget
 * @param sensitivities w_i, as many, ∂figure/∂Q_i, dimensionless
 * @returns the figure's budget, parts in m³/s @throws OutOfRangeError (a RangeError) when the lists do not match or are empty
 * Range: one run. The curve between the lifts adds an error of its own, which is not in it. Source: GUM 5.1.2, 5.2.2, F.1.2.3.
 * @example figureBudget(0.1, [budgetOf(0.1, [{ name: 'setUp', sharedBy: 'run', degreesOfFreedom: 8, contributionM3PerS: 0.0008 }])], [1]).standardUncertaintyM3PerS // 0.0008
 */
export function figureBudget(
  figureM3PerS: number,
  budgets: readonly Budget[],
  sensitivities: readonly number[],
): Budget {
  if (budgets.length === 0 || budgets.length !== sensitivities.length)
    throw new OutOfRangeError('figure', 'A figure needs a budget and a sensitivity for each flow.');
  const byName = new Map<PartName, { part: Contribution; weight: number }[]>();
  budgets.forEach(({ parts }, i) =>
    parts.forEach((part) => {
      const list = byName.get(part.name) ?? [];
      list.push({ part, weight: sensitivities[i] ?? 0 });
      byName.set(part.name, list);
    }),
  );
  const parts = [...byName.values()].flatMap((list) => joined(list) ?? []);
  return budgetOf(figureM3PerS, parts, {
    isAbsoluteKnown: budgets.every(({ isAbsoluteKnown }) => isAbsoluteKnown),
    cautions: [...new Set(budgets.flatMap(({ cautions }) => cautions))],
  });
}

/** A mean over a run's curve with its budget: meanFlow and figureBudget with meanSensitivities.
 * @param curve from flowCurve, with or without an added zero @param weights from liftRangeWeights or camWeights
 * @param budgets one a tested lift, by rising lift, the added zero left out
 * @returns the figure's budget, m³/s @throws OutOfRangeError (a RangeError) when the lists do not match
 * Range: as meanFlow. Source: as figureBudget.
 * @example meanBudget(flowCurve([{ liftM: 1, flowM3PerS: 2 }]), liftRangeWeights([0, 1], 0, 1), [budgetOf(2, [{ name: 'setUp', sharedBy: 'run', degreesOfFreedom: 8, contributionM3PerS: 0.02 }])]).standardUncertaintyM3PerS // 0.01
 */
export function meanBudget(
  curve: Pchip & { hasAddedZero: boolean },
  weights: MeanWeights,
  budgets: readonly Budget[],
): Budget {
  const sensitivities = meanSensitivities(curve, weights).slice(curve.hasAddedZero ? 1 : 0);
  const figure = figureBudget(meanFlow(curve, weights), budgets, sensitivities);
  if (weights.heldShare > 0)
    figure.cautions.push('The cam lifts above the highest tested lift: the last flow is held there.');
  return figure;
}
