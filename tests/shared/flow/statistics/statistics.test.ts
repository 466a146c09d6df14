import fc from 'fast-check';
import { mean, sampleStandardDeviation, tTestTwoSample } from 'simple-statistics';
import {
  checkLimits,
  ewmaChart,
  individualsLimits,
  judgeCheck,
  movingRangeFreedom,
} from '@/shared/flow/statistics/controlChart';
import { grubbs, grubbsCritical } from '@/shared/flow/statistics/grubbs';
import {
  pooledRelativeRepeatability,
  pooledRepeatability,
  sampleOf,
} from '@/shared/flow/statistics/sampleStatistics';
import { twoSampleT } from '@/shared/flow/statistics/twoSampleT';
import { seededRandom } from '@/tests/factories/seededRandom';
import vectors from '@/tests/vectors/statistics.json';

const within = (got: number, expected: number, tolerance: number) =>
  expect(Math.abs(got - expected)).toBeLessThanOrEqual(tolerance);
const values = fc.array(
  fc.integer({ min: -9999, max: 9999 }).map((n) => n / 10),
  { minLength: 2, maxLength: 30 },
);

describe('samples', () => {
  it('agree with simple-statistics', () => {
    fc.assert(
      fc.property(values, (list) => {
        const ours = sampleOf(list);
        within(ours.mean, mean(list), 1e-9);
        within(ours.standardDeviation!, sampleStandardDeviation(list), 1e-9);
      }),
    );
  });
  it('of one value say nothing of spread', () => {
    expect(sampleOf([3])).toEqual({ mean: 3, standardDeviation: null, count: 1 });
  });
  it('are pooled by their degrees of freedom, singles left out', () => {
    const pooled = pooledRepeatability([[1, 3], [5], [], [10, 11, 12]]);
    expect(pooled?.degreesOfFreedom).toBe(3);
    within(pooled!.standardDeviation, Math.sqrt((2 + 2) / 3), 1e-14); // Σ squares 2 and 2 over 1 + 2
    expect(pooledRepeatability([[1], [2]])).toBeNull();
    expect(pooledRelativeRepeatability([[], [2]])).toBeNull();
  });
  it('pooled in percent do not mind the size of the flow', () => {
    const one = pooledRelativeRepeatability([
      [99, 101],
      [40, 41],
    ])!;
    const two = pooledRelativeRepeatability([
      [990, 1010],
      [4, 4.1],
    ])!;
    within(one.standardDeviation, two.standardDeviation, 1e-15);
  });
  it('refuse nothing, what is no number, and a flow of 0 in percent', () => {
    expect(() => sampleOf([])).toThrow(RangeError);
    expect(() => sampleOf([1, Number.NaN])).toThrow(RangeError);
    expect(() => pooledRelativeRepeatability([[0, 1]])).toThrow(RangeError);
  });
});

describe('two-sample t', () => {
  const { first, second, t, tTolerance, degreesOfFreedom } = vectors.twoSampleT;
  it('comes out as printed for AUTO83B [std]', () => {
    const got = twoSampleT(first, second, { equalSpread: true });
    within(got.t, t, tTolerance);
    expect(got.degreesOfFreedom).toBe(degreesOfFreedom);
    within(got.t, tTestTwoSample(first, second)!, 1e-9);
    expect(got.differs).toBe(true);
    expect(got.pValue).toBeGreaterThan(0);
    expect(got.pValue).toBeLessThan(1e-20);
  });
  it('by Welch has no more freedom than pooled and no less than the smaller sample', () => {
    const got = twoSampleT(first, second, { equalSpread: false });
    expect(got.degreesOfFreedom).toBeLessThan(degreesOfFreedom);
    expect(got.degreesOfFreedom).toBeGreaterThan(second.length - 1);
  });
  it('shouts at the level asked for when the means are alike', () => {
    const { normal } = seededRandom(11);
    const draw = (n: number) => Array.from({ length: n }, normal);
    let shouts = 0;
    for (let i = 0; i < 4000; i++) if (twoSampleT(draw(5), draw(7), { equalSpread: true }).differs) shouts++;
    within(shouts / 4000, 0.05, 0.012);
  });
  it('refuses samples of one, and samples that do not spread', () => {
    expect(() => twoSampleT([1], [1, 2], { equalSpread: true })).toThrow(RangeError);
    expect(() => twoSampleT([1, 1], [2, 2], { equalSpread: true })).toThrow(RangeError);
  });
});

describe('Grubbs’ test', () => {
  const example = vectors.grubbs;
  it('comes out as printed [std]', () => {
    const got = grubbs(example.values, { side: 'highest' });
    within(got.statistic, example.statistic, example.statisticTolerance);
    within(got.critical, example.critical, example.criticalTolerance);
    expect([got.index, got.isOutlier]).toEqual([example.index, true]);
  });
  it('looks at the end it is asked about', () => {
    expect(grubbs(example.values, { side: 'lowest' }).isOutlier).toBe(false);
    expect(
      grubbs(
        example.values.map((v) => -v),
        { side: 'lowest' },
      ).index,
    ).toBe(example.index);
    expect(grubbsCritical(8, 'either', 0.05)).toBeGreaterThan(grubbsCritical(8, 'highest', 0.05));
  });
  it('finds no outlier where all are alike, and refuses two values', () => {
    expect(grubbs([2, 2, 2])).toMatchObject({ statistic: 0, isOutlier: false });
    expect(() => grubbs([1, 2])).toThrow(RangeError);
  });
});

describe('charts of checks', () => {
  const given = { reference: 200, tolerance: 3, resolution: 1 };
  it('individuals come out as printed [std]', () => {
    const e = vectors.individuals;
    const got = individualsLimits(e.values);
    within(got.centre, e.centre, e.centreTolerance);
    within(got.movingRangeMean, e.movingRangeMean, e.movingRangeTolerance);
    within(got.upper, e.upper, e.limitTolerance);
    within(got.lower, e.lower, e.limitTolerance);
  });
  it('EWMA comes out as printed [std]', () => {
    const e = vectors.ewma;
    const got = ewmaChart(e.values, { target: e.target, sd: e.sd });
    within(got.upper, e.upper, e.limitTolerance);
    within(got.lower, e.lower, e.limitTolerance);
    got.averages.forEach((average, i) => within(average, e.printed[i]!, e.printedTolerance));
    expect(got.outside).toEqual([]);
  });
  it('EWMA points at the averages outside, and keeps the step of the instrument as floor', () => {
    expect(ewmaChart([60, 60, 50], { target: 50, sd: 1 }).outside).toEqual([0, 1, 2]);
    expect(ewmaChart([50], { target: 50, sd: 0, resolution: 1 })).toMatchObject({ lower: 49, upper: 51 });
  });
  it('five points alone would cry wolf in 5.8 % of checks', () => {
    const { normal } = seededRandom(5);
    let wolves = 0;
    for (let i = 0; i < 20000; i++) {
      const { lower, upper } = individualsLimits(Array.from({ length: 5 }, normal));
      const next = normal();
      if (next < lower || next > upper) wolves++;
    }
    within(wolves / 20000, 0.058, 0.005);
  });
  it('own history of 15 or 40 points gives about the 0.27 % of three standard deviations', () => {
    const { normal } = seededRandom(15);
    for (const count of [15, 40]) {
      let wolves = 0;
      for (let i = 0; i < 8000; i++) {
        const history = Array.from({ length: count }, () => 200 + normal());
        const { lower, upper } = checkLimits(history, { ...given, resolution: 0 });
        const next = 200 + normal();
        if (next < lower || next > upper) wolves++;
      }
      within(wolves / 8000, 0.0027, 0.0019);
    }
  });
  it('knows the freedom of a mean moving range from a simulation', () => {
    const { normal } = seededRandom(3);
    const means = Array.from(
      { length: 8000 },
      () => individualsLimits(Array.from({ length: 20 }, normal)).movingRangeMean,
    );
    const { mean: centre, standardDeviation } = sampleOf(means);
    within(centre ** 2 / standardDeviation! ** 2 / 2 / movingRangeFreedom(20), 1, 0.05);
  });
  it('let the stated tolerance govern below 15 points, the reference standing in for no points', () => {
    expect(checkLimits([], given)).toMatchObject({ lower: 197, upper: 203, governedBy: 'tolerance' });
    expect(checkLimits([201, 203], given)).toMatchObject({ lower: 199, upper: 205, governedBy: 'tolerance' });
    expect(checkLimits(new Array(14).fill(200), given).governedBy).toBe('tolerance');
  });
  it('never go below one step of a coarse instrument', () => {
    expect(checkLimits(new Array(20).fill(201), given)).toMatchObject({
      lower: 200,
      upper: 202,
      governedBy: 'resolution',
    });
  });
  it('tell steady from right: a bench may be one and not the other', () => {
    const high = Array.from({ length: 20 }, (_, i) => 205 + (i % 2));
    expect(judgeCheck(205, high, given)).toMatchObject({ isSteady: true, isRight: false });
    expect(judgeCheck(200, high, given)).toMatchObject({ isSteady: false, isRight: true });
  });
  it('refuse numbers outside their ranges', () => {
    expect(() => individualsLimits([1])).toThrow(RangeError);
    expect(() => movingRangeFreedom(1)).toThrow(RangeError);
    expect(() => checkLimits([1, Number.NaN], given)).toThrow(RangeError);
    expect(() => checkLimits([], { ...given, tolerance: 0 })).toThrow(RangeError);
    expect(() => judgeCheck(Number.NaN, [], given)).toThrow(RangeError);
    expect(() => ewmaChart([1], { target: 1, sd: 1, lambda: 0 })).toThrow(RangeError);
    expect(() => ewmaChart([Number.NaN], { target: 1, sd: 1 })).toThrow(RangeError);
  });
});
