import fc from 'fast-check';
import {
  flowForPower,
  powerFromFlow,
  speedAtMachIndex,
  usualPowerAssumptions,
} from '@/shared/flow/figures/engineEstimate';
import {
  benchVelocityMPerS,
  exhaustIntakeRatio,
  flowPerArea,
  isLikePressure,
  machIndex,
  meanPistonSpeedMPerS,
  portToPortSpread,
} from '@/shared/flow/figures/runFigures';
import vectors from '@/tests/vectors/runFigures.json';

const within = (got: number, expected: number, tolerance: number) =>
  expect(Math.abs(got - expected)).toBeLessThanOrEqual(tolerance);
// NIST SP 811: exact
const inch = 0.0254;
const cfm = 0.028316846592 / 60;
const horsepower = 745.69987158227;
const inH2O = 249.08891;
const positive = fc.double({ min: 0.001, max: 1000, noNaN: true });

describe('Mach index', () => {
  const v = vectors.machIndex;
  const input = {
    boreM: v.boreIn * inch,
    valveDiameterM: v.valveIn * inch,
    meanFlowCoefficient: v.meanFlowCoefficient,
    soundSpeedMPerS: v.soundSpeedMPerS,
  };
  it('and the speed at 0.6 come out as derived [der]', () => {
    within(machIndex(input, meanPistonSpeedMPerS(v.strokeIn * inch, v.rpm / 60)), v.z, v.zTolerance);
    const estimate = speedAtMachIndex(input, v.strokeIn * inch);
    within(estimate.speedPerS * 60, v.rpmAtLimit, v.rpmTolerance);
    expect(estimate.assumptions.map(({ name }) => name)).toEqual([
      'machIndex',
      'meanFlowCoefficient',
      'soundSpeed',
    ]);
  });
  it('halves with two valves of the same size and rises with piston speed', () => {
    within(machIndex({ ...input, valveCount: 2 }, 10), machIndex(input, 10) / 2, 1e-15);
    within(machIndex(input, 20), machIndex(input, 10) * 2, 1e-15);
  });
  it('refuses a bore of 0 and a speed that is no number', () => {
    expect(() => machIndex({ ...input, boreM: 0 }, 10)).toThrow(RangeError);
    expect(() => machIndex(input, Number.NaN)).toThrow(RangeError);
    expect(() => speedAtMachIndex(input, 0.09, 0)).toThrow(RangeError);
  });
});

describe('velocity and flow per area', () => {
  it('bench velocity comes out as derived [der]', () => {
    const v = vectors.benchVelocity;
    const areaM2 = (Math.PI / 4) * ((v.throatRatio * v.valveIn) ** 2 - v.stemIn ** 2) * inch ** 2;
    within(benchVelocityMPerS(v.cfm * cfm, areaM2) / 0.3048, v.feetPerS, v.tolerance);
  });
  it('an effective area passes the whole of the ideal flow [der]', () => {
    const v = vectors.flowPerArea;
    const ideal = (v.idealCfmPerIn2 * cfm) / inch ** 2;
    within(flowPerArea(v.cfm * cfm, v.effectiveIn2 * inch ** 2, ideal).share, 1, v.tolerance);
  });
  it('refuses an area of 0', () => {
    expect(() => benchVelocityMPerS(1, 0)).toThrow(RangeError);
    expect(() => flowPerArea(1, 1, 0)).toThrow(RangeError);
  });
});

describe('ratios between ports', () => {
  it('exhaust to intake carries its cautions', () => {
    const at = (flowM3PerS: number, pressureDropPa: number) => ({ flowM3PerS, pressureDropPa });
    expect(exhaustIntakeRatio(at(0.1, 7000), at(0.07, 7100), true)).toEqual({
      ratio: 0.07 / 0.1,
      cautions: [],
    });
    expect(exhaustIntakeRatio(at(0.1, 7000), at(0.07, 5000), false).cautions).toHaveLength(2);
    expect(() => exhaustIntakeRatio(at(0, 7000), at(0.07, 7000), true)).toThrow(RangeError);
  });
  it('like pressure means within 1 inH2O', () => {
    expect(isLikePressure(28 * inH2O, 27 * inH2O)).toBe(true);
    expect(isLikePressure(28 * inH2O, 26.9 * inH2O)).toBe(false);
    expect(() => isLikePressure(0, 1)).toThrow(RangeError);
  });
  it('spread names the lowest and the highest port and does not mind the unit', () => {
    const flows = [0.1, 0.104, 0.096];
    expect(portToPortSpread(flows)).toMatchObject({ lowestIndex: 2, highestIndex: 1 });
    fc.assert(
      fc.property(fc.array(positive, { minLength: 2, maxLength: 16 }), positive, (list, k) => {
        const spread = portToPortSpread(list);
        within(portToPortSpread(list.map((flow) => k * flow)).spreadRatio, spread.spreadRatio, 1e-9);
        within(
          spread.deviationRatios.reduce((sum, ratio) => sum + ratio, 0),
          0,
          1e-9,
        );
      }),
    );
    expect(() => portToPortSpread([1])).toThrow(RangeError);
    expect(() => portToPortSpread([0, 0])).toThrow(RangeError);
  });
});

describe('power', () => {
  const { cases, mark, densityLbPerFt3 } = vectors.power;
  const tradeAir = { ...usualPowerAssumptions, densityKgPerM3: densityLbPerFt3 * 16.018463374 };
  it.each(cases)(`of one cfm at $inH2O inH2O, $cylinders cylinders: $hpPerCfm hp [${mark}]`, (line) => {
    const { powerW, assumptions } = powerFromFlow(cfm, line.inH2O * inH2O, line.cylinders, tradeAir);
    within(powerW / horsepower, line.hpPerCfm, line.tolerance);
    expect(assumptions.map(({ name }) => name)).toContain('captureShare');
  });
  it('comes back to the flow it was estimated from, whatever is assumed', () => {
    fc.assert(
      fc.property(positive, positive, fc.integer({ min: 1, max: 16 }), positive, (flow, pressure, n, k) => {
        const assumed = { ...usualPowerAssumptions, captureShare: k };
        const { powerW } = powerFromFlow(flow, pressure, n, assumed);
        within(flowForPower(powerW, pressure, n, assumed).flowM3PerS / flow, 1, 1e-12);
      }),
    );
  });
  it('refuses assumptions of 0 and flows below 0', () => {
    expect(() => powerFromFlow(-1, 7000, 1)).toThrow(RangeError);
    expect(() => powerFromFlow(1, 0, 1)).toThrow(RangeError);
    expect(() => powerFromFlow(1, 7000, 1, { ...usualPowerAssumptions, airPerWorkKgPerJ: 0 })).toThrow(
      RangeError,
    );
    expect(() => flowForPower(1, 7000, 0)).toThrow(RangeError);
  });
});
