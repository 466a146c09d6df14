import fc from 'fast-check';
import { wallPlateFlow } from '@/shared/flow/orifice/orificeFlow';
import {
  type SettingKind,
  halfStepRatio,
  isSettled,
  nextSetting,
  offsetFromTwoFlows,
} from '@/shared/flow/setting/nextSetting';
import { referenceFlowTodayM3PerS } from '@/shared/flow/setting/referenceToday';
import { type TraverseRule, traverseFlowM3PerS, traversePointsM } from '@/shared/flow/setting/traverse';
import { OutOfRangeError } from '@/shared/units/outOfRange';
import { fromSi, toSi } from '@/shared/units/unitTables';
import vectors from '@/tests/vectors/setting.json';

const near = (got: number, wanted: number, absolute: number) =>
  expect(Math.abs(got - wanted)).toBeLessThanOrEqual(absolute);
const cfm = (value: number) => toSi('volumeFlow', value, 'cfm');

// source and mark of each group: tests/vectors/setting.json
it('proposes the next area setting', () => {
  const v = vectors.next;
  const got = nextSetting({
    kind: 'area',
    setting: v.setting,
    measuredM3PerS: cfm(v.measured),
    targetM3PerS: cfm(v.target),
    settingStep: 0.01,
  });
  near(got.exactSetting, v.wanted, v.absolute);
  near(got.nearest.setting, 12.85, 1e-12);
  near(got.nearest.errorRatio, 12.85 / v.wanted - 1, 1e-7);
  near(got.neighbour.setting, 12.84, 1e-12);
  expect(got.isNeighbourBetter).toBe(false);
});

it('a diameter acts by its square', () => {
  const got = nextSetting({
    kind: 'diameter',
    setting: 4,
    measuredM3PerS: 1,
    targetM3PerS: 1.21,
    settingStep: 0.1,
  });
  near(got.exactSetting, 4.4, 1e-12);
  near(got.nearest.errorRatio, 0, 1e-12);
});

// a diameter acts by its square, so the middle between two steps lies a little above the plain one
it('offers the neighbour only where it leaves less', () => {
  const pull = (target: number) =>
    nextSetting({ kind: 'diameter', setting: 10, measuredM3PerS: 100, targetM3PerS: target, settingStep: 1 });
  // exact 10.49: nearest 10 leaves −9.1 %, neighbour 11 leaves +10 %
  expect(pull(10.49 ** 2).isNeighbourBetter).toBe(false);
  // exact 10.505: nearest 11 leaves +9.6 %, neighbour 10 leaves −9.4 %
  const close = pull(10.505 ** 2);
  expect(close.nearest.setting).toBe(11);
  expect(close.isNeighbourBetter).toBe(true);
  expect(Math.abs(close.neighbour.errorRatio)).toBeLessThan(Math.abs(close.nearest.errorRatio));
});

const anyKind = fc.constantFrom<SettingKind>('area', 'diameter');

it('a bench whose reading is proportional is set by one pull, and the factor takes the rest', () => {
  fc.assert(
    fc.property(
      anyKind,
      fc.double({ min: 3, max: 30, noNaN: true }),
      fc.double({ min: 0.6, max: 1.6, noNaN: true }),
      (kind, setting, share) => {
        const power = kind === 'area' ? 1 : 2;
        const reads = (s: number) => 0.1 * (s / setting) ** power * share;
        const got = nextSetting({
          kind,
          setting,
          measuredM3PerS: reads(setting),
          targetM3PerS: 0.1,
          settingStep: 0.01,
        });
        near(reads(got.exactSetting), 0.1, 1e-12);
        for (const choice of [got.nearest, got.neighbour]) {
          near(reads(choice.setting) / 0.1 - 1, choice.errorRatio, 1e-12);
          near(reads(choice.setting) * choice.factorRatio, 0.1, 1e-12);
        }
        expect(Math.abs(got.nearest.setting - got.exactSetting)).toBeLessThanOrEqual(0.005 + 1e-9);
        expect(Math.abs(got.neighbour.setting - got.exactSetting)).toBeLessThanOrEqual(0.01 + 1e-9);
        const half = halfStepRatio(kind, got.exactSetting, 0.01);
        expect(Math.abs(got.nearest.errorRatio)).toBeLessThanOrEqual(half * 1.01 + 1e-12);
      },
    ),
  );
});

it('stops inside the largest of tolerance, half a step and noise, and not outside', () => {
  const search = {
    errorRatio: 0.0049,
    toleranceRatio: 0.002,
    halfStepRatio: 0.001,
    noiseRatio: 0.005,
    pullCount: 4,
  };
  expect(isSettled(search)).toEqual({ isSettled: true, limitRatio: 0.005 });
  expect(isSettled({ ...search, errorRatio: -0.0051 }).isSettled).toBe(false);
  expect(isSettled({ ...search, pullCount: 100 }).limitRatio).toBe(0.002);
  expect(isSettled({ ...search, halfStepRatio: 0.02 }).limitRatio).toBe(0.02);
  expect(() => isSettled({ ...search, pullCount: 0 })).toThrow(OutOfRangeError);
  expect(() => isSettled({ ...search, errorRatio: Number.NaN })).toThrow(OutOfRangeError);
});

it('a second flow shows the offset that one flow hides', () => {
  const v = vectors.lateVane;
  const late = v.lateMPerS * (Math.PI / 4) * toSi('length', v.ductIn, 'in') ** 2;
  const share = cfm(v.setCfm) / (cfm(v.setCfm) - late); // the setting found at the one flow
  const reads = (flow: number) => (flow - late) * share;
  near(reads(cfm(v.setCfm)) / cfm(v.setCfm), 1, 1e-12);
  near(reads(cfm(v.lowCfm)) / cfm(v.lowCfm) - 1, v.errorRatio, v.absolute);
  const got = offsetFromTwoFlows(
    { indicatedM3PerS: reads(cfm(v.lowCfm)), trueM3PerS: cfm(v.lowCfm) },
    { indicatedM3PerS: reads(cfm(v.setCfm)), trueM3PerS: cfm(v.setCfm) },
  );
  near(got.slopeRatio, share, 1e-12);
  near(got.offsetM3PerS, -late * share, 1e-12);
  const one = { indicatedM3PerS: 0.1, trueM3PerS: 0.1 };
  expect(() => offsetFromTwoFlows(one, one)).toThrow(/tenth/);
});

const air = { pressureAbsPa: 101325, densityKgPerM3: 1.2041054 };

it('a plate brought to today’s pressure and air is what the plate passes today', () => {
  fc.assert(
    fc.property(
      fc.double({ min: 5, max: 40, noNaN: true }),
      fc.double({ min: 5, max: 40, noNaN: true }),
      fc.double({ min: 85e3, max: 105e3, noNaN: true }),
      (statedInH2O, todayInH2O, pressureAbsPa) => {
        const stated = { ...air, pressureDropPa: toSi('pressure', statedInH2O, 'inH2O') };
        const today = {
          pressureAbsPa,
          densityKgPerM3: 1.1,
          pressureDropPa: toSi('pressure', todayInH2O, 'inH2O'),
        };
        const passes = (state: typeof stated) =>
          wallPlateFlow({ boreM: 0.05, coefficient: 0.6 }, { ...state, temperatureK: 293.15 }).flowM3PerS;
        const got = referenceFlowTodayM3PerS({ kind: 'plate', flowM3PerS: passes(stated) }, stated, today);
        near(got / passes(today), 1, 1e-12);
      },
    ),
  );
});

// flow-maths §1: the plain root from 10 to 28 inH2O reads 1.1 % high on a sharp plate
it('a plate’s own expansibility keeps the 1.1 % that the plain root would add from 10 to 28', () => {
  const at = (inH2O: number) => ({ ...air, pressureDropPa: toSi('pressure', inH2O, 'inH2O') });
  const plate = referenceFlowTodayM3PerS({ kind: 'plate', flowM3PerS: 0.1 }, at(10), at(28));
  const head = referenceFlowTodayM3PerS({ kind: 'head', flowM3PerS: 0.1 }, at(10), at(28));
  near(head, 0.1 * 1.6733201, 5e-9);
  near(head / plate - 1, 0.011, 5e-4);
});

it.each(vectors.traverse.rows)('three points a radius, $rule', ({ rule, points }) => {
  const got = traversePointsM({ rule: rule as TraverseRule, pointsPerRadius: 3, ductDiameterM: 1 });
  expect(got.slice(0, 3)).toEqual(points);
  got.slice(3).forEach((y, i) => near(1 - y, got[2 - i]!, 1e-12));
});

// what the rules are made for: the mean over the points is the mean over the area, for profiles of duct flow
it.each([
  ['logTchebycheff', 3],
  ['logTchebycheff', 5],
  ['logLinear', 3],
  ['logLinear', 5],
] as const)(
  '%s with %p points finds the flow of power-law profiles within 0.6 %',
  (rule, pointsPerRadius) => {
    for (const n of [6, 7, 8, 9, 10]) {
      const points = traversePointsM({ rule, pointsPerRadius, ductDiameterM: 1 });
      const velocities = points.map((y) => (2 * Math.min(y, 1 - y)) ** (1 / n));
      const wanted = (2 * n * n) / ((n + 1) * (2 * n + 1)); // mean over centre velocity of u = (y/R)^(1/n)
      near(traverseFlowM3PerS(1, velocities) / ((Math.PI / 4) * wanted), 1, 6e-3);
    }
  },
);

it('2000 ft/min in a 4 in duct', () => {
  const v = vectors.duct;
  const got = traverseFlowM3PerS(toSi('length', v.ductIn, 'in'), [toSi('speed', v.ftPerMin, 'ft/min')]);
  near(fromSi('volumeFlow', got, 'cfm'), v.cfm, v.absolute);
});

it.each([0, -1, Number.NaN, Number.POSITIVE_INFINITY])(
  'refuses %p as setting, step, flow, duct or stated flow',
  (x) => {
    const pull = {
      kind: 'area' as const,
      setting: 12,
      measuredM3PerS: 0.1,
      targetM3PerS: 0.1,
      settingStep: 0.01,
    };
    for (const key of ['setting', 'measuredM3PerS', 'targetM3PerS', 'settingStep'])
      expect(() => nextSetting({ ...pull, [key]: x })).toThrow(OutOfRangeError);
    expect(() => halfStepRatio('area', x, 0.1)).toThrow(OutOfRangeError);
    expect(() => traversePointsM({ rule: 'logLinear', pointsPerRadius: 3, ductDiameterM: x })).toThrow(
      OutOfRangeError,
    );
    const state = { ...air, pressureDropPa: 6974 };
    expect(() => referenceFlowTodayM3PerS({ kind: 'head', flowM3PerS: x }, state, state)).toThrow(
      OutOfRangeError,
    );
  },
);

it('refuses a step too coarse for the setting, a rule that does not exist and a traverse without points', () => {
  const pull = {
    kind: 'area' as const,
    setting: 12,
    measuredM3PerS: 0.1,
    targetM3PerS: 0.1,
    settingStep: 20,
  };
  expect(() => nextSetting(pull)).toThrow(/coarse/);
  const odd = { rule: 'logLinear' as const, pointsPerRadius: 4 as 3, ductDiameterM: 0.1 };
  expect(() => traversePointsM(odd)).toThrow(OutOfRangeError);
  expect(() => traverseFlowM3PerS(0.1, [])).toThrow(OutOfRangeError);
});
