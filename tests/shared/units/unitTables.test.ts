import fc from 'fast-check';
import { unit as libraryUnit } from 'mathjs';
import type { FlowUnit } from '@/shared/schema/primitives';
import { liftFromM, liftInM } from '@/shared/units/lift';
import { anyFlowFromSi, anyFlowM3PerS } from '@/shared/units/massFlow';
import { OutOfRangeError, between, finite, positive, zeroOrMore } from '@/shared/units/outOfRange';
import { flowM3PerS, readSignedNumber } from '@/shared/units/quantity';
import { temperatureFromK, temperatureInK } from '@/shared/units/temperature';
import { type QuantityKind, fromSi, toSi, unitTables, unitsOf } from '@/shared/units/unitTables';
import vectors from '@/tests/vectors/conversions.json';

// source of every line: tests/vectors/conversions.json
it.each(vectors.rows)('$value $from is $wanted $to', ({ kind, value, from, to, wanted, relative }) => {
  const got = fromSi(kind as QuantityKind, toSi(kind as QuantityKind, value, from), to);
  expect(Math.abs(got / wanted - 1)).toBeLessThanOrEqual(relative);
});

it.each(vectors.temperatures)('$text $unit is $kelvin K', ({ text, unit, kelvin, absolute }) => {
  const got = temperatureInK(text, unit as 'degC' | 'degF');
  expect(Math.abs(got - kelvin)).toBeLessThanOrEqual(absolute);
});

// mathjs 15 [lib]. Its psi and horsepower are built from a pound-force of 4.4482216152605 N and an inch, with a rounding
// 6e-11 from SP 811's printed figures. It has no inch of water: 25.4 mm of water is the conventional one; and no inch of
// mercury: its mmHg is the rounded 133.322 Pa, 3e-6 off.
it.each([
  ['volumeFlow', 'cfm', 'cuft/min', 'm^3/s', 1e-12],
  ['massFlow', 'lb/min', 'lbm/min', 'kg/s', 1e-12],
  ['pressure', 'psi', 'psi', 'Pa', 1e-10],
  ['power', 'hp', 'hp', 'W', 1e-10],
  ['pressure', 'mmH2O', 'mmH2O', 'Pa', 1e-12],
  ['area', 'in2', 'sqin', 'm^2', 1e-12],
  ['volume', 'in3', 'cuin', 'm^3', 1e-12],
  ['density', 'lb/ft3', 'lbm/cuft', 'kg/m^3', 1e-12],
  ['speed', 'ft/s', 'ft/s', 'm/s', 1e-12],
] as const)('%s: one %s agrees with the library’s %s', (kind, ours, theirs, si, relative) => {
  const wanted = libraryUnit(1, theirs).toNumber(si);
  expect(Math.abs(toSi(kind, 1, ours) / wanted - 1)).toBeLessThanOrEqual(relative);
});

it('takes the conventional inch of water, 25.4 mm of the library’s water', () => {
  const wanted = libraryUnit(25.4, 'mmH2O').toNumber('Pa');
  expect(Math.abs(toSi('pressure', 1, 'inH2O') / wanted - 1)).toBeLessThanOrEqual(1e-12);
});

const kinds = Object.keys(unitTables) as QuantityKind[];

it.each(kinds)('%s comes back from SI to the same number in every unit', (kind) => {
  fc.assert(
    fc.property(fc.double({ min: 1e-9, max: 1e6, noNaN: true }), (value) => {
      for (const unit of unitsOf(kind)) {
        const back = fromSi(kind, toSi(kind, value, unit), unit);
        expect(Math.abs(back - value)).toBeLessThanOrEqual(1e-12 * Math.abs(value));
      }
    }),
  );
});

it('temperatures come back from kelvin to the same number', () => {
  fc.assert(
    fc.property(fc.integer({ min: -400, max: 2000 }), fc.constantFrom('degC', 'degF'), (tenths, unit) => {
      const text = (tenths / 10).toFixed(1);
      expect(temperatureFromK(temperatureInK(text, unit), unit)).toBeCloseTo(tenths / 10, 9);
    }),
  );
});

it('refuses a unit of another kind, a number that is none, and what lies below absolute zero', () => {
  expect(() => toSi('pressure', 1, 'cfm')).toThrow(OutOfRangeError);
  expect(() => toSi('pressure', 1, 'toString')).toThrow(OutOfRangeError);
  expect(() => fromSi('length', Number.NaN, 'in')).toThrow(OutOfRangeError);
  expect(() => temperatureInK('-274', 'degC')).toThrow(RangeError);
  expect(() => temperatureInK('warm', 'degC')).toThrow(RangeError);
  expect(() => temperatureFromK(0, 'degC')).toThrow(RangeError);
});

it('a mass flow over its density is the volume flow, and back', () => {
  const density = fc.double({ min: 0.8, max: 1.5, noNaN: true });
  const units = fc.constantFrom<FlowUnit>('cfm', 'L/s', 'm3/h', 'm3/min', 'kg/h', 'lb/min');
  fc.assert(
    fc.property(fc.integer({ min: 1, max: 99999 }), units, density, (tenths, unit, densityKgPerM3) => {
      const text = (tenths / 10).toFixed(1);
      const valueM3PerS = anyFlowM3PerS({ text, unit, densityKgPerM3 });
      expect(anyFlowFromSi({ valueM3PerS, unit, densityKgPerM3 })).toBeCloseTo(tenths / 10, 8);
    }),
  );
  expect(anyFlowM3PerS({ text: '300', unit: 'cfm', densityKgPerM3: 1.2 })).toBe(flowM3PerS('300', 'cfm'));
  expect(() => anyFlowM3PerS({ text: '3', unit: 'kg/h', densityKgPerM3: 0 })).toThrow(OutOfRangeError);
});

it('a lift in L/D is a length by the head diameter, and cannot be one without it', () => {
  expect(liftInM({ text: '0,25', unit: 'L/D', headDiameterM: 0.04 })).toBeCloseTo(0.01, 12);
  expect(liftFromM({ liftM: 0.01, unit: 'L/D', headDiameterM: 0.04 })).toBeCloseTo(0.25, 12);
  expect(liftInM({ text: '10', unit: 'mm', headDiameterM: null })).toBe(0.01);
  expect(() => liftInM({ text: '0.25', unit: 'L/D', headDiameterM: null })).toThrow(/head diameter/);
  expect(() => liftInM({ text: '0.25', unit: 'L/D', headDiameterM: 0 })).toThrow(OutOfRangeError);
  expect(() => liftFromM({ liftM: 0.01, unit: 'L/D', headDiameterM: null })).toThrow(/head diameter/);
});

it('reads a minus where one is allowed', () => {
  expect(readSignedNumber('-0,002')).toBe(-0.002);
  expect(() => readSignedNumber('--1')).toThrow(RangeError);
  expect(() => readSignedNumber('1e3')).toThrow(RangeError);
});

it.each([Number.NaN, Number.POSITIVE_INFINITY, -1])(
  'the guards let %p through nowhere it does not belong',
  (x) => {
    expect(() => positive(x, 'test pressure')).toThrow('The test pressure must be above 0.');
    expect(() => zeroOrMore(x, 'lift')).toThrow(OutOfRangeError);
    expect(() => between(x, 0, 1, 'humidity')).toThrow(OutOfRangeError);
    if (!Number.isFinite(x)) expect(() => finite(x, 'zero')).toThrow(OutOfRangeError);
  },
);

it('names the quantity it refused', () => {
  let caught: unknown = null;
  try {
    positive(0, 'density');
  } catch (error) {
    caught = error;
  }
  expect(caught).toBeInstanceOf(OutOfRangeError);
  expect((caught as OutOfRangeError).quantity).toBe('density');
});
