import fc from 'fast-check';
import type { FlowUnit, PressureUnit } from '@/shared/schema/primitives';
import {
  flowFromSi,
  flowM3PerS,
  isVolumeFlow,
  pressureInPa,
  readNumber,
  showNumber,
} from '@/shared/units/quantity';
import vectors from '@/tests/vectors/units.json';

const closeTo = (got: number, wanted: number, relative: number) =>
  expect(Math.abs(got / wanted - 1)).toBeLessThanOrEqual(relative);

// source of every line: tests/vectors/units.json
it.each(vectors.flow)('$text $unit of flow is $m3PerS m³/s', (v) =>
  closeTo(flowM3PerS(v.text, v.unit as FlowUnit), v.m3PerS, v.tolerance),
);
it.each(vectors.pressure)('$text $unit is $pa Pa', (v) =>
  closeTo(pressureInPa(v.text, v.unit as PressureUnit), v.pa, v.tolerance),
);

it('reads a point and a comma alike', () => {
  expect(readNumber('241,5')).toBe(241.5);
  expect(readNumber('241.5')).toBe(241.5);
});

it.each(['', '1.2.3', '1,2.3', '.5', '5.', '-3', '1e3', ' 5', '5 ', '0x10', 'NaN', '12345678901234'])(
  'refuses %j, which is not exactly one number',
  (text) => expect(() => readNumber(text)).toThrow(RangeError),
);

it('knows that a mass flow needs a density', () => {
  expect(isVolumeFlow('kg/h')).toBe(false);
  expect(() => flowM3PerS('10', 'kg/h')).toThrow(RangeError);
});

it('comes back from SI to the same number', () => {
  fc.assert(
    fc.property(
      fc.integer({ min: 1, max: 999999 }),
      fc.constantFrom<FlowUnit>('cfm', 'L/s', 'm3/h', 'm3/min'),
      (tenths, unit) => {
        const text = (tenths / 10).toFixed(1);
        closeTo(flowFromSi(flowM3PerS(text, unit), unit), Number(text), 1e-12);
      },
    ),
  );
});

it('writes the shop’s decimal mark', () => {
  expect(showNumber(241.46, 1, ',')).toBe('241,5');
  expect(showNumber(28, 1, '.')).toBe('28.0');
});
