/**
 * Power and speed from flow. These are **estimates**: every result carries its assumptions, which stand beside the
 * figure and can be changed. Whether they are shown at all is the screen's business (off by default).
 */
import { type MachIndexInput, machIndex, meanPistonSpeedMPerS } from '@/shared/flow/figures/runFigures';
import { positive, zeroOrMore } from '@/shared/units/outOfRange';

/** One assumption behind an estimate, in SI, with the sentence that stands beside the figure. */
export type Assumption = { name: string; value: number; unit: string; sentence: string };

/** Standard pressure the trade's constants are stated at: 28 inH2O (conventional), Pa. */
const tradePressurePa = 6974.48948;

/** What turns flow into power. */
export type PowerAssumptions = {
  /** k: share of the bench flow at 28 inH2O that a cylinder takes in on average, 0..1 */
  captureShare: number;
  /** BSAC: air used per work done, kg/J */
  airPerWorkKgPerJ: number;
  /** density of the air the flow is stated in, kg/m³ */
  densityKgPerM3: number;
};

/** The trade's usual assumptions: k = 0.334, BSAC = 5.85 lb/(hp h), air of 20 °C, 101.325 kPa, dry. Practice, no source. */
export const usualPowerAssumptions: PowerAssumptions = {
  captureShare: 0.334,
  airPerWorkKgPerJ: (5.85 * 0.45359237) / (745.69987158227 * 3600),
  densityKgPerM3: 1.2045573,
};

export type PowerEstimate = { powerW: number; flowAt28M3PerS: number; assumptions: Assumption[] };

function requireAssumptions(given: PowerAssumptions): PowerAssumptions {
  positive(given.captureShare, 'share of the flow');
  positive(given.airPerWorkKgPerJ, 'air per work');
  positive(given.densityKgPerM3, 'density');
  return given;
}

/** Watts from one cubic metre a second at 28 inH2O, all cylinders. */
function wattsPerFlow(given: PowerAssumptions, cylinders: number): number {
  return (cylinders * given.captureShare * given.densityKgPerM3) / given.airPerWorkKgPerJ;
}

function assumptionsOf(given: PowerAssumptions, cylinders: number, testDropPa: number): Assumption[] {
  return [
    { name: 'cylinders', value: cylinders, unit: '1', sentence: 'Every cylinder flows like this port.' },
    {
      name: 'captureShare',
      value: given.captureShare,
      unit: '1',
      sentence: 'Share of the bench flow that a cylinder takes in on average.',
    },
    {
      name: 'airPerWork',
      value: given.airPerWorkKgPerJ,
      unit: 'kg/J',
      sentence: 'Air used per power and hour at best speed.',
    },
    { name: 'density', value: given.densityKgPerM3, unit: 'kg/m³', sentence: 'Air the flow is stated in.' },
    {
      name: 'testPressure',
      value: testDropPa,
      unit: 'Pa',
      sentence: 'Brought to 28 inH2O by the square root.',
    },
  ];
}

/** Power that a flow can feed: P = n·Q28·ρ·k/BSAC, Q28 = Q·√(p28/p).
 * @param flowM3PerS flow of one cylinder's intake, m³/s, 0 or above @param testDropPa pressure that flow is stated at, Pa
 * @param cylinders how many alike, 1 or more @param assumptions k (0..1), BSAC (kg/J), density (kg/m³)
 * @returns power in W with its assumptions @throws OutOfRangeError (a RangeError) for numbers outside those ranges
 * Range: tuned four-stroke petrol engines at the speed where the port is the limit; an estimate.
 * Source: air balance; constants are practice, 0.257 hp per cfm at 28 inH2O and cylinder with the usual ones.
 * @example powerFromFlow(0.0004719474432, 6974.48948, 1).powerW // 192.1
 */
export function powerFromFlow(
  flowM3PerS: number,
  testDropPa: number,
  cylinders: number,
  assumptions: PowerAssumptions = usualPowerAssumptions,
): PowerEstimate {
  zeroOrMore(flowM3PerS, 'flow');
  positive(cylinders, 'number of cylinders');
  const flowAt28M3PerS = flowM3PerS * Math.sqrt(tradePressurePa / positive(testDropPa, 'test pressure'));
  return {
    powerW: flowAt28M3PerS * wattsPerFlow(requireAssumptions(assumptions), cylinders),
    flowAt28M3PerS,
    assumptions: assumptionsOf(assumptions, cylinders, testDropPa),
  };
}

/** Flow of one intake that a power asks for: powerFromFlow turned round, Q = P·BSAC/(n·ρ·k)·√(p/p28).
 * @param powerW power, W, 0 or above @param testDropPa pressure the flow is to be stated at, Pa
 * @param cylinders how many alike, 1 or more @param assumptions k (0..1), BSAC (kg/J), density (kg/m³)
 * @returns flow in m³/s with its assumptions @throws OutOfRangeError (a RangeError) for numbers outside those ranges
 * Range: as powerFromFlow. Source: as powerFromFlow.
 * @example flowForPower(powerFromFlow(0.1, 2490.8891, 8).powerW, 2490.8891, 8).flowM3PerS // 0.1
 */
export function flowForPower(
  powerW: number,
  testDropPa: number,
  cylinders: number,
  assumptions: PowerAssumptions = usualPowerAssumptions,
): { flowM3PerS: number; assumptions: Assumption[] } {
  zeroOrMore(powerW, 'power');
  positive(cylinders, 'number of cylinders');
  const at28 = powerW / wattsPerFlow(requireAssumptions(assumptions), cylinders);
  return {
    flowM3PerS: at28 * Math.sqrt(positive(testDropPa, 'test pressure') / tradePressurePa),
    assumptions: assumptionsOf(assumptions, cylinders, testDropPa),
  };
}

export type SpeedEstimate = { speedPerS: number; machIndex: number; assumptions: Assumption[] };

/** Engine speed at which the inlet reaches a Mach index: N = Z·n·Ci·a·(Dv/B)²/(2·S).
 * @param input bore, valve, count, mean flow coefficient, speed of sound, as machIndex @param strokeM stroke, m
 * @param limit Mach index, dimensionless, 0.6 by default
 * @returns speed in turns per second with its assumptions @throws OutOfRangeError (a RangeError) unless every number is above 0
 * Range: "Mach index 0.6 near N rpm"; the fall of breathing is gradual. Source: as machIndex.
 * @example speedAtMachIndex({ boreM: 0.1016, valveDiameterM: 0.051308, meanFlowCoefficient: 0.35, soundSpeedMPerS: 343.2338 }, 0.088392).speedPerS * 60 // 6238.79
 */
export function speedAtMachIndex(input: MachIndexInput, strokeM: number, limit = 0.6): SpeedEstimate {
  positive(limit, 'Mach index');
  const speedPerS = limit / machIndex(input, meanPistonSpeedMPerS(strokeM, 1));
  const assumptions: Assumption[] = [
    {
      name: 'machIndex',
      value: limit,
      unit: '1',
      sentence: 'Breathing falls off above a Mach index of about 0.5 to 0.6.',
    },
    {
      name: 'meanFlowCoefficient',
      value: input.meanFlowCoefficient,
      unit: '1',
      sentence: 'Mean flow coefficient of the inlet over its event, on the head area.',
    },
    {
      name: 'soundSpeed',
      value: input.soundSpeedMPerS,
      unit: 'm/s',
      sentence: 'Speed of sound in the inlet.',
    },
  ];
  return { speedPerS, machIndex: limit, assumptions };
}
