import fc from 'fast-check';
import { correctReading, rootToStandardPressure } from '@/shared/flow/correctReading';
import { pressureInPa } from '@/shared/units/quantity';
import { newId, sessionFields } from '@/tests/factories/records';
import kamili from '@/tests/vectors/intakeKamili2017.json';
import root from '@/tests/vectors/rootCorrection.json';

const settings = sessionFields().settings;
const keyed = (flowText: string, pressureText: string) => ({
  flowText,
  flowUnit: 'cfm' as const,
  pressureText,
  pressureUnit: 'inH2O' as const,
});

// source: tests/vectors/rootCorrection.json
it.each(root.cases)(
  'to $standard from $test inH2O the factor is $factor',
  ({ test, standard, factor, tolerance }) => {
    const got = rootToStandardPressure(1, pressureInPa(test, 'inH2O'), pressureInPa(standard, 'inH2O'));
    expect(Math.abs(got - factor)).toBeLessThanOrEqual(tolerance);
  },
);

// source: tests/vectors/intakeKamili2017.json; at the standard pressure and without a factor nothing is corrected
it.each(kamili.rows)('leaves $flowCfm cfm at 28 inH2O as it was keyed', ({ flowCfm }) => {
  expect(correctReading(keyed(flowCfm, kamili.pressureInH2O), settings, 'drawing')?.text).toBe(flowCfm);
});

// source: invented bench day A of this project, leak and air left out: 166·√(28/27.0) = 169.05
it('takes the factor of the run’s own direction, then the root', () => {
  const factor = {
    calibrationId: newId(),
    grade: 'comparative' as const,
    fit: { kind: 'factor' as const, factorText: '0.985' },
  };
  const plain = correctReading(keyed('166', '27.0'), settings, 'drawing');
  const drawn = correctReading(keyed('166', '27.0'), { ...settings, drawing: factor }, 'drawing');
  const blown = correctReading(keyed('166', '27.0'), { ...settings, drawing: factor }, 'blowing');
  expect(plain?.text).toBe('169.0');
  expect(drawn?.text).toBe('166.5');
  expect(blown?.text).toBe(plain?.text);
});

it('says each step in the working, in order, with what was not done', () => {
  const steps = correctReading(keyed('166', '27.0'), settings, 'drawing')?.working.map((step) => step.name);
  expect(steps).toEqual(['reading', 'calibration', 'testPressure', 'notDone']);
});

it('has nothing to correct by at a pressure of zero, or for a mass flow', () => {
  expect(correctReading(keyed('166', '0'), settings, 'drawing')).toBeNull();
  expect(correctReading({ ...keyed('166', '28'), flowUnit: 'kg/h' }, settings, 'drawing')).toBeNull();
});

it('shows the figure with the shop’s decimal mark', () => {
  expect(correctReading(keyed('166', '27.0'), { ...settings, decimalMark: ',' }, 'drawing')?.text).toBe(
    '169,0',
  );
});

it('grows with the flow and falls with the pressure', () => {
  const number = fc.integer({ min: 1, max: 5000 }).map((n) => (n / 10).toFixed(1));
  fc.assert(
    fc.property(number, number, (flow, pressure) => {
      const at = (f: number, p: number) =>
        correctReading(keyed(f.toFixed(1), p.toFixed(1)), settings, 'drawing')?.flowM3PerS ?? Number.NaN;
      const here = at(Number(flow), Number(pressure));
      expect(at(Number(flow) + 1, Number(pressure))).toBeGreaterThan(here);
      expect(at(Number(flow), Number(pressure) + 1)).toBeLessThan(here);
    }),
  );
});

it.each([0, -1, Number.NaN, Number.POSITIVE_INFINITY])('refuses a test pressure of %p Pa', (pa) => {
  expect(() => rootToStandardPressure(1, pa, 6974)).toThrow(RangeError);
});
