import fc from 'fast-check';
import { linearRegression } from 'simple-statistics';
import {
  type Fit,
  type FitPoint,
  fitLine,
  fitThroughZero,
  predictionInterval,
  valueOnLine,
} from '@/shared/flow/statistics/lineFit';
import vectors from '@/tests/vectors/lineFits.json';

const fits = { fitLine, fitThroughZero } as Record<string, (points: readonly FitPoint[]) => Fit>;
const numberOf = (fit: Fit, of: string) => (fit as unknown as Record<string, number | null>)[of]!;

// source: tests/vectors/lineFits.json, a source and a mark on each fit
const lines = vectors.cases.flatMap(({ name, fn, points, mark, expected }) =>
  expected.map((line) => ({ name, fn, points, mark, ...line })),
);
it.each(lines)('$name: $of is $value [$mark]', ({ fn, points, of, value, tolerance }) => {
  expect(Math.abs(numberOf(fits[fn]!(points), of) - value)).toBeLessThanOrEqual(tolerance);
});

// source: JCGM 100:2008 H.3.4 [std]
it('corrects the thermometer at 30 °C as the GUM does', () => {
  const { points, at } = vectors.cases.find(({ name }) => name === 'GUM H.3')!;
  for (const { x, y, yTolerance, lineSd, lineSdTolerance } of at!) {
    const got = valueOnLine(fitLine(points), x);
    expect(Math.abs(got.y - y)).toBeLessThanOrEqual(yTolerance);
    expect(Math.abs(got.lineSd! - lineSd)).toBeLessThanOrEqual(lineSdTolerance);
  }
});

const coordinate = fc.integer({ min: -5000, max: 5000 }).map((n) => n / 10);
const cloud = fc
  .array(fc.record({ x: coordinate, y: coordinate }), { minLength: 3, maxLength: 20 })
  .filter((points) => new Set(points.map(({ x }) => x)).size > 1);

it('agrees with simple-statistics on any cloud of points', () => {
  fc.assert(
    fc.property(cloud, (points) => {
      const theirs = linearRegression(points.map(({ x, y }) => [x, y]));
      const ours = fitLine(points);
      // theirs subtracts large sums, so it loses digits where x hardly spreads
      expect(Math.abs(ours.slope - theirs.m)).toBeLessThan(1e-5 * (1 + Math.abs(theirs.m)));
    }),
  );
});

it('has residuals that sum to zero and are blind to x', () => {
  fc.assert(
    fc.property(cloud, (points) => {
      const { residuals } = fitLine(points);
      const size = points.reduce((sum, { y }) => sum + Math.abs(y), 1);
      expect(Math.abs(residuals.reduce((sum, r) => sum + r, 0))).toBeLessThan(1e-9 * size);
      expect(Math.abs(residuals.reduce((sum, r, i) => sum + r * points[i]!.x, 0))).toBeLessThan(1e-6 * size);
    }),
  );
});

it('takes a stated uncertainty as a weight: a doubled point counts as one of u/√2', () => {
  const at = (u: number) => ({ x: 4, y: 9, u });
  const others = [
    { x: 1, y: 2, u: 1 },
    { x: 2, y: 3, u: 1 },
  ];
  const doubled = fitLine([...others, at(1), at(1)]);
  const weighted = fitLine([...others, at(Math.SQRT1_2)]);
  expect(weighted.slope).toBeCloseTo(doubled.slope, 12);
  expect(weighted.interceptSd).toBeCloseTo(doubled.interceptSd!, 12);
});

it('turns with the units of x and y', () => {
  fc.assert(
    fc.property(cloud, fc.double({ min: 0.01, max: 100, noNaN: true }), (points, k) => {
      const plain = fitLine(points);
      const scaled = fitLine(points.map(({ x, y }) => ({ x, y: k * y })));
      expect(scaled.slope).toBeCloseTo(k * plain.slope, 6);
      expect(Math.abs(scaled.slopeSd! - k * plain.slopeSd!)).toBeLessThan(1e-9 * (1 + k * plain.slopeSd!));
    }),
  );
});

it('says that two points leave no spread to judge by', () => {
  const fit = fitLine([
    { x: 1, y: 1 },
    { x: 2, y: 3 },
  ]);
  expect([fit.slope, fit.slopeSd, fit.residualSd, fit.chiSquared]).toEqual([2, null, null, null]);
  expect(valueOnLine(fit, 3)).toEqual({ y: 5, lineSd: null });
  expect(predictionInterval(fit, 3)).toBeNull();
});

it('widens the prediction away from the centre and with the level', () => {
  const fit = fitLine(vectors.cases[0]!.points);
  const half = (x: number, level?: number) => predictionInterval(fit, x, { level })!.halfWidth;
  expect(half(1500)).toBeGreaterThan(half(450));
  expect(half(450, 0.99)).toBeGreaterThan(half(450));
  // ν = 34: t 2.032245 [std]; at the centre of x the line adds s/√36
  expect(half(fit.centreX)).toBeCloseTo(2.0322445 * fit.residualSd! * Math.sqrt(1 + 1 / 36), 6);
});

it('asks for the uncertainty of the new observation where the points state theirs', () => {
  const fit = fitThroughZero([{ x: 2, y: 4, u: 0.1 }]);
  expect(() => predictionInterval(fit, 2)).toThrow(RangeError);
  expect(predictionInterval(fit, 2, { newUncertainty: 0 })?.halfWidth).toBeCloseTo(0.1959964, 7);
});

it.each([
  ['one point only', () => fitLine([{ x: 1, y: 1 }])],
  ['one x only', () => fitLine([1, 2, 3].map((y) => ({ x: 0.1, y })))],
  ['no point away from zero', () => fitThroughZero([{ x: 0, y: 1 }])],
  ['no points', () => fitThroughZero([])],
  ['a value that is no number', () => fitLine([1, 2, Number.NaN].map((x) => ({ x, y: x })))],
  ['an uncertainty of 0', () => fitLine([1, 2, 3].map((x) => ({ x, y: x, u: 0 })))],
  [
    'uncertainties on some points',
    () =>
      fitLine([
        { x: 1, y: 1, u: 1 },
        { x: 2, y: 2 },
        { x: 3, y: 1 },
      ]),
  ],
  ['x that is no number', () => valueOnLine(fitLine([1, 2].map((x) => ({ x, y: x }))), Number.NaN)],
])('refuses %s', (_what, act) => {
  expect(act).toThrow(RangeError);
});
