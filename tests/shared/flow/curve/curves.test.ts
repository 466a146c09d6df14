import fc from 'fast-check';
import {
  camWeights,
  flowAtLift,
  flowCurve,
  liftRangeWeights,
  meanFlow,
  meanSensitivities,
} from '@/shared/flow/curve/flowCurve';
import { type LiftLaw, liftEventOfLaw, liftEventOfTable } from '@/shared/flow/curve/liftEvent';
import {
  hermiteIntegrals,
  hermiteShapes,
  pchip,
  pchipIntegral,
  pchipSlope,
  pchipSlopes,
  pchipValue,
  pieceAt,
} from '@/shared/flow/curve/pchip';
import vectors from '@/tests/vectors/curves.json';

const within = (got: number, expected: number, tolerance: number) =>
  expect(Math.abs(got - expected)).toBeLessThanOrEqual(tolerance);
const inch = 0.0254;
const set = vectors.liftFlow;
const inInches = pchip(set.liftsIn, set.flowsCfm);
const curve = flowCurve(
  set.liftsIn.map((liftIn, i) => ({ liftM: liftIn * inch, flowM3PerS: set.flowsCfm[i]! })),
);
const laws: LiftLaw[] = ['halfSine', 'sineSquared', 'cycloidal', 'polynomial345'];

describe('PCHIP', () => {
  const { nag, scipy } = vectors;
  it('prints what the NAG example prints [std]', () => {
    const fitted = pchip(nag.xs, nag.ys);
    nag.at.forEach((x, i) => within(pchipValue(fitted, x), nag.values[i]!, nag.tolerance));
  });
  it('has the values, slopes and area of the lift-flow set [lib]', () => {
    for (const { liftIn, cfm, tolerance } of set.values) within(pchipValue(inInches, liftIn), cfm, tolerance);
    within(pchipIntegral(inInches, 0, 0.6), set.area, set.areaTolerance);
    inInches.slopes.forEach((slope, i) => within(slope, set.slopes[i]!, 1e-9));
  });
  it.each(scipy.cases)(
    'agrees with SciPy on made-up points [lib] %#',
    ({ xs, ys, at, values, slopes, ...rest }) => {
      const fitted = pchip(xs, ys);
      at.forEach((x, i) => {
        const inside = Math.min(x, xs.at(-1)!);
        within(pchipValue(fitted, inside), values[i]!, rest.tolerance);
        within(pchipSlope(fitted, inside), slopes[i]!, rest.tolerance * 10);
      });
      within(pchipIntegral(fitted, xs[0]!, xs.at(-1)!), rest.integral, rest.tolerance * 10);
    },
  );

  const points = fc
    .array(fc.record({ gap: fc.integer({ min: 1, max: 400 }), y: fc.integer({ min: -999, max: 999 }) }), {
      minLength: 2,
      maxLength: 14,
    })
    .map((list) => {
      let x = 0;
      return list.map(({ gap, y }) => ({ x: (x += gap / 100), y }));
    });
  const share = fc.double({ min: 0, max: 1, noNaN: true });

  it('never swings past the two points beside it, and rises only where they rise', () => {
    fc.assert(
      fc.property(points, share, share, (list, a, b) => {
        const fitted = pchip(
          list.map(({ x }) => x),
          list.map(({ y }) => y),
        );
        for (let i = 0; i + 1 < list.length; i++) {
          const [p, q] = [list[i]!, list[i + 1]!];
          const at = (s: number) => pchipValue(fitted, Math.min(q.x, p.x + s * (q.x - p.x)));
          expect(at(a)).toBeGreaterThanOrEqual(Math.min(p.y, q.y) - 1e-9);
          expect(at(a)).toBeLessThanOrEqual(Math.max(p.y, q.y) + 1e-9);
          const [low, high] = a < b ? [a, b] : [b, a];
          expect((at(high) - at(low)) * (q.y - p.y)).toBeGreaterThanOrEqual(-1e-6);
        }
      }),
    );
  });
  it('has an integral whose growth is the value, whose parts add up and whose sign turns with its ends', () => {
    fc.assert(
      fc.property(points, share, (list, s) => {
        const fitted = pchip(
          list.map(({ x }) => x),
          list.map(({ y }) => y),
        );
        const [start, end] = [list[0]!.x, list.at(-1)!.x];
        const middle = Math.min(end, start + s * (end - start));
        const whole = pchipIntegral(fitted, start, end);
        within(pchipIntegral(fitted, start, middle) + pchipIntegral(fitted, middle, end), whole, 1e-7);
        expect(pchipIntegral(fitted, end, start)).toBe(-whole);
      }),
    );
    within(pchipIntegral(inInches, 0.21, 0.2100001) / 1e-7, pchipValue(inInches, 0.21), 1e-3);
  });
  it('turns with the units of x and y', () => {
    fc.assert(
      fc.property(points, share, fc.double({ min: 0.01, max: 50, noNaN: true }), (list, s, k) => {
        const xs = list.map(({ x }) => x);
        const ys = list.map(({ y }) => y);
        const x = Math.min(xs.at(-1)!, xs[0]! + s * (xs.at(-1)! - xs[0]!));
        within(
          pchipValue(
            pchip(
              xs,
              ys.map((y) => k * y),
            ),
            x,
          ),
          k * pchipValue(pchip(xs, ys), x),
          1e-6,
        );
      }),
    );
  });
  it('is a straight line through two points', () => {
    expect(pchipSlopes([0, 2], [1, 5])).toEqual([2, 2]);
    expect(pchipValue(pchip([0, 2], [1, 5]), 0.5)).toBe(2);
  });
  it('has shapes that sum to one and integrals that are their integrals', () => {
    const [a, , c] = hermiteShapes(0.37, 2);
    within(a + c, 1, 1e-15);
    hermiteIntegrals(0.6, 2).forEach((whole, k) => {
      let sum = 0;
      for (let i = 0; i < 6000; i++) sum += hermiteShapes(0.6 * ((i + 0.5) / 6000), 2)[k]! * 2 * (0.6 / 6000);
      within(sum, whole, 1e-7);
    });
    expect([pieceAt([0, 1, 2], 0), pieceAt([0, 1, 2], 1), pieceAt([0, 1, 2], 2)]).toEqual([0, 1, 1]);
  });
  it.each([
    ['one point', () => pchip([1], [1])],
    ['x that stands still', () => pchip([1, 1], [1, 2])],
    ['lists that do not match', () => pchip([1, 2], [1])],
    ['no number', () => pchip([1, 2], [1, Number.NaN])],
    ['a place before the points', () => pchipValue(inInches, -0.01)],
    ['a place past the points', () => pchipSlope(inInches, 0.61)],
    ['an area past the points', () => pchipIntegral(inInches, 0, 0.61)],
  ])('refuses %s', (_what, act) => expect(act).toThrow(RangeError));
});

describe('flow at a lift', () => {
  it('is marked as tested, interpolated or outside', () => {
    expect(flowAtLift(curve, 0.3 * inch)).toMatchObject({ flowM3PerS: 178, how: 'tested' });
    const between = flowAtLift(curve, 0.15 * inch);
    expect(between.how).toBe('interpolated');
    within(between.flowM3PerS!, 95.2389647, 5e-8);
    expect(flowAtLift(curve, 0.61 * inch)).toEqual({
      flowM3PerS: null,
      slopeM3PerSPerM: null,
      how: 'outside',
    });
  });
  it('takes lifts in any order and closes the valve at lift 0', () => {
    const shuffled = flowCurve([
      { liftM: 0.002, flowM3PerS: 3 },
      { liftM: 0.001, flowM3PerS: 2 },
    ]);
    expect(shuffled).toMatchObject({ xs: [0, 0.001, 0.002], ys: [0, 2, 3], hasAddedZero: true });
    expect(flowAtLift(shuffled, 0)).toMatchObject({ flowM3PerS: 0, how: 'interpolated' });
    expect(curve.hasAddedZero).toBe(false);
    expect(flowAtLift(curve, 0).how).toBe('tested');
  });
  it('refuses no reading, a lift twice, a lift below 0', () => {
    const at = (...lifts: number[]) => flowCurve(lifts.map((liftM) => ({ liftM, flowM3PerS: 1 })));
    expect(() => at()).toThrow(RangeError);
    expect(() => at(1, 1)).toThrow(RangeError);
    expect(() => at(-1, 1)).toThrow(RangeError);
    expect(() => at(0)).toThrow(RangeError);
    expect(() => flowAtLift(at(1), -0.1)).toThrow(RangeError);
  });
});

describe('mean over a lift range', () => {
  it.each(vectors.ranges)('$fromIn to $toIn in: $cfm cfm [$mark]', ({ fromIn, toIn, cfm, tolerance }) => {
    const weights = liftRangeWeights(curve.xs, fromIn * inch, toIn * inch);
    within(meanFlow(curve, weights), cfm, tolerance);
  });
  it('refuses a range that is empty or leaves the tested lifts, and weights of other lifts', () => {
    expect(() => liftRangeWeights(curve.xs, 0.003, 0.003)).toThrow(RangeError);
    expect(() => liftRangeWeights(curve.xs, 0.003, 0.02)).toThrow(RangeError);
    expect(() => meanFlow(curve, liftRangeWeights([0, 1], 0, 1))).toThrow(RangeError);
  });
});

describe('cam-weighted mean', () => {
  const cam = (law: LiftLaw, peakM: number, on = curve) =>
    meanFlow(on, camWeights(on.xs, liftEventOfLaw(law, peakM)));
  it.each(vectors.camMeans)('$law to $peakIn in: $cfm cfm [$mark]', ({ law, peakIn, cfm, tolerance }) => {
    within(cam(law as LiftLaw, peakIn * inch), cfm, tolerance);
  });
  it('has the closed forms: 2/π for half sine and flow like lift, ½ for every other law', () => {
    const linear = flowCurve([1, 2, 5, 9].map((x) => ({ liftM: x, flowM3PerS: x })));
    for (const law of laws) within(cam(law, 9, linear) / 9, law === 'halfSine' ? 2 / Math.PI : 0.5, 1e-12);
  });
  it('has ½ for half sine and flow like the square of lift, by a finely tested curve', () => {
    const lifts = Array.from({ length: 2000 }, (_, i) => (i + 1) / 2000);
    const square = flowCurve(lifts.map((liftM) => ({ liftM, flowM3PerS: liftM * liftM })));
    within(cam('halfSine', 1, square), 0.5, 1e-7);
  });
  it('is the same from a law and from a fine table of that law, with rows of zero around it', () => {
    const rows = Array.from({ length: 721 }, (_, i) => ({
      angle: i,
      liftM: i < 120 || i >= 600 ? 0 : 0.6 * inch * Math.sin(((i - 120) / 480) * Math.PI) ** 2,
    }));
    const table = liftEventOfTable(rows);
    within(table.peakLiftM, 0.6 * inch, 1e-15);
    within(meanFlow(curve, camWeights(curve.xs, table)), cam('sineSquared', 0.6 * inch), 2e-3);
  });
  it('holds the last flow above the highest tested lift, and says for how much of the event', () => {
    const weights = camWeights(curve.xs, liftEventOfLaw('halfSine', 1.2 * inch));
    within(weights.heldShare, 2 / 3, 1e-9); // sin above ½ from 30° to 150°
    expect(meanFlow(curve, weights)).toBeLessThan(246);
    expect(camWeights(curve.xs, liftEventOfLaw('halfSine', 0.6 * inch)).heldShare).toBe(0);
  });

  const flows = fc.array(fc.integer({ min: 1, max: 300 }), { minLength: 2, maxLength: 12 });
  it('lies between the lowest and the highest flow, scales with it, and is moved by each flow as its sensitivities say', () => {
    fc.assert(
      fc.property(
        flows,
        fc.constantFrom(...laws),
        fc.double({ min: 0.5, max: 3, noNaN: true }),
        (list, law, k) => {
          const on = (by: (flow: number, i: number) => number) =>
            flowCurve(list.map((flow, i) => ({ liftM: i + 1, flowM3PerS: by(flow, i) })));
          const plain = on((flow) => flow);
          for (const weights of [
            camWeights(plain.xs, liftEventOfLaw(law, list.length)),
            liftRangeWeights(plain.xs, 0.5, list.length - 0.25),
          ]) {
            const mean = meanFlow(plain, weights);
            expect(mean).toBeGreaterThan(0);
            expect(mean).toBeLessThanOrEqual(Math.max(...list));
            within(
              meanFlow(
                on((flow) => k * flow),
                weights,
              ),
              k * mean,
              1e-9 * k * mean,
            );
            const sum = meanSensitivities(plain, weights).reduce(
              (total, c, i) => total + c * plain.ys[i]!,
              0,
            );
            within(sum, mean, 1e-3 * mean);
          }
        },
      ),
    );
  });
  it('moves with a lift-flow set as its sensitivities foretell', () => {
    const weights = camWeights(curve.xs, liftEventOfLaw('halfSine', 0.6 * inch));
    const foretold = meanSensitivities(curve, weights);
    curve.xs.forEach((_, k) => {
      const moved = flowCurve(
        curve.xs.map((liftM, i) => ({ liftM, flowM3PerS: curve.ys[i]! + (i === k ? 0.01 : 0) })),
      );
      within((meanFlow(moved, weights) - meanFlow(curve, weights)) / 0.01, foretold[k]!, 1e-3);
    });
  });
  it('refuses a peak of 0, a table that falls back, is negative or never opens, and lifts that begin above 0', () => {
    expect(() => liftEventOfLaw('halfSine', 0)).toThrow(RangeError);
    const table = (...lifts: number[]) => liftEventOfTable(lifts.map((liftM, angle) => ({ angle, liftM })));
    expect(() => table(0, -1, 0)).toThrow(RangeError);
    expect(() => table(0, 0, 0)).toThrow(RangeError);
    expect(() => table(0, Number.NaN, 0)).toThrow(RangeError);
    expect(() => liftEventOfTable([1, 1].map((angle) => ({ angle, liftM: 1 })))).toThrow(RangeError);
    expect(() => camWeights([1, 2], liftEventOfLaw('halfSine', 1))).toThrow(RangeError);
  });
});
