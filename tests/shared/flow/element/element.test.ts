import fc from 'fast-check';
import { airDensityKgPerM3 } from '@/shared/flow/air/moistAir';
import { calibrated } from '@/shared/flow/element/calibrate';
import { elementMass, inletFlowM3PerS, toReferenceAirM3PerS } from '@/shared/flow/element/elementFlow';
import { type BenchAir, elementState, inletState } from '@/shared/flow/element/inletState';
import { judgeLeak, leakAtM3PerS } from '@/shared/flow/element/leak';
import { fullScaleFlowM3PerS, tubePressurePa } from '@/shared/flow/element/scale';
import { ductPlateFlow } from '@/shared/flow/orifice/orificeFlow';
import { OutOfRangeError } from '@/shared/units/outOfRange';
import { fromSi, toSi } from '@/shared/units/unitTables';
import vectors from '@/tests/vectors/element.json';

const near = (got: number, wanted: number, absolute: number) =>
  expect(Math.abs(got - wanted)).toBeLessThanOrEqual(absolute);
const state = (densityKgPerM3: number) => ({
  pressureAbsPa: 101325,
  temperatureK: 293.15,
  humidityRatio: 0,
  densityKgPerM3,
  notes: [],
});

// source and mark of each group: tests/vectors/element.json
it.each(vectors.hotDay.rows)('300 cfm by a $element on a hot day are $cfm cfm of reference air', (v) => {
  const { indicatedCfm, density, referenceDensity } = vectors.hotDay;
  const indicatedM3PerS = toSi('volumeFlow', indicatedCfm, 'cfm');
  const reading = {
    element: v.element as 'vane' | 'hotWire',
    indicatedM3PerS,
    scaledDensityKgPerM3: referenceDensity,
  };
  const { massKgPerS } = elementMass(reading, state(density));
  const flow = toReferenceAirM3PerS(inletFlowM3PerS(massKgPerS, density), density, referenceDensity);
  // the density is printed to 7 digits, which leaves 6e-5 cfm
  near(fromSi('volumeFlow', flow, 'cfm'), v.cfm, 1e-4);
  near(flow / indicatedM3PerS, v.factor, 3e-7);
});

it('an element 28 inH2O below the inlet', () => {
  const v = vectors.below;
  const inlet = state(v.referenceDensity);
  const at = state(v.referenceDensity * v.densityRatio);
  const reading = {
    element: 'orificeFlow' as const,
    indicatedM3PerS: 0.1,
    scaledDensityKgPerM3: v.referenceDensity,
  };
  const flow = inletFlowM3PerS(elementMass(reading, at).massKgPerS, inlet.densityKgPerM3);
  near(flow / 0.1, v.orificeFactor, 5e-7);
  // the product takes CIPM-2007 at both places, where Z differs by 3e-5
  const air = drawing({
    room: { ...inlet, humidityRatio: 0 },
    pressureDropPa: toSi('pressure', 28, 'inH2O'),
  });
  const ratio = elementState(air, 'afterPort').densityKgPerM3 / inletState(air).densityKgPerM3;
  near(ratio, v.densityRatio, 5e-5);
});

it.each(vectors.plenum.rows)('a plenum $warmerK K warmer than the room: √(ρplenum/ρroom) is $root', (v) => {
  const room = { pressureAbsPa: 101325, temperatureK: 293.15, humidityRatio: 0 };
  const blown: BenchAir = {
    room,
    direction: 'blowing',
    pressureDropPa: toSi('pressure', 28, 'inH2O'),
    plenum: { temperatureK: 293.15 + v.warmerK, humidityRatio: null },
  };
  near(Math.sqrt(inletState(blown).densityKgPerM3 / airDensityKgPerM3(room)), v.root, 5e-4);
});

function drawing(over: Partial<BenchAir>): BenchAir {
  const room = { pressureAbsPa: 99400, temperatureK: 297.15, humidityRatio: 0.45 };
  return { room, plenum: null, direction: 'drawing', pressureDropPa: 6974, ...over };
}

it('the inlet is the room when drawing and the plenum when blowing', () => {
  const air = drawing({ plenum: { temperatureK: 306.15, humidityRatio: 0.27 } });
  expect(inletState(air)).toMatchObject({ ...air.room, notes: [] });
  const blown = inletState({ ...air, direction: 'blowing' });
  expect(blown).toMatchObject({ pressureAbsPa: 106374, temperatureK: 306.15, humidityRatio: 0.27 });
});

it('says when the plenum’s temperature is missing, and takes the room’s', () => {
  const blown = inletState(drawing({ direction: 'blowing' }));
  expect(blown.temperatureK).toBe(297.15);
  expect(blown.notes.join()).toContain('plenum’s temperature was not noted');
});

it.each([
  ['drawing', 'room', 99400, 297.15],
  ['drawing', 'afterPort', 92426, 297.15],
  ['drawing', 'plenum', 92426, 310.15],
  ['blowing', 'room', 99400, 297.15],
  ['blowing', 'afterPort', 99400, 310.15],
  ['blowing', 'plenum', 106374, 310.15],
] as const)('%s, an element at %s has %p Pa and %p K', (direction, place, pressureAbsPa, temperatureK) => {
  const air = drawing({ direction, plenum: { temperatureK: 310.15, humidityRatio: 0.2 } });
  expect(elementState(air, place)).toMatchObject({ pressureAbsPa, temperatureK });
});

it('a test pressure that the room does not have is refused', () => {
  expect(() => inletState(drawing({ direction: 'blowing', pressureDropPa: 99400 }))).toThrow(OutOfRangeError);
  expect(() => elementState(drawing({ pressureDropPa: -1 }), 'plenum')).toThrow(OutOfRangeError);
});

it('an orifice read as a drop is the plate itself, its limits come along, and no drop is no flow', () => {
  const plate = { ductDiameterM: 0.04, boreM: 0.02, tappings: 'flange' as const };
  const at = state(1.2);
  const got = elementMass({ element: 'orificeDrop', pressureDropPa: 1500, plate }, at);
  expect(got.massKgPerS).toBe(ductPlateFlow(plate, { ...at, pressureDropPa: 1500 }).massKgPerS);
  expect(got.limits).toHaveLength(1);
  expect(elementMass({ element: 'orificeDrop', pressureDropPa: 0, plate }, at)).toEqual({
    massKgPerS: 0,
    limits: [],
  });
});

it('where the air is what the element is scaled for and the same everywhere, every element reads its volume', () => {
  fc.assert(
    fc.property(
      fc.double({ min: 0, max: 1, noNaN: true }),
      fc.double({ min: 0.9, max: 1.3, noNaN: true }),
      (q, rho) => {
        for (const element of ['vane', 'hotWire', 'pitot', 'orificeFlow'] as const) {
          const { massKgPerS } = elementMass(
            { element, indicatedM3PerS: q, scaledDensityKgPerM3: rho },
            state(rho),
          );
          near(toReferenceAirM3PerS(inletFlowM3PerS(massKgPerS, rho), rho, rho), q, 1e-12);
        }
      },
    ),
  );
});

it('percent of full scale, linear and by the root', () => {
  const scale = { openRatio: 0.49, fullScaleM3PerS: 0.2 };
  near(fullScaleFlowM3PerS({ ...scale, law: 'linear' }), 0.098, 1e-12);
  near(fullScaleFlowM3PerS({ ...scale, law: 'root' }), 0.14, 1e-12);
  expect(() => fullScaleFlowM3PerS({ ...scale, openRatio: 49, law: 'root' })).toThrow(OutOfRangeError);
});

it('a tube upright shows the head of its fluid, a sloped one less for the same length', () => {
  near(tubePressurePa({ lengthM: 0.0254, slopeRad: Math.PI / 2, densityKgPerM3: 1000 }), 249.08891, 1e-9);
  const flat = tubePressurePa({ lengthM: 0.0254, slopeRad: Math.PI / 6, densityKgPerM3: 827 });
  near(flat, 249.08891 * 0.5 * 0.827, 1e-9);
  expect(() => tubePressurePa({ lengthM: 1, slopeRad: 30, densityKgPerM3: 1000 })).toThrow(OutOfRangeError);
});

it('a leak goes with the power of the pressure, is itself at its own pressure, and is judged at 2 %', () => {
  fc.assert(
    fc.property(
      fc.double({ min: 0.5, max: 1, noNaN: true }),
      fc.double({ min: 1000, max: 9000, noNaN: true }),
      (exponent, pressureDropPa) => {
        const leak = { flowM3PerS: 0.001, pressureDropPa, exponent, settingRatio: 1 };
        near(leakAtM3PerS(leak, pressureDropPa), 0.001, 1e-15);
        near(leakAtM3PerS(leak, 4 * pressureDropPa), 0.001 * 4 ** exponent, 1e-12);
        near(leakAtM3PerS({ ...leak, settingRatio: 1.25 }, pressureDropPa), 0.00125, 1e-12);
      },
    ),
  );
  expect(judgeLeak(0.0199, 1).isDoubtful).toBe(false);
  expect(judgeLeak(0.0201, 1).isDoubtful).toBe(true);
  const leak = { flowM3PerS: 0.001, pressureDropPa: 7000, exponent: 2, settingRatio: 1 };
  expect(() => leakAtM3PerS(leak, 7000)).toThrow(OutOfRangeError);
  expect(() => leakAtM3PerS({ ...leak, exponent: 0.5 }, 0)).toThrow(OutOfRangeError);
});

it('calibrates by factor, line and table, clamped and flagged at the ends', () => {
  const range = { lowM3PerS: 0.02, highM3PerS: 0.1 };
  expect(calibrated({ kind: 'factor', factorRatio: 0.98 }, range, 0.05)).toEqual({
    flowM3PerS: 0.049,
    outside: null,
  });
  const line = { kind: 'line' as const, slopeRatio: 1, offsetM3PerS: 0.002 };
  near(calibrated(line, range, 0.05).flowM3PerS, 0.052, 1e-12);
  const below = calibrated(line, range, 0.01);
  expect(below.outside).toBe('below');
  near(below.flowM3PerS, 0.011, 1e-12); // the factor of the end, 1.1, not the line's 1.2
  const points = [
    { indicatedM3PerS: 0.1, factorRatio: 1.1 },
    { indicatedM3PerS: 0.02, factorRatio: 0.9 },
  ];
  near(calibrated({ kind: 'table', points }, range, 0.06).flowM3PerS, 0.06, 1e-12);
  const above = calibrated({ kind: 'table', points }, range, 0.2);
  expect(above.outside).toBe('above');
  near(above.flowM3PerS, 0.22, 1e-12);
  expect(calibrated(line, null, 0).flowM3PerS).toBe(0);
});

it('a table goes through its points and stays between its neighbours’ factors', () => {
  const point = fc.record({
    indicatedM3PerS: fc.double({ min: 0.01, max: 1, noNaN: true }),
    factorRatio: fc.double({ min: 0.8, max: 1.2, noNaN: true }),
  });
  fc.assert(
    fc.property(
      fc.uniqueArray(point, { minLength: 1, maxLength: 6, selector: (p) => p.indicatedM3PerS }),
      fc.double({ min: 0.005, max: 1.2, noNaN: true }),
      (points, at) => {
        const model = { kind: 'table' as const, points };
        for (const p of points)
          near(
            calibrated(model, null, p.indicatedM3PerS).flowM3PerS / p.indicatedM3PerS,
            p.factorRatio,
            1e-9,
          );
        const factors = points.map((p) => p.factorRatio);
        const factor = calibrated(model, null, at).flowM3PerS / at;
        expect(factor).toBeGreaterThanOrEqual(Math.min(...factors) - 1e-12);
        expect(factor).toBeLessThanOrEqual(Math.max(...factors) + 1e-12);
      },
    ),
  );
});

it('refuses a calibration that is none', () => {
  const range = { lowM3PerS: 0.1, highM3PerS: 0.02 };
  expect(() => calibrated({ kind: 'factor', factorRatio: 1 }, range, 0.05)).toThrow(OutOfRangeError);
  expect(() => calibrated({ kind: 'factor', factorRatio: 0 }, null, 0.05)).toThrow(OutOfRangeError);
  expect(() => calibrated({ kind: 'table', points: [] }, null, 0.05)).toThrow(OutOfRangeError);
  expect(() => calibrated({ kind: 'line', slopeRatio: 1, offsetM3PerS: -0.1 }, null, 0.05)).toThrow(
    OutOfRangeError,
  );
});
