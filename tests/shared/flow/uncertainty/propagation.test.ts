import fc from 'fast-check';
import { flowCurve } from '@/shared/flow/curve/flowCurve';
import { airDensityUncertaintyRatio } from '@/shared/flow/uncertainty/airUncertainty';
import {
  effectiveFreedom,
  expandedUncertainty,
  propagate,
  rectangularUncertainty,
  resolutionUncertainty,
  sensitivitiesOf,
  typeAUncertainty,
} from '@/shared/flow/uncertainty/propagation';
import { rootBias } from '@/shared/flow/uncertainty/rootBias';
import { seededRandom } from '@/tests/factories/seededRandom';
import vectors from '@/tests/vectors/uncertainty.json';

const within = (got: number, expected: number, tolerance: number) =>
  expect(Math.abs(got - expected)).toBeLessThanOrEqual(tolerance);
const inH2O = 249.08891;

it('comes out as GUM H.1: 32 nm, 16 degrees of freedom, 93 nm at 99 % [std]', () => {
  const { terms, ...printed } = vectors.gumH1;
  const u = propagate(terms);
  within(u, printed.combined, printed.combinedTolerance);
  const freedom = effectiveFreedom(
    terms.map((term) => ({ ...term, contribution: term.sensitivity * term.standardUncertainty })),
  );
  const expanded = expandedUncertainty(u, freedom, 0.99);
  expect(expanded.degreesOfFreedom).toBe(printed.freedom);
  within(expanded.expandedUncertainty, printed.expanded99, printed.expandedTolerance);
});

it('takes 0.29 of a step as the GUM does, and half a step as half width', () => {
  const { step, u, tolerance } = vectors.resolution;
  within(resolutionUncertainty(step), u, tolerance);
  within(rectangularUncertainty(0.5), resolutionUncertainty(1), 1e-15);
});

it('propagates as a simulation of a product does', () => {
  const { normal } = seededRandom(21);
  const inputs = [
    { value: 12, standardUncertainty: 0.2 },
    { value: 3, standardUncertainty: 0.08 },
    { value: 5, standardUncertainty: 0.1 },
  ];
  const f = ([a = 0, b = 0, c = 0]: readonly number[]) => (a * Math.sqrt(b)) / c;
  const sensitivities = sensitivitiesOf(f, inputs);
  const u = propagate(inputs.map((input, i) => ({ ...input, sensitivity: sensitivities[i]! })));
  const draws = Array.from({ length: 20000 }, () =>
    f(inputs.map(({ value, standardUncertainty }) => value + standardUncertainty * normal())),
  );
  const simulated = typeAUncertainty(draws).standardUncertainty * Math.sqrt(draws.length);
  within(u / simulated, 1, 0.03);
});

it('adds wholly correlated parts straight and takes opposite ones away', () => {
  const size = fc.double({ min: 0, max: 10, noNaN: true });
  fc.assert(
    fc.property(size, size, (a, b) => {
      const terms = [a, b].map((standardUncertainty) => ({ sensitivity: 1, standardUncertainty }));
      within(
        propagate(terms, () => 1),
        a + b,
        1e-9,
      );
      within(
        propagate(terms, () => -1),
        Math.abs(a - b),
        1e-6,
      );
      within(propagate(terms), Math.hypot(a, b), 1e-9);
    }),
  );
});

it('has an effective freedom between the smallest and the sum, and does not mind the unit', () => {
  const part = fc.record({
    contribution: fc.double({ min: 1e-6, max: 1, noNaN: true }),
    degreesOfFreedom: fc.integer({ min: 1, max: 60 }),
  });
  fc.assert(
    fc.property(fc.array(part, { minLength: 1, maxLength: 8 }), (parts) => {
      const nu = effectiveFreedom(parts);
      expect(nu).toBeGreaterThanOrEqual(Math.min(...parts.map((p) => p.degreesOfFreedom)) * (1 - 1e-12));
      expect(nu).toBeLessThanOrEqual(parts.reduce((sum, p) => sum + p.degreesOfFreedom, 0) * (1 + 1e-12));
      const small = parts.map((p) => ({ ...p, contribution: p.contribution * 1e-4 }));
      within(effectiveFreedom(small) / nu, 1, 1e-9);
    }),
  );
  expect(effectiveFreedom([])).toBe(Infinity);
  expect(expandedUncertainty(1, Infinity).coverageFactor).toBeCloseTo(1.959964, 6);
});

it.each(vectors.rootBias.cases)(
  'the root to 28 from $fromInH2O inH2O reads $platePercent to $nozzlePercent % high [der]',
  ({ fromInH2O, platePercent, nozzlePercent, tolerance }) => {
    const bias = rootBias(fromInH2O * inH2O, 28 * inH2O);
    within(100 * bias.plateRatio, platePercent, tolerance);
    within(100 * bias.nozzleRatio, nozzlePercent, tolerance);
    expect(bias.standardUncertaintyRatio).toBeGreaterThan(bias.plateRatio);
    expect(bias.standardUncertaintyRatio).toBeLessThan(bias.nozzleRatio);
  },
);

it('has no bias of the root at the standard pressure, and one that reads low when scaled down', () => {
  expect(rootBias(28 * inH2O, 28 * inH2O).standardUncertaintyRatio).toBe(0);
  const down = rootBias(28 * inH2O, 10 * inH2O);
  expect(down.plateRatio).toBeLessThan(0);
  expect(down.standardUncertaintyRatio).toBeLessThan(0);
});

it.each(vectors.liftZero.cases)('a lift zero of 0.002 in is $percent % at $liftIn in [der]', (line) => {
  const { liftsIn, flowsCfm, zeroIn } = vectors.liftZero;
  const curve = flowCurve(liftsIn.map((liftM, i) => ({ liftM, flowM3PerS: flowsCfm[i]! })));
  const i = liftsIn.indexOf(line.liftIn);
  within((100 * zeroIn * curve.slopes[i]!) / flowsCfm[i]!, line.percent, line.tolerance);
});

it('knows the air as well as its three instruments do', () => {
  const state = { pressureAbsPa: 100000, temperatureK: 298.15, humidityRatio: 0.5 };
  const u = (pressureAbsPa: number, temperatureK: number, humidityRatio: number) =>
    airDensityUncertaintyRatio(state, { pressureAbsPa, temperatureK, humidityRatio });
  within(u(100, 0, 0), 1e-3, 2e-5); // ρ goes with p
  within(u(0, 1, 0), 1 / 298.15, 4e-4); // and with 1/T, a little more for the vapour it holds
  within(u(0, 0, 0.1), 0.1 * 0.378 * 0.0317, 5e-5); // vapour weighs 0.622 of air, 3169 Pa at saturation
  within(u(100, 1, 0.1), Math.hypot(u(100, 0, 0), u(0, 1, 0), u(0, 0, 0.1)), 1e-12);
  const dry = airDensityUncertaintyRatio(
    { ...state, humidityRatio: 0 },
    { pressureAbsPa: 0, temperatureK: 0, humidityRatio: 0.1 },
  );
  within(dry / u(0, 0, 0.1), 1, 0.02);
});

it.each([
  ['a negative step', () => resolutionUncertainty(-1)],
  ['a negative half width', () => rectangularUncertainty(-1)],
  ['a single repeat', () => typeAUncertainty([1])],
  ['a sensitivity that is no number', () => propagate([{ sensitivity: Number.NaN, standardUncertainty: 1 }])],
  [
    'a correlation past 1',
    () => propagate(new Array(2).fill({ sensitivity: 1, standardUncertainty: 1 }), () => 2),
  ],
  ['a formula that breaks', () => sensitivitiesOf(() => Number.NaN, [{ value: 1, standardUncertainty: 1 }])],
  ['no freedom', () => effectiveFreedom([{ contribution: 1, degreesOfFreedom: 0 }])],
  ['a level of 1', () => expandedUncertainty(1, 5, 1)],
  ['a pressure of 0', () => rootBias(0, 7000)],
])('refuses %s', (_what, act) => expect(act).toThrow(RangeError));
