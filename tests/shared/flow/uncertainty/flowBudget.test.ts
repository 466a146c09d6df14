import { fitLine, fitThroughZero } from '@/shared/flow/statistics/lineFit';
import { budgetOf, partWords } from '@/shared/flow/uncertainty/budget';
import { calibrationParts, referenceUncertaintyRatio } from '@/shared/flow/uncertainty/calibrationParts';
import { flowBudget, statedSetUpRatio } from '@/shared/flow/uncertainty/flowBudget';
import { sampleOf } from '@/shared/flow/statistics/sampleStatistics';
import { flowBudgetInput } from '@/tests/factories/flowBudgetInput';
import { seededRandom } from '@/tests/factories/seededRandom';

const within = (got: number, expected: number, tolerance: number) =>
  expect(Math.abs(got - expected)).toBeLessThanOrEqual(tolerance);
const partOf = (over: Parameters<typeof flowBudgetInput>[0], name: keyof typeof partWords) =>
  flowBudget(flowBudgetInput(over)).parts.find((part) => part.name === name)!;

it('names every part of the specification, each with sensitivity times uncertainty as its share', () => {
  const { parts } = flowBudget(flowBudgetInput());
  expect(parts.map(({ name }) => name)).toEqual([
    ...[
      'flowResolution',
      'pressureResolution',
      'gaugeZero',
      'gaugeSpan',
      'repeat',
      'setUp',
      'liftResolution',
    ],
    ...['liftZero', 'leak', 'air', 'rootBias', 'calibration'],
  ]);
  for (const part of parts) {
    within(part.contributionM3PerS, part.sensitivity * part.standardUncertainty, 1e-18);
    expect(partWords[part.name]).toMatch(/^[a-z]/);
  }
  const shared = (by: string) => parts.filter(({ sharedBy }) => sharedBy === by).map(({ name }) => name);
  expect(shared('run')).toEqual(['setUp', 'liftZero', 'leak']);
  expect(shared('reading')).toEqual(['flowResolution', 'pressureResolution', 'repeat', 'liftResolution']);
  expect(shared('calibration')).toEqual(['calibration']);
});

it('counts half of a relative pressure uncertainty, and half of the density’s', () => {
  within(partOf({}, 'gaugeSpan').contributionM3PerS, (-0.0812 * 0.005) / 2, 1e-12);
  within(partOf({}, 'gaugeZero').contributionM3PerS, (-0.0812 * 20) / 6476.3 / 2, 1e-12);
  within(partOf({}, 'air').contributionM3PerS, (0.0812 * 0.004) / 2, 1e-12);
  within(partOf({ airExponent: -0.5 }, 'air').contributionM3PerS, (-0.0812 * 0.004) / 2, 1e-12);
  expect(partOf({ airExponent: 0 }, 'air').contributionM3PerS).toBe(0);
});

it('joins swing and step of the needle, and halves both for an instrument that reads a pressure', () => {
  within(partOf({ indicatedSwing: 4 }, 'flowResolution').standardUncertainty, Math.sqrt(17 / 12), 1e-12);
  const whole = partOf({}, 'flowResolution').sensitivity;
  within(partOf({ indicatedExponent: 0.5 }, 'flowResolution').sensitivity, whole / 2, 1e-15);
});

it('averages the repeat over the pulls but never the set-up', () => {
  within(
    partOf({ pullCount: 4 }, 'repeat').contributionM3PerS,
    partOf({}, 'repeat').contributionM3PerS / 2,
    1e-15,
  );
  expect(partOf({ pullCount: 4 }, 'setUp')).toEqual(partOf({}, 'setUp'));
});

it('takes 0.8 % as the set-up until a bench has its own', () => {
  const part = partOf({ setUp: undefined }, 'setUp');
  expect([part.standardUncertainty, part.degreesOfFreedom]).toEqual([statedSetUpRatio, Infinity]);
});

it('grows with every part that grows', () => {
  const u = (over: Parameters<typeof flowBudgetInput>[0]) =>
    flowBudget(flowBudgetInput(over)).standardUncertaintyM3PerS;
  const base = u({});
  expect(u({ indicatedStep: 5 })).toBeGreaterThan(base);
  expect(u({ pressureStepPa: 100 })).toBeGreaterThan(base);
  expect(u({ liftZeroM: 0.0002 })).toBeGreaterThan(base);
  expect(u({ liftStepM: 0.0005 })).toBeGreaterThan(base);
  expect(u({ leakUncertaintyM3PerS: 0.001 })).toBeGreaterThan(base);
  expect(u({ airRatio: 0.04 })).toBeGreaterThan(base);
  expect(u({ testDropPa: 2490.9 })).toBeGreaterThan(base);
});

describe('calibration', () => {
  const points = [0.02, 0.04, 0.06, 0.08, 0.1].map((x, i) => ({
    x,
    y: 0.001 + 1.02 * x + 0.0002 * (i % 2 ? 1 : -1),
  }));
  it('takes its grade’s uncertainty', () => {
    expect(referenceUncertaintyRatio('traceable', 0.005)).toBe(0.005);
    expect(referenceUncertaintyRatio('traceable', null)).toBeNull();
    expect(referenceUncertaintyRatio('computed', 0.002)).toBe(0.015);
    expect(referenceUncertaintyRatio('computed', 0.03)).toBe(0.03);
    expect(referenceUncertaintyRatio('comparative', null)).toBe(0.0275);
    expect(referenceUncertaintyRatio('none', 0.01)).toBeNull();
  });
  it('of grade none leaves the flow itself unknown, and says so', () => {
    const budget = flowBudget(flowBudgetInput({ calibration: { grade: 'none', referenceRatio: null } }));
    expect(budget.isAbsoluteKnown).toBe(false);
    expect(budget.cautions).toHaveLength(1);
    expect(flowBudget(flowBudgetInput()).isAbsoluteKnown).toBe(true);
  });
  it('by a line is uncertain as the line is: level and slope together give its own uncertainty', () => {
    const fit = fitLine(points);
    const at = 0.09;
    const { parts } = calibrationParts(
      { grade: 'comparative', referenceRatio: 0, fit },
      at,
      fit.intercept + fit.slope * at,
    );
    const own = Math.hypot(...parts.slice(1).map((part) => part.contributionM3PerS));
    within(own, fit.centreSd! * Math.hypot(1, ((at - fit.centreX) * fit.slopeSd!) / fit.centreSd!), 1e-15);
  });
  it('through zero is a pure factor: its share of the flow is the same everywhere', () => {
    const fit = fitThroughZero(points);
    const share = (at: number) =>
      calibrationParts({ grade: 'comparative', referenceRatio: 0, fit }, at, fit.slope * at).parts[2]!
        .contributionM3PerS / at;
    within(share(0.02), share(0.1), 1e-15);
  });
  it('by a line of two points says that its spread is not known', () => {
    const fit = fitLine(points.slice(0, 2));
    expect(
      calibrationParts({ grade: 'computed', referenceRatio: null, fit }, 0.03, 0.03).cautions,
    ).toHaveLength(1);
  });
  it('grows outside its range, above and below, and says so', () => {
    const known = {
      grade: 'traceable' as const,
      referenceRatio: 0.01,
      lowestM3PerS: 0.05,
      highestM3PerS: 0.1,
    };
    const at = (flow: number) => calibrationParts(known, flow, flow);
    expect(at(0.07)).toMatchObject({ cautions: [] });
    expect(at(0.07).parts).toHaveLength(1);
    within(at(0.12).parts[1]!.contributionM3PerS, 0.12 * 0.1 * 0.2, 1e-15);
    within(at(0.025).parts[1]!.contributionM3PerS, 0.025 * 0.1 * 0.5, 1e-15);
    expect(at(0.025).cautions).toEqual(['Outside the calibrated range.']);
  });
});

it('agrees with a simulation of the whole chain within 3 %', () => {
  const { normal, uniform } = seededRandom(2024);
  const points = [0.02, 0.04, 0.06, 0.08, 0.1].map((x, i) => ({
    x,
    y: 0.001 + 1.02 * x + 0.0004 * (i % 2 ? 1 : -1),
  }));
  const fit = fitLine(points);
  const cfm = 0.028316846592 / 60;
  const standardDropPa = 6974.48948;
  const leakM3PerS = 0.0012;
  const input = flowBudgetInput({ liftZeroM: 0.00005, indicatedSwing: 3, airRatio: 0.01 });
  const indicatedM3PerS = input.indicated * cfm;
  // at the standard pressure the root has no bias, which a simulation of random errors could not show
  const chain = (e: number[]) => {
    const [
      indicated = 0,
      dropPa = 0,
      density = 0,
      leak = 0,
      level = 0,
      slope = 0,
      reference = 0,
      liftM = 0,
      spread = 0,
    ] = e;
    const y = level + slope * (indicated * cfm - fit.centreX);
    const gross = y * reference * Math.sqrt(standardDropPa / dropPa) * Math.sqrt(density / 1.2041);
    return (gross - leak) * spread + input.slopeM3PerSPerM * (liftM - input.liftM);
  };
  const level = fit.intercept + fit.slope * fit.centreX;
  const exact = [
    input.indicated,
    standardDropPa,
    input.densityKgPerM3,
    leakM3PerS,
    level,
    fit.slope,
    1,
    input.liftM,
    1,
  ];
  const budget = flowBudget({
    ...input,
    flowM3PerS: chain(exact),
    leakM3PerS,
    indicatedM3PerS,
    testDropPa: standardDropPa,
    standardDropPa,
    calibration: { grade: 'comparative', referenceRatio: 0.01, fit },
  });
  const box = (width: number) => width * (uniform() - 0.5);
  const draws = Array.from({ length: 30000 }, () => {
    const drop = standardDropPa + box(input.pressureStepPa) + input.gaugeZeroPa * normal();
    return chain([
      input.indicated + box(input.indicatedStep) + box(3),
      drop * (1 + input.gaugeSpanRatio * normal()),
      input.densityKgPerM3 * (1 + 0.01 * normal()),
      leakM3PerS + input.leakUncertaintyM3PerS * normal(),
      level + fit.centreSd! * normal(),
      fit.slope + fit.slopeSd! * normal(),
      1 + 0.01 * normal(),
      input.liftM + box(input.liftStepM) + input.liftZeroM * normal(),
      1 + input.repeat.ratio * normal() + input.setUp!.ratio * normal(),
    ]);
  });
  within(budget.standardUncertaintyM3PerS / sampleOf(draws).standardDeviation!, 1, 0.03);
});

it.each([
  ['a test pressure of 0', { testDropPa: 0 }],
  ['a flow below 0', { flowM3PerS: -1 }],
  ['a reading of 0', { indicated: 0 }],
  ['a density of 0', { densityKgPerM3: 0 }],
  ['a slope that is no number', { slopeM3PerSPerM: Number.NaN }],
  ['no pulls', { pullCount: 0 }],
  ['a repeat without freedom', { repeat: { ratio: 0.01, degreesOfFreedom: 0 } }],
  ['a negative set-up', { setUp: { ratio: -0.01, degreesOfFreedom: 5 } }],
])('refuses %s', (_what, over) => {
  expect(() => flowBudget(flowBudgetInput(over))).toThrow(RangeError);
  expect(() => budgetOf(Number.NaN, [])).toThrow(RangeError);
});
