import fc from 'fast-check';
import {
  type Tappings,
  diameterRatio,
  expansibility,
  orificeCoefficient,
  permanentLossPa,
  thinPlateCoefficient,
} from '@/shared/flow/orifice/dischargeCoefficient';
import { ductPlateFlow, wallPlateFlow } from '@/shared/flow/orifice/orificeFlow';
import { orificeLimits } from '@/shared/flow/orifice/orificeLimits';
import { OutOfRangeError } from '@/shared/units/outOfRange';
import { fromSi, toSi } from '@/shared/units/unitTables';
import vectors from '@/tests/vectors/orifice.json';

const near = (got: number, wanted: number, absolute: number) =>
  expect(Math.abs(got - wanted)).toBeLessThanOrEqual(absolute);
const alike = (got: number, wanted: number, relative: number) => near(got / wanted, 1, relative);
const at = (inH2O: number) => ({
  pressureAbsPa: 101325,
  densityKgPerM3: 1.2041054298790528,
  temperatureK: 293.15,
  pressureDropPa: toSi('pressure', inH2O, 'inH2O'),
});
const cfm = (flowM3PerS: number) => fromSi('volumeFlow', flowM3PerS, 'cfm');

// source and mark of each group: tests/vectors/orifice.json
it.each(vectors.coefficient.rows)('Reader-Harris/Gallagher, $tappings', ({ tappings, wanted, relative }) => {
  const { ductM, boreM, massKgPerS, viscosityPaS } = vectors.coefficient;
  const reynolds = (4 * massKgPerS) / (Math.PI * ductM * viscosityPaS);
  const plate = { ductDiameterM: ductM, boreM, tappings: tappings as Tappings };
  alike(orificeCoefficient(plate, reynolds), wanted, relative);
});

it('expansibility and the permanent loss agree with the library', () => {
  const e = vectors.expansibility;
  alike(expansibility(e.boreM / e.ductM, e.pressureAbsPa, e.pressureDropPa), e.wanted, e.relative);
  const l = vectors.loss;
  alike(permanentLossPa(l.boreM / l.ductM, l.coefficient, l.pressureDropPa), l.wanted, l.relative);
});

// the library took C and ε as given; the flow that our own C and ε give, over theirs times ours, is its flow
it('the mass flow agrees with the library’s for its coefficient', () => {
  const v = vectors.massFlow;
  const { ductM, boreM, pressureAbsPa, pressureDropPa } = vectors.expansibility;
  const got = ductPlateFlow(
    { ductDiameterM: ductM, boreM, tappings: 'corner' },
    { pressureAbsPa, pressureDropPa, densityKgPerM3: v.density, temperatureK: 293.15 },
  );
  const asTheirs =
    (got.massKgPerS * v.coefficient * v.expansibility) / (got.coefficient * got.expansibilityRatio);
  alike(asTheirs, v.wanted, v.relative);
});

it.each(vectors.duct.rows)('a $boreM m plate in $ductM m at $inH2O inH2O passes $cfm cfm', (v) => {
  const got = ductPlateFlow(
    { ductDiameterM: v.ductM, boreM: v.boreM, tappings: v.tappings as Tappings },
    at(v.inH2O),
  );
  near(got.coefficient, v.coefficient, 5e-10);
  near(cfm(got.flowM3PerS), v.cfm, 5.1e-6);
  if (v.expansibility !== null) near(got.expansibilityRatio, v.expansibility, 5e-10);
  if (v.kgPerS !== null) near(got.massKgPerS, v.kgPerS, 5e-10);
  expect(got.limits).toEqual([]);
});

it('a 2 in plate in a plenum wall by practice', () => {
  const v = vectors.wall.givenCoefficient;
  const got = wallPlateFlow({ boreM: toSi('length', v.boreIn, 'in'), coefficient: v.coefficient }, at(28));
  near(cfm(got.flowM3PerS), v.cfm, v.absolute);
  near(cfm(got.flowM3PerS / got.expansibilityRatio), v.incompressibleCfm, v.absolute);
  near(got.coefficient, 0.6, 1e-12);
});

it.each(vectors.wall.sharp)('a truly sharp $boreIn in plate has C $coefficient', (v) => {
  const got = wallPlateFlow({ boreM: toSi('length', v.boreIn, 'in'), coefficient: null }, at(28));
  near(got.coefficient, v.coefficient, v.absolute);
  near(thinPlateCoefficient(got.reynolds), got.coefficient, 1e-12);
});

const anyPlate = fc
  .record({
    ductDiameterM: fc.double({ min: 0.05, max: 0.3, noNaN: true }),
    beta: fc.double({ min: 0.1, max: 0.75, noNaN: true }),
    tappings: fc.constantFrom<Tappings>('corner', 'dAndHalfD', 'flange'),
  })
  .map(({ ductDiameterM, beta, tappings }) => ({ ductDiameterM, boreM: beta * ductDiameterM, tappings }));
const anyDrop = fc.double({ min: 0.2, max: 60, noNaN: true });

it('the flow found is the one its own Reynolds number gives, and grows with the drop', () => {
  fc.assert(
    fc.property(anyPlate, anyDrop, (plate, inH2O) => {
      const got = ductPlateFlow(plate, at(inH2O));
      alike(orificeCoefficient(plate, got.reynolds), got.coefficient, 1e-12);
      expect(ductPlateFlow(plate, at(inH2O * 1.01)).massKgPerS).toBeGreaterThan(got.massKgPerS);
      const loss = permanentLossPa(diameterRatio(plate), got.coefficient, at(inH2O).pressureDropPa);
      expect(loss).toBeGreaterThan(0);
      expect(loss).toBeLessThan(at(inH2O).pressureDropPa);
    }),
  );
});

it('a plate in an ever wider duct becomes a plate in a wall', () => {
  const wall = wallPlateFlow({ boreM: 0.02, coefficient: null }, at(28));
  const duct = ductPlateFlow({ ductDiameterM: 20, boreM: 0.02, tappings: 'corner' }, at(28));
  alike(duct.massKgPerS, wall.massKgPerS, 1e-5);
  expect(duct.limits).toHaveLength(3); // of a duct: size, ratio and speed
});

it.each([
  ['a duct of 40 mm', { ductDiameterM: 0.04, boreM: 0.02 }, 1e5, 0.99, 'duct'],
  ['a bore of 10 mm', { ductDiameterM: 0.06, boreM: 0.01 }, 1e5, 0.99, 'bore'],
  ['β 0.8', { ductDiameterM: 0.1, boreM: 0.08 }, 1e5, 0.99, 'over duct'],
  ['Re 4000', { ductDiameterM: 0.1, boreM: 0.05 }, 4000, 0.99, 'too slow'],
  ['Re 9000 at β 0.75', { ductDiameterM: 0.1, boreM: 0.075 }, 8900, 0.99, 'too slow'],
  ['a third of the pressure', { ductDiameterM: 0.1, boreM: 0.05 }, 1e5, 0.66, 'quarter'],
])('says the limit that %s leaves, and no other', (_what, plate, reynolds, ratio, word) => {
  const said = orificeLimits({ ...plate, tappings: 'corner' }, reynolds, ratio);
  expect(said).toHaveLength(1);
  expect(said[0]?.toLowerCase()).toContain(word);
});

it('flange tappings have their own smallest Reynolds number', () => {
  const plate = { ductDiameterM: 0.2, boreM: 0.12, tappings: 'flange' as const };
  expect(orificeLimits(plate, 12000, 0.99)).toHaveLength(1);
  expect(orificeLimits(plate, 12300, 0.99)).toEqual([]);
});

it('shows, and does not enforce, the limits of a small plate in a wall', () => {
  const got = wallPlateFlow({ boreM: 0.003, coefficient: null }, at(0.1));
  expect(got.limits).toHaveLength(2);
  expect(got.massKgPerS).toBeGreaterThan(0);
});

it.each([0, -1, Number.NaN, Number.POSITIVE_INFINITY])('refuses %p as bore, duct, drop or density', (x) => {
  const plate = { ductDiameterM: 0.1, boreM: 0.06, tappings: 'corner' as const };
  expect(() => ductPlateFlow({ ...plate, boreM: x }, at(6))).toThrow(OutOfRangeError);
  expect(() => ductPlateFlow({ ...plate, ductDiameterM: x }, at(6))).toThrow(OutOfRangeError);
  expect(() => ductPlateFlow(plate, { ...at(6), pressureDropPa: x })).toThrow(OutOfRangeError);
  expect(() => wallPlateFlow({ boreM: 0.05, coefficient: null }, { ...at(6), densityKgPerM3: x })).toThrow(
    OutOfRangeError,
  );
  expect(() => wallPlateFlow({ boreM: 0.05, coefficient: x }, at(6))).toThrow(OutOfRangeError);
});

it('refuses a flow too small for its digits instead of answering with no number', () => {
  const state = { ...at(6), pressureDropPa: 4.741266989196221e-277 };
  expect(() => wallPlateFlow({ boreM: 1.71567553863286e-93, coefficient: null }, state)).toThrow(
    OutOfRangeError,
  );
});

it('never answers with no number, however odd the plate and the drop', () => {
  const odd = fc.double({ min: -1e9, max: 1e9 });
  const oddOrSmall = fc.oneof(odd, fc.double({ min: 0, max: 0.2 }), fc.double({ min: 0, max: 1e-9 }));
  fc.assert(
    fc.property(
      oddOrSmall,
      oddOrSmall,
      fc.oneof(odd, fc.double({ min: 0, max: 1e5 })),
      (duct, bore, drop) => {
        try {
          const state = { ...at(6), pressureDropPa: drop };
          const flows = [
            ductPlateFlow({ ductDiameterM: duct, boreM: bore, tappings: 'flange' }, state),
            wallPlateFlow({ boreM: bore, coefficient: null }, state),
          ];
          for (const { massKgPerS, coefficient } of flows)
            expect([massKgPerS, coefficient].every(Number.isFinite)).toBe(true);
        } catch (error) {
          expect(error).toBeInstanceOf(OutOfRangeError);
        }
      },
    ),
    { numRuns: 500 },
  );
});
