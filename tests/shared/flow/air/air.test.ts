import fc from 'fast-check';
import psychrolib from 'psychrolib';
import { barometer, standardPressureAtPa, stationPressurePa } from '@/shared/flow/air/barometer';
import { dryAirDensityKgPerM3, soundSpeedMPerS, viscosityPaS } from '@/shared/flow/air/dryAir';
import { airDensityKgPerM3, carriedHumidityRatio, moistAir } from '@/shared/flow/air/moistAir';
import { referenceAir, referenceAirs, referenceDensityKgPerM3 } from '@/shared/flow/air/referenceAir';
import { SessionSettings } from '@/shared/schema/records';
import { OutOfRangeError } from '@/shared/units/outOfRange';
import vectors from '@/tests/vectors/air.json';

const near = (got: number, wanted: number, absolute: number) =>
  expect(Math.abs(got - wanted)).toBeLessThanOrEqual(absolute);
const air = (celsius: number, pressureAbsPa: number, humidityRatio: number) => ({
  pressureAbsPa,
  temperatureK: celsius + 273.15,
  humidityRatio,
});
const anyAir = fc
  .record({
    celsius: fc.double({ min: -10, max: 50, noNaN: true }),
    pa: fc.double({ min: 70e3, max: 112e3, noNaN: true }),
    humidity: fc.double({ min: 0, max: 1, noNaN: true }),
  })
  .map(({ celsius, pa, humidity }) => air(celsius, pa, humidity));

// source and mark of each group: tests/vectors/air.json
it.each(vectors.moist.rows)('air of $celsius °C, $pa Pa, $humidity weighs $density kg/m³', (v) => {
  const got = moistAir(air(v.celsius, v.pa, v.humidity));
  near(got.densityKgPerM3, v.density, v.absolute);
  expect(got).toMatchObject({ isInStatedRange: true, rangeNote: '' });
});

it.each(Object.entries(vectors.moist.middle))('at 20 °C and 50 % the %s is as printed', (name, v) => {
  const got = moistAir(air(20, 101325, 0.5));
  near(got[name as keyof typeof vectors.moist.middle], v.wanted, v.absolute);
});

it.each(vectors.viscosity.rows)('viscosity at $celsius °C', ({ celsius, paS, absolute }) =>
  near(viscosityPaS(celsius + 273.15), paS, absolute),
);

it('sound at 20 °C, dry', () =>
  near(soundSpeedMPerS(vectors.sound.celsius + 273.15), vectors.sound.mPerS, vectors.sound.absolute));

// the printed densities of dry reference airs are an ideal gas; the product's own are CIPM-2007, up to 0.04 % above
it.each(vectors.reference.rows)('reference air $name is the state its density is printed for', (v) => {
  const state = referenceAir(v.name as SessionSettings['referenceAir']);
  const printedModel = state.humidityRatio === 0 ? dryAirDensityKgPerM3 : airDensityKgPerM3;
  near(printedModel(state), v.density, v.absolute);
  const product = referenceDensityKgPerM3(state.name);
  expect(Math.abs(product / v.density - 1)).toBeLessThan(4.5e-4);
});

it('offers exactly the reference airs a session can hold, each by the one model of density', () => {
  expect(referenceAirs.map(({ name }) => name)).toEqual(SessionSettings.shape.referenceAir.options);
  for (const reference of referenceAirs)
    expect(referenceDensityKgPerM3(reference.name)).toBe(airDensityKgPerM3(reference));
  expect(() => referenceAir('moon' as never)).toThrow(RangeError);
});

// psychrolib 1.1.1 [lib] takes compressibility as 1, R of dry air 287.042 and no enhancement: the same to 5e-4, not better
it('agrees with psychrolib to what its ideal gas allows', () => {
  psychrolib.SetUnitSystem(psychrolib.SI);
  const density = (celsius: number, pa: number, humidity: number) =>
    psychrolib.GetMoistAirDensity(celsius, psychrolib.GetHumRatioFromRelHum(celsius, humidity, pa), pa);
  near(density(20, 101325, 0.5), 1.198898, 5e-7);
  fc.assert(
    fc.property(
      fc.double({ min: 5, max: 40, noNaN: true }),
      fc.double({ min: 80e3, max: 106e3, noNaN: true }),
      fc.double({ min: 0, max: 1, noNaN: true }),
      (celsius, pa, humidity) => {
        const ours = airDensityKgPerM3(air(celsius, pa, humidity));
        expect(Math.abs(ours / density(celsius, pa, humidity) - 1)).toBeLessThan(1e-3);
      },
    ),
  );
  expect(Math.abs(airDensityKgPerM3(air(20, 101325, 0.5)) / density(20, 101325, 0.5) - 1)).toBeLessThan(5e-4);
});

it.each([
  [14.9, 101325, false],
  [15, 101325, true],
  [27, 60000, true],
  [27.1, 101325, false],
  [20, 59999, false],
  [20, 110001, false],
])('at %p °C and %p Pa inside the stated range is %p', (celsius, pa, wanted) => {
  const got = moistAir(air(celsius, pa, 0.4));
  expect(got.isInStatedRange).toBe(wanted);
  expect(got.rangeNote === '').toBe(wanted);
});

it('gets lighter with heat and water and heavier with pressure', () => {
  fc.assert(
    fc.property(anyAir, (state) => {
      const here = airDensityKgPerM3(state);
      expect(airDensityKgPerM3({ ...state, temperatureK: state.temperatureK + 1 })).toBeLessThan(here);
      expect(airDensityKgPerM3({ ...state, pressureAbsPa: state.pressureAbsPa + 100 })).toBeGreaterThan(here);
      if (state.humidityRatio < 0.98)
        expect(
          airDensityKgPerM3({ ...state, humidityRatio: state.humidityRatio + 0.01 }),
        ).toBeLessThanOrEqual(here);
    }),
  );
});

it('water that came with the air stays in it: the same share of vapour, and back to the same humidity', () => {
  fc.assert(
    fc.property(anyAir, (room) => {
      const place = { pressureAbsPa: room.pressureAbsPa + 5000, temperatureK: room.temperatureK + 12 };
      const humidityRatio = carriedHumidityRatio(room, place);
      near(moistAir({ ...place, humidityRatio }).vapourRatio, moistAir(room).vapourRatio, 1e-12);
      near(carriedHumidityRatio({ ...place, humidityRatio }, room), room.humidityRatio, 1e-12);
    }),
  );
  // cooled below the dew point the air is full, not fuller
  expect(carriedHumidityRatio(air(30, 1e5, 0.9), { pressureAbsPa: 1e5, temperatureK: 283.15 })).toBe(1);
});

it.each([
  ['no pressure', air(20, 0, 0.5)],
  ['a percentage in place of a share', air(20, 101325, 50)],
  ['a negative humidity', air(20, 101325, -0.1)],
  ['hectopascal in place of pascal', air(20, 1013.25, 0.5)],
  ['celsius in place of kelvin', { pressureAbsPa: 101325, temperatureK: 20, humidityRatio: 0.5 }],
  ['more vapour than the pressure holds', air(99, 40e3, 1)],
  ['no number', air(Number.NaN, 101325, 0.5)],
])('refuses %s', (_what, state) => expect(() => moistAir(state)).toThrow(OutOfRangeError));

it.each([0, -1, Number.NaN, Number.POSITIVE_INFINITY])('refuses a temperature of %p K', (temperatureK) => {
  expect(() => viscosityPaS(temperatureK)).toThrow(OutOfRangeError);
  expect(() => soundSpeedMPerS(temperatureK)).toThrow(OutOfRangeError);
  expect(() => dryAirDensityKgPerM3({ pressureAbsPa: 101325, temperatureK })).toThrow(OutOfRangeError);
});

it.each(vectors.altitude.rows)('the standard pressure at $metres m is $pa Pa', ({ metres, pa, absolute }) =>
  near(standardPressureAtPa(metres), pa, absolute),
);

it('a weather report on a standard day gives the standard pressure of the place', () => {
  fc.assert(
    fc.property(fc.integer({ min: -400, max: 5000 }), (altitudeM) =>
      near(stationPressurePa({ seaLevelPa: 101325, altitudeM }), standardPressureAtPa(altitudeM), 1e-6),
    ),
  );
});

// flow-maths §1: a report taken for a gauge is 1.8 % of flow wrong at 300 m
it('a report taken as it stands would be 1.8 % of flow wrong at 300 m', () => {
  const right = barometer({ from: 'weatherReport', seaLevelPa: 101325, altitudeM: 300 }).pressureAbsPa;
  near(Math.sqrt(101325 / right) - 1, 0.018, 5e-4);
});

it('only an altitude without a measured pressure is an estimate, and says so', () => {
  expect(barometer({ from: 'ownGauge', pressureAbsPa: 99400 })).toMatchObject({
    pressureAbsPa: 99400,
    isEstimate: false,
  });
  expect(barometer({ from: 'weatherReport', seaLevelPa: 1e5, altitudeM: 0 }).isEstimate).toBe(false);
  const guess = barometer({ from: 'altitude', altitudeM: 300 });
  expect(guess.isEstimate).toBe(true);
  expect(guess.sentence).toContain('No barometer');
  expect(() => barometer({ from: 'ownGauge', pressureAbsPa: 0 })).toThrow(OutOfRangeError);
  expect(() => barometer({ from: 'altitude', altitudeM: 9000 })).toThrow(OutOfRangeError);
});
