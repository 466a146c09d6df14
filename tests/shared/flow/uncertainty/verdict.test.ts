import { flowCurve, liftRangeWeights, meanFlow } from '@/shared/flow/curve/flowCurve';
import { fitLine } from '@/shared/flow/statistics/lineFit';
import { pooledRelativeRepeatability, sampleOf } from '@/shared/flow/statistics/sampleStatistics';
import { type Budget, type Contribution, budgetOf } from '@/shared/flow/uncertainty/budget';
import { type CalibrationKnown, calibrationParts } from '@/shared/flow/uncertainty/calibrationParts';
import { differenceOf, likeOnOneBench } from '@/shared/flow/uncertainty/difference';
import { figureBudget, meanBudget } from '@/shared/flow/uncertainty/figureBudget';
import { type RelativeSpread, flowBudget } from '@/shared/flow/uncertainty/flowBudget';
import { decisionRule, verdictOn, verdictWords } from '@/shared/flow/uncertainty/verdict';
import { flowBudgetInput } from '@/tests/factories/flowBudgetInput';
import { seededRandom } from '@/tests/factories/seededRandom';

const within = (got: number, expected: number, tolerance: number) =>
  expect(Math.abs(got - expected)).toBeLessThanOrEqual(tolerance);
const part = (
  name: Contribution['name'],
  sharedBy: Contribution['sharedBy'],
  contributionM3PerS: number,
  degreesOfFreedom = 20,
): Contribution => ({ name, sharedBy, degreesOfFreedom, contributionM3PerS });
/** a flow with 0.4 % repeat, 0.8 % set-up and a factor of 3 % */
const plain = (flow: number, factor = 0.03) =>
  budgetOf(flow, [
    part('repeat', 'reading', 0.004 * flow),
    part('setUp', 'run', 0.008 * flow),
    part('calibration', 'calibration', factor * flow),
  ]);

describe('figures of several lifts', () => {
  const budgets = [0.05, 0.05, 0.05, 0.05].map((flow) => plain(flow));
  const quarter = [0.25, 0.25, 0.25, 0.25];
  it('average the repeat away but not what the run shares', () => {
    const shares = figureBudget(0.05, budgets, quarter).parts.map((p) => p.contributionM3PerS / 0.05);
    within(shares[0]!, 0.002, 1e-15);
    within(shares[1]!, 0.008, 1e-15);
    within(shares[2]!, 0.03, 1e-15);
  });
  it('keep the freedom of the one pooled spread', () => {
    expect(figureBudget(0.05, budgets, quarter).parts.map((p) => p.degreesOfFreedom)).toEqual([20, 20, 20]);
  });
  it('take a lift zero with the sign of the curve: past a stall it takes away', () => {
    const at = (c: number) => budgetOf(0.05, [part('liftZero', 'run', c)]);
    within(figureBudget(0.05, [at(0.001), at(-0.001)], [0.5, 0.5]).standardUncertaintyM3PerS, 0, 1e-18);
  });
  it('refuse lists that do not match', () => {
    expect(() => figureBudget(0.05, budgets, [1])).toThrow(RangeError);
    expect(() => figureBudget(0.05, [], [])).toThrow(RangeError);
  });
});

describe('differences', () => {
  it('in percent lose a pure factor on one bench, and keep it otherwise', () => {
    const alike = differenceOf(plain(0.1), plain(0.106), likeOnOneBench);
    const stays = differenceOf(plain(0.1, 0), plain(0.106, 0), likeOnOneBench);
    within(alike.ratio, 0.06, 1e-12);
    within(alike.standardUncertaintyRatio, stays.standardUncertaintyRatio, 1e-12);
    within(alike.standardUncertaintyRatio, 1.06 * Math.SQRT2 * Math.hypot(0.004, 0.008), 1e-12);
    for (const key of [
      'bench',
      'calibration',
      'setting',
      'range',
      'direction',
      'element',
      'likePressure',
    ] as const) {
      const unlike = differenceOf(plain(0.1), plain(0.106), { ...likeOnOneBench, [key]: false });
      expect(unlike.standardUncertaintyRatio).toBeGreaterThan(3 * alike.standardUncertaintyRatio);
      expect(unlike.cautions).toHaveLength(1);
    }
  });
  it('of a line keep only its slope between the two flows', () => {
    const fit = fitLine(
      [0.02, 0.05, 0.08, 0.11].map((x, i) => ({ x, y: 0.002 + x + (i % 2 ? 0.001 : -0.001) })),
    );
    const known: CalibrationKnown = { grade: 'comparative', referenceRatio: 0, fit };
    const at = (x: number) => {
      const y = fit.intercept + fit.slope * x;
      return budgetOf(y, calibrationParts(known, x, y).parts);
    };
    const { standardUncertaintyM3PerS } = differenceOf(at(0.06), at(0.075), likeOnOneBench);
    within(standardUncertaintyM3PerS, 0.015 * fit.slopeSd!, 1e-15);
  });
  it('lose the instruments’ errors only with the same instruments, and the set-up only within a run', () => {
    const at = (flow: number) =>
      budgetOf(flow, [part('gaugeSpan', 'bench', 0.01 * flow), part('setUp', 'run', 0.008 * flow)]);
    const u = (over: Partial<typeof likeOnOneBench>) =>
      differenceOf(at(0.1), at(0.1), { ...likeOnOneBench, ...over }).standardUncertaintyRatio;
    within(u({}), Math.SQRT2 * 0.008, 1e-15);
    within(u({ instruments: false }), Math.SQRT2 * Math.hypot(0.008, 0.01), 1e-15);
    within(u({ run: true }), 0, 1e-15);
  });
  it('of two benches give each its own freedom', () => {
    const at = (nu: number) => budgetOf(0.1, [part('repeat', 'reading', 0.001, nu)]);
    const freedom = (bench: boolean) =>
      differenceOf(at(6), at(6), { ...likeOnOneBench, bench }).degreesOfFreedom;
    within(freedom(true), 6, 1e-9);
    within(freedom(false), 12, 1e-9);
  });
  it('carry a part that only one side has', () => {
    const one = budgetOf(0.1, [part('outsideCalibration', 'calibration', 0.002)]);
    within(differenceOf(one, budgetOf(0.1, []), likeOnOneBench).standardUncertaintyM3PerS, 0.002, 1e-15);
    expect(() => differenceOf(budgetOf(0, []), one, likeOnOneBench)).toThrow(RangeError);
  });
  it('agree with a simulation in which both sides share bench, gauge and calibration, within 3 %', () => {
    const { normal } = seededRandom(77);
    const [a, b] = [
      flowBudgetInput({ standardDropPa: 6476.3 }),
      flowBudgetInput({ standardDropPa: 6476.3, flowM3PerS: 0.086, indicated: 178 }),
    ];
    const got = differenceOf(flowBudget(a), flowBudget(b), likeOnOneBench);
    const draws = Array.from({ length: 30000 }, () => {
      const shared = {
        zero: a.gaugeZeroPa * normal(),
        span: 0.005 * normal(),
        air: 0.004 * normal(),
        factor: 0.025 * normal(),
      };
      const [first = 0, second = 0] = [a, b].map((side) => {
        const indicated = side.indicated + normal() / Math.sqrt(12);
        const drop = side.testDropPa + (24.9 / Math.sqrt(12)) * normal() + shared.zero;
        const gross =
          (side.flowM3PerS + side.leakM3PerS) *
          (indicated / side.indicated) *
          Math.sqrt(side.testDropPa / (drop * (1 + shared.span))) *
          Math.sqrt(1 + shared.air) *
          (1 + shared.factor);
        const lift =
          ((side.liftStepM / Math.sqrt(12)) * normal() + side.liftZeroM * normal()) * side.slopeM3PerSPerM;
        const leak = side.leakM3PerS + side.leakUncertaintyM3PerS * normal();
        return (gross - leak) * (1 + 0.004 * normal() + 0.008 * normal()) + lift;
      });
      return second / first - 1;
    });
    within(got.standardUncertaintyRatio / sampleOf(draws).standardDeviation!, 1, 0.03);
  });
});

describe('the verdict', () => {
  it('says larger outside the expanded uncertainty and too small inside, in the words of the trade', () => {
    const small = verdictOn('mean 0.200 to 0.500 in', plain(0.1), plain(0.102), likeOnOneBench);
    const large = verdictOn('mean 0.200 to 0.500 in', plain(0.1), plain(0.106), likeOnOneBench);
    expect([small.verdict, small.words]).toEqual(['tooSmall', 'too small to tell on this bench']);
    expect([large.verdict, large.words]).toEqual(['larger', 'larger than this bench’s error']);
    expect(large.rule).toBe(decisionRule);
    expect(verdictOn('loss', plain(0.1), plain(0.094), likeOnOneBench).verdict).toBe('larger');
  });
  it('of two uncalibrated benches cannot be told, on one it can', () => {
    const unknown = (flow: number) => ({ ...plain(flow, 0), isAbsoluteKnown: false });
    const apart = verdictOn('mean', unknown(0.1), unknown(0.12), { ...likeOnOneBench, bench: false });
    expect([apart.verdict, apart.words]).toEqual(['cannotTell', verdictWords.cannotTell]);
    expect(verdictOn('mean', unknown(0.1), unknown(0.12), likeOnOneBench).verdict).toBe('larger');
  });
  it('is refused without repeat and set-up in both figures', () => {
    const bare = budgetOf(0.1, [part('repeat', 'reading', 0.001)]);
    expect(() => verdictOn('mean', plain(0.1), bare, likeOnOneBench)).toThrow(RangeError);
  });
});

describe('coverage', () => {
  const liftsM = [0.00127, 0.00254, 0.00508, 0.00762, 0.01016, 0.0127];
  const truthM3PerS = [0.0151, 0.0302, 0.059, 0.084, 0.1015, 0.1119];
  const weights = liftRangeWeights([0, ...liftsM], 0.00508, 0.0127);
  const [repeatSd, setUpSd, factorSd] = [0.006, 0.008, 0.02];
  const curveOf = (flows: readonly number[]) =>
    flowCurve(flows.map((flowM3PerS, i) => ({ liftM: liftsM[i]!, flowM3PerS })));
  const truth = meanFlow(curveOf(truthM3PerS), weights);

  /** One shop: repeat and set-up found from its own few pulls, then a run before and a run after on an equal port. */
  function shop(random: { normal: () => number }) {
    const pulls = Array.from({ length: 5 }, () =>
      Array.from({ length: 3 }, () => 1 + repeatSd * random.normal()),
    );
    const mounts = [Array.from({ length: 9 }, () => 1 + setUpSd * random.normal())];
    const spread = (groups: number[][]): RelativeSpread => {
      const found = pooledRelativeRepeatability(groups)!;
      return { ratio: found.standardDeviation, degreesOfFreedom: found.degreesOfFreedom };
    };
    const [repeat, setUp] = [spread(pulls), spread(mounts)];
    const factor = 1 + factorSd * random.normal();
    const run = (): Budget => {
      const mounted = 1 + setUpSd * random.normal();
      const flows = truthM3PerS.map((flow) => flow * factor * mounted * (1 + repeatSd * random.normal()));
      const budgets = flows.map((flowM3PerS) =>
        flowBudget({
          ...flowBudgetInput({ leakM3PerS: 0, leakUncertaintyM3PerS: 0, gaugeZeroPa: 0, gaugeSpanRatio: 0 }),
          ...{
            flowM3PerS,
            repeat,
            setUp,
            indicatedStep: 0,
            pressureStepPa: 0,
            liftStepM: 0,
            liftZeroM: 0,
            airRatio: 0,
          },
          standardDropPa: 6476.3,
          calibration: { grade: 'traceable', referenceRatio: factorSd },
        }),
      );
      return meanBudget(curveOf(flows), weights, budgets);
    };
    return { before: run(), after: run() };
  }

  it('of the figure and of the difference of equal ports is 93 to 97 % at 95 %', () => {
    const random = seededRandom(314);
    const count = 2500;
    let figure = 0;
    let difference = 0;
    for (let i = 0; i < count; i++) {
      const { before, after } = shop(random);
      if (Math.abs(before.flowM3PerS - truth) <= before.expandedM3PerS) figure++;
      if (verdictOn('mean', before, after, likeOnOneBench).verdict === 'tooSmall') difference++;
    }
    within(figure / count, 0.95, 0.02);
    within(difference / count, 0.95, 0.02);
  });

  it('warns when a cam lifts above the highest tested lift', () => {
    const budgets = truthM3PerS.map((flow) => plain(flow));
    const held = { ...weights, heldShare: 0.2 };
    expect(meanBudget(curveOf(truthM3PerS), held, budgets).cautions).toHaveLength(1);
    expect(meanBudget(curveOf(truthM3PerS), weights, budgets).cautions).toHaveLength(0);
  });
});
