import fc from 'fast-check';
import type { ChainContext, StepName } from '@/shared/flow/chain/chainTypes';
import { airStep, elementStep, leakStep, testPressureStep } from '@/shared/flow/chain/flowSteps';
import { readKeyedFlow, readKeyedPressurePa, readKeyedRest } from '@/shared/flow/chain/readKeyed';
import { calibrationStep, scaleStep, zeroStep } from '@/shared/flow/chain/readingSteps';
import { speech } from '@/shared/flow/chain/speech';
import { correctedFlow, working } from '@/shared/flow/chain/working';
import { dischargeCoefficient } from '@/shared/flow/ideal/coefficients';
import { wallPlateFlow } from '@/shared/flow/orifice/orificeFlow';
import type { FlowUnit, PressureUnit } from '@/shared/schema/primitives';
import { OutOfRangeError } from '@/shared/units/outOfRange';
import { flowFromSi } from '@/shared/units/quantity';
import { fromSi, toSi } from '@/shared/units/unitTables';
import { chainContext, chainReading } from './context';

const near = (got: number, wanted: number, absolute: number) =>
  expect(Math.abs(got - wanted)).toBeLessThanOrEqual(absolute);
const bench = chainContext().bench;
const say = speech({ flowUnit: 'cfm', pressureUnit: 'inH2O', decimalMark: '.', densityKgPerM3: 1.2 });
const cfm = (value: number) => toSi('volumeFlow', value, 'cfm');
const referenceRoom = chainContext().reference.air;
const run = (context: Partial<ChainContext>, flow = '100', pressure = '28') =>
  working(chainReading(flow, pressure), chainContext(context));
const stepOf = (got: ReturnType<typeof working>, name: StepName) =>
  got.steps.find((step) => step.name === name)!;

it('takes its steps in the fixed order', () => {
  expect(run({}).steps.map(({ name }) => name)).toEqual([
    'reading',
    'zero',
    'pressureZero',
    'scale',
    'calibration',
    'element',
    'leak',
    'testPressure',
    'air',
  ]);
});

it('changes nothing at the standard pressure, in the reference air, with nothing else known', () => {
  const got = run({ room: referenceRoom });
  near(got.flowM3PerS! / cfm(100), 1, 1e-12);
  expect(stepOf(got, 'air').sentence).toContain('× 1.0000');
});

it('says what was skipped and why', () => {
  const got = run({ room: null });
  const skipped = got.steps.filter(({ state }) => state === 'skipped').map(({ name }) => name);
  expect(skipped).toEqual(['zero', 'pressureZero', 'scale', 'calibration', 'leak', 'air']);
  expect(stepOf(got, 'air').sentence).toBe(
    'No air was recorded: not brought to the reference air. The uncertainty grows.',
  );
  expect(got.isAirAssumed).toBe(true);
  expect(got.notes).toContain('No calibration.');
});

it('speaks in the shop’s units and decimal mark, and shows what was keyed to the letter', () => {
  const show = { flowUnit: 'L/s', pressureUnit: 'mbar', decimalMark: ',' } as const;
  const got = run({ show }, '241,50', '27.0');
  expect(stepOf(got, 'reading').sentence).toBe('Keyed: 241,50 cfm at 27.0 inH2O.');
  expect(stepOf(got, 'testPressure').sentence).toBe(
    'From 67,25 mbar to 69,74 mbar by the square root, × 1,0184: 116,07 L/s.',
  );
  expect(got.steps.flatMap(({ sentence }) => sentence).join(' ')).not.toMatch(/NaN|undefined|Infinity/);
});

it('each step begins where the one before ended', () => {
  const got = run({
    zero: { flow: { text: '-0.5', unit: 'cfm' }, pressure: { text: '0.2', unit: 'inH2O' } },
    calibration: {
      model: { kind: 'factor', factorRatio: 0.985 },
      range: { lowM3PerS: cfm(20), highM3PerS: cfm(80) },
      grade: 'comparative',
      stepsOn: ['zero', 'element'],
    },
    leak: { reading: chainReading('2.4', '28.2'), settingRatio: 1 },
  });
  near(flowFromSi(stepOf(got, 'zero').value, 'cfm'), 100.5, 1e-9);
  near(fromSi('pressure', stepOf(got, 'pressureZero').value, 'inH2O'), 27.8, 1e-9);
  near(flowFromSi(stepOf(got, 'calibration').value, 'cfm'), 100.5 * 0.985, 1e-9);
  // the leak goes through zero and factor itself: (2.4 + 0.5)·0.985 at 28.0
  const leak = 2.9 * 0.985 * Math.sqrt(27.8 / 28);
  near(flowFromSi(stepOf(got, 'leak').value, 'cfm'), 100.5 * 0.985 - leak, 1e-9);
  expect(got.notes.join()).toContain('Outside the calibrated range: above it');
  near(got.unscaled!.flowM3PerS, stepOf(got, 'leak').value, 0);
  near(got.unscaled!.pressureDropPa, stepOf(got, 'pressureZero').value, 0);
});

it('a step that the calibration was fitted without is built in and not applied again', () => {
  const fitted = (stepsOn: ('zero' | 'element')[]) =>
    run({
      bench: { ...bench, element: 'hotWire', scaledDensityKgPerM3: 1.2 },
      zero: { flow: { text: '2', unit: 'cfm' }, pressure: null },
      calibration: { model: { kind: 'factor', factorRatio: 1 }, range: null, grade: 'computed', stepsOn },
    });
  const without = fitted([]);
  expect(stepOf(without, 'element')).toMatchObject({ state: 'skipped', value: cfm(100) });
  expect(stepOf(without, 'zero')).toMatchObject({ state: 'skipped', value: cfm(100) });
  expect(stepOf(without, 'element').sentence).toContain('built into it');
  const withBoth = fitted(['zero', 'element']);
  expect(stepOf(withBoth, 'zero').state).toBe('done');
  near(stepOf(withBoth, 'element').value, (cfm(98) * 1.2) / withBoth.unscaled!.densityKgPerM3, 1e-12);
});

it('a leak that does not pass the element is not subtracted', () => {
  const leak = { reading: chainReading('5', '28'), settingRatio: 1 };
  const got = run({ leak, bench: { ...bench, isLeakBeforeElement: false } });
  expect(stepOf(got, 'leak')).toMatchObject({ state: 'skipped', value: cfm(100) });
  near(flowFromSi(stepOf(run({ leak }), 'leak').value, 'cfm'), 95, 1e-9);
  near(flowFromSi(stepOf(run({ leak: { ...leak, settingRatio: 1.1 } }), 'leak').value, 'cfm'), 94.5, 1e-9);
});

it('a leak above the flow leaves nothing, and says so', () => {
  const got = run({ leak: { reading: chainReading('5', '28'), settingRatio: 1 } }, '4');
  expect(got.flowM3PerS).toBe(0);
  expect(got.notes).toContain('The leak is larger than the flow.');
});

it('a percentage goes through its range, by the root after the zero', () => {
  const range = { fullScaleM3PerS: cfm(200), law: 'root' as const };
  const context = chainContext({ range, zero: { flow: { text: '1', unit: '%' }, pressure: null } });
  const got = working({ flow: { text: '65', unit: '%' }, pressure: { text: '28', unit: 'inH2O' } }, context);
  near(flowFromSi(stepOf(got, 'scale').value, 'cfm'), 160, 1e-9);
  const without = working(
    { flow: { text: '65', unit: '%' }, pressure: { text: '28', unit: 'inH2O' } },
    { ...context, range: null },
  );
  expect(without.flowM3PerS).toBeNull();
  expect(without.steps.at(-1)).toMatchObject({ name: 'scale', state: 'stopped' });
});

it('a zero of another quantity is not used, and that is said', () => {
  const got = run({ zero: { flow: { text: '1', unit: '%' }, pressure: null } });
  expect(stepOf(got, 'zero')).toMatchObject({ state: 'skipped', value: cfm(100) });
  expect(stepOf(got, 'zero').sentence).toContain('another quantity');
});

it('a plate keyed as a pressure drop is a flow by ISO 5167-2 with the air before it', () => {
  const plate = { boreM: 0.05, coefficient: 0.6 };
  const context = chainContext({
    bench: { ...bench, element: 'orificeDrop', place: 'afterPort', plate },
    calibration: {
      model: { kind: 'factor', factorRatio: 1.01 },
      range: null,
      grade: 'computed',
      stepsOn: ['element'],
    },
  });
  const got = working(
    { flow: { text: '6.00', unit: 'inH2O' }, pressure: { text: '10', unit: 'inH2O' } },
    context,
  );
  const room = context.room!;
  const p1 = room.pressureAbsPa - toSi('pressure', 10, 'inH2O');
  const rho0 = got.unscaled!.densityKgPerM3;
  const pressureDropPa = toSi('pressure', 6, 'inH2O');
  const before = { pressureAbsPa: p1, densityKgPerM3: (rho0 * p1) / room.pressureAbsPa, pressureDropPa };
  const mass = wallPlateFlow(plate, { ...before, temperatureK: room.temperatureK }).massKgPerS;
  near((got.unscaled!.flowM3PerS * rho0) / (1.01 * mass), 1, 2e-5); // Z differs between the two pressures
  const noPlate = working(
    { flow: { text: '6.00', unit: 'inH2O' }, pressure: { text: '10', unit: 'inH2O' } },
    { ...context, bench: { ...context.bench, plate: null } },
  );
  expect(noPlate.flowM3PerS).toBeNull();
  expect(noPlate.notes.join()).toContain('dimensions of the plate');
});

it('with a scaled orifice in the same air as the port the room’s air cancels, and that is said', () => {
  const scaled = {
    ...bench,
    element: 'orificeFlow' as const,
    scaledDensityKgPerM3: chainContext().reference.densityKgPerM3,
  };
  const here = run({ bench: scaled });
  near(here.flowM3PerS! / cfm(100), 1, 1e-12);
  expect(stepOf(here, 'air').sentence).toContain('the room’s air cancels');
  expect(stepOf(run({ bench: { ...scaled, place: 'afterPort' } }), 'air').sentence).not.toContain('cancels');
});

it('flow that is corrected already keeps its figure, less its own leak, and yields the flow as it was', () => {
  const context = {
    bench: { ...bench, element: 'corrected' as const },
    leak: { reading: chainReading('2', '28'), settingRatio: 1 },
  };
  const got = run(context, '100', '14');
  // holes: the root has been taken of both, so the leak stands as shown
  near(flowFromSi(got.flowM3PerS!, 'cfm'), 98, 1e-9);
  for (const name of ['element', 'testPressure', 'air'] as const)
    expect(stepOf(got, name).state).toBe('skipped');
  // the same port on a bench that shows what it measures
  const { flowM3PerS } = got.unscaled!;
  const raw = run({}, flowFromSi(flowM3PerS, 'cfm').toFixed(6), '14');
  near(raw.flowM3PerS! / got.flowM3PerS!, 1, 1e-7);
});

it.each([
  ['at a test pressure of zero', {}, '100', '0', 'nothing to correct by'],
  [
    'when the pressure is at rest',
    { zero: { flow: null, pressure: { text: '28', unit: 'inH2O' as const } } },
    '100',
    '28',
    'nothing to correct by',
  ],
  ['at a test pressure the room does not have', {}, '100', '900', 'above the air pressure of the room'],
  [
    'when the standard pressure is nothing',
    { standardPressure: { text: '0', unit: 'inH2O' as const } },
    '100',
    '28',
    'standard test pressure',
  ],
  [
    'when the air is none',
    { room: { pressureAbsPa: 15000, temperatureK: 297, humidityRatio: 0.4 } },
    '100',
    '28',
    'absolute pressure',
  ],
  [
    'when the leak was measured at no pressure',
    { leak: { reading: chainReading('2', '0'), settingRatio: 1 } },
    '100',
    '28',
    'test pressure of the leak',
  ],
] as [string, Partial<ChainContext>, string, string, string][])(
  'stops %s and says why',
  (_what, context, flow, pressure, words) => {
    // a place below the port makes the element ask for the air there
    const got = run({ bench: { ...bench, place: 'afterPort' }, ...context }, flow, pressure);
    expect(got.flowM3PerS).toBeNull();
    expect(got.unscaled).toBeNull();
    expect(got.steps.at(-1)?.state).toBe('stopped');
    expect(got.steps.at(-1)?.sentence).toContain(words);
  },
);

it('refuses what is not one number', () => {
  expect(() => run({}, '1O0', '28')).toThrow(RangeError);
  expect(() => run({}, '100', '28..')).toThrow(RangeError);
});

it('says when the plenum’s temperature is missing and when air lies outside the equation’s range', () => {
  const got = run({ direction: 'blowing', bench: { ...bench, place: 'plenum' } });
  expect(got.notes.join()).toContain('plenum’s temperature was not noted');
  const cold = run({ room: { pressureAbsPa: 99400, temperatureK: 275, humidityRatio: 0.4 } });
  expect(cold.notes.join()).toContain('Outside the equation’s stated range');
});

const anyReading = fc.record({
  flow: fc.integer({ min: 10, max: 4000 }).map((n) => (n / 10).toFixed(1)),
  pressure: fc.integer({ min: 50, max: 400 }).map((n) => (n / 10).toFixed(1)),
});

it('the units a reading is keyed and shown in change no result', () => {
  const flows: FlowUnit[] = ['cfm', 'L/s', 'm3/h', 'm3/min'];
  const pressures: PressureUnit[] = ['inH2O', 'mmH2O', 'kPa', 'mbar', 'inHg', 'psi'];
  fc.assert(
    fc.property(
      anyReading,
      fc.constantFrom(...flows),
      fc.constantFrom(...pressures),
      (keyed, flowUnit, pressureUnit) => {
        const flow = fromSi('volumeFlow', cfm(Number(keyed.flow)), flowUnit);
        const pressure = fromSi('pressure', toSi('pressure', Number(keyed.pressure), 'inH2O'), pressureUnit);
        const show = { flowUnit, pressureUnit, decimalMark: ',' } as const;
        const other = working(
          {
            flow: { text: flow.toFixed(6), unit: flowUnit },
            pressure: { text: pressure.toFixed(6), unit: pressureUnit },
          },
          chainContext({ show }),
        );
        const slack = 1e-6 / flow + 1e-6 / pressure; // what six decimals of the keyed text leave
        near(other.flowM3PerS! / run({}, keyed.flow, keyed.pressure).flowM3PerS!, 1, slack + 1e-12);
      },
    ),
  );
});

it('drawing and blowing agree when plenum and room are alike', () => {
  fc.assert(
    fc.property(anyReading, ({ flow, pressure }) => {
      const drop = toSi('pressure', Number(pressure), 'inH2O');
      const room = chainContext().room!;
      const drawn = run({}, flow, pressure);
      // a plenum that stands at what the other direction calls the room
      const blown = run(
        {
          direction: 'blowing',
          bench: { ...bench, place: 'plenum' },
          room: { ...room, pressureAbsPa: room.pressureAbsPa - drop },
          plenum: { temperatureK: room.temperatureK, humidityRatio: room.humidityRatio },
        },
        flow,
        pressure,
      );
      near(blown.flowM3PerS! / drawn.flowM3PerS!, 1, 1e-12);
      const cd = (got: ReturnType<typeof working>) => dischargeCoefficient(got.unscaled!, 1e-3);
      near(cd(blown) / cd(drawn), 1, 1e-12);
    }),
  );
});

it('without its sentences the chain comes to the same', () => {
  fc.assert(
    fc.property(anyReading, fc.boolean(), ({ flow, pressure }, isBlown) => {
      const context = chainContext({
        direction: isBlown ? 'blowing' : 'drawing',
        leak: { reading: chainReading('2.4', '28'), settingRatio: 1 },
        room: isBlown ? chainContext().room : null,
      });
      const { steps, ...rest } = working(chainReading(flow, pressure), context);
      expect(steps).toHaveLength(9);
      expect(correctedFlow(chainReading(flow, pressure), context)).toEqual(rest);
    }),
  );
});

it('grows with the flow and falls with the test pressure, and scales with the root of the standard', () => {
  fc.assert(
    fc.property(anyReading, ({ flow, pressure }) => {
      const here = run({}, flow, pressure).flowM3PerS!;
      expect(run({}, (Number(flow) + 1).toFixed(1), pressure).flowM3PerS!).toBeGreaterThan(here);
      expect(run({}, flow, (Number(pressure) + 1).toFixed(1)).flowM3PerS!).toBeLessThan(here);
      const four = run({ standardPressure: { text: '112', unit: 'inH2O' } }, flow, pressure).flowM3PerS!;
      near(four / here, 2, 1e-12);
    }),
  );
});

it('vane and hot wire err in opposite senses when the air is not the reference', () => {
  const hot = { pressureAbsPa: 98000, temperatureK: 308.15, humidityRatio: 0 };
  const by = (element: 'vane' | 'hotWire') =>
    run({
      room: hot,
      bench: { ...bench, element, scaledDensityKgPerM3: chainContext().reference.densityKgPerM3 },
    }).flowM3PerS! / cfm(100);
  near(by('vane') * by('hotWire'), 1, 1e-12);
  expect(by('vane')).toBeLessThan(1);
});

it('a hot wire keyed as a mass flow is the same reading as its volume at its own standard density', () => {
  const hot = { ...bench, element: 'hotWire' as const, scaledDensityKgPerM3: 1.2 };
  const mass = working(
    { flow: { text: '216', unit: 'kg/h' }, pressure: { text: '28', unit: 'inH2O' } },
    chainContext({ bench: hot }),
  );
  const volume = working(
    { flow: { text: '50', unit: 'L/s' }, pressure: { text: '28', unit: 'inH2O' } },
    chainContext({ bench: hot }),
  );
  near(mass.flowM3PerS! / volume.flowM3PerS!, 1, 1e-12);
  near(mass.unscaled!.flowM3PerS * mass.unscaled!.densityKgPerM3, 0.06, 1e-12);
});

it('each step is a function of its own', () => {
  expect(
    zeroStep('zero', { unit: 'm3/s', value: cfm(3) }, { unit: 'm3/s', value: cfm(5) }, say),
  ).toMatchObject({
    value: 0,
    notes: ['The flow lies below what the instrument shows at rest.'],
  });
  expect(
    scaleStep({ unit: 'share', value: 1.2 }, { fullScaleM3PerS: 0.1, law: 'linear' }, say).notes,
  ).toHaveLength(1);
  expect(calibrationStep(cfm(100), null, say).state).toBe('skipped');
  expect(testPressureStep(0.1, 6974, 6974, say).notes).toEqual([]);
  expect(testPressureStep(0.1, 2491, 6974, say).notes).toHaveLength(1);
  expect(() => testPressureStep(0.1, 0, 6974, say)).toThrow(RangeError);
  expect(() => airStep(0.1, 0, { label: 'dry', densityKgPerM3: 1.2 }, false, say)).toThrow(OutOfRangeError);
  expect(() => leakStep(-1, 6974, null, say)).toThrow(OutOfRangeError);
  const air = {
    pressureAbsPa: 1e5,
    temperatureK: 293.15,
    humidityRatio: 0,
    densityKgPerM3: 1.2,
    notes: ['assumed'],
  };
  expect(elementStep({ element: 'vane', indicatedM3PerS: 0.1 }, air, air, say)).toMatchObject({
    value: 0.1,
    notes: ['assumed'],
  });
});

it('reads keyed figures in their own quantity', () => {
  expect(readKeyedFlow({ text: '6', unit: 'inH2O' }, 1.2)).toEqual({ unit: 'Pa', value: 6 * 249.08891 });
  expect(readKeyedRest({ text: '-2', unit: '%' }, 1.2)).toEqual({ unit: 'share', value: -0.02 });
  expect(() => readKeyedPressurePa({ text: '28', unit: 'cfm' as PressureUnit })).toThrow(OutOfRangeError);
  expect(() => readKeyedFlow({ text: '', unit: '%' }, 1.2)).toThrow(RangeError);
});
