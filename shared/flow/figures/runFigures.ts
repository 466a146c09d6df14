import { OutOfRangeError, finite, positive, zeroOrMore } from '@/shared/units/outOfRange';

/** Pressures this close are like pressure: 1 inH2O, Pa. Beyond it the root correction flatters the deeper pull. */
const likePressurePa = 249.08891;

/** True when two test pressures are near enough to compare flows by the root alone: |p1 − p2| ≤ 1 inH2O.
 * @param firstDropPa test pressure, Pa @param secondDropPa test pressure, Pa
 * @returns true or false @throws OutOfRangeError (a RangeError) unless both are above 0
 * Range: 5 to 60 inH2O. Source: common practice of the trade; the bias of the root is below 0.1 % within it.
 * @example isLikePressure(6974.5, 6800) // true
 */
export function isLikePressure(firstDropPa: number, secondDropPa: number): boolean {
  positive(firstDropPa, 'test pressure');
  positive(secondDropPa, 'test pressure');
  return Math.abs(firstDropPa - secondDropPa) <= likePressurePa * (1 + 1e-9);
}

/** Mean velocity through an area by the flow at the inlet's density ("bench velocity"): V = Q/A.
 * @param flowM3PerS corrected flow, m³/s @param areaM2 the section, usually throat less stem, m²
 * @returns m/s @throws OutOfRangeError (a RangeError) unless the area is above 0 and the flow 0 or above
 * Range: any; the air speeds up and thins on its way, so the true speed in the throat is higher.
 * Source: continuity.
 * @example benchVelocityMPerS(0.12270633523, 0.0015412545) // 79.6146
 */
export function benchVelocityMPerS(flowM3PerS: number, areaM2: number): number {
  return zeroOrMore(flowM3PerS, 'flow') / positive(areaM2, 'area');
}

/** Flow per area with its share of what that area could pass without loss: q = Q/A, share = q/q_ideal.
 * @param flowM3PerS corrected flow, m³/s @param areaM2 valve head or throat, m² (say which beside the figure)
 * @param idealM3PerSPerM2 ideal flow per area at the standard pressure, m/s, from the isentropic equation
 * @returns flow per area in m³/s per m², share 0..1 @throws OutOfRangeError (a RangeError) unless area and ideal are above 0
 * Range: any. Source: definition; 141.6049 cfm/in² isentropic at 28 inH2O, 20 °C dry.
 * @example flowPerArea(0.1, 0.002, 103.5841).share // 0.4826996
 */
export function flowPerArea(
  flowM3PerS: number,
  areaM2: number,
  idealM3PerSPerM2: number,
): { m3PerSPerM2: number; share: number } {
  const m3PerSPerM2 = benchVelocityMPerS(flowM3PerS, areaM2);
  return { m3PerSPerM2, share: m3PerSPerM2 / positive(idealM3PerSPerM2, 'ideal flow per area') };
}

/** What the Mach index of an inlet valve needs besides the speed of the piston. */
export type MachIndexInput = {
  boreM: number;
  valveDiameterM: number;
  /** inlet valves of one cylinder; 1 when left out */
  valveCount?: number;
  /** mean flow coefficient of the inlet over its event, on the head area of the valve, 0..1 */
  meanFlowCoefficient: number;
  soundSpeedMPerS: number;
};

/** Inlet Mach index: Z = (B/Dv)²·Sp/(n·Ci·a).
 * @param input bore, valve, count, mean flow coefficient (dimensionless), speed of sound (m/s)
 * @param meanPistonSpeedMPerS mean piston speed, m/s
 * @returns Z, dimensionless @throws OutOfRangeError (a RangeError) unless every number is above 0
 * Range: breathing falls off above about 0.5 to 0.6. Source: Taylor, The Internal-Combustion Engine in Theory and
 * Practice vol. 1 ch. 6; Livengood and Stanitz, NACA TN 915 (the limit from memory).
 * @example machIndex({ boreM: 0.1016, valveDiameterM: 0.051308, meanFlowCoefficient: 0.35, soundSpeedMPerS: 343.2338 }, 19.1516) // 0.6251212
 */
export function machIndex(input: MachIndexInput, meanPistonSpeedMPerS: number): number {
  const ratio = positive(input.boreM, 'bore') / positive(input.valveDiameterM, 'valve diameter');
  const passes =
    positive(input.valveCount ?? 1, 'number of valves') *
    positive(input.meanFlowCoefficient, 'mean flow coefficient') *
    positive(input.soundSpeedMPerS, 'speed of sound');
  return (ratio ** 2 * positive(meanPistonSpeedMPerS, 'piston speed')) / passes;
}

/** Mean piston speed: Sp = 2·S·N.
 * @param strokeM stroke, m @param speedPerS crankshaft turns per second, 1/s
 * @returns m/s @throws OutOfRangeError (a RangeError) unless both are above 0
 * Range: any. Source: Heywood, Internal Combustion Engine Fundamentals, equation 2.9.
 * @example meanPistonSpeedMPerS(0.088392, 108.3333333) // 19.1516
 */
export function meanPistonSpeedMPerS(strokeM: number, speedPerS: number): number {
  return 2 * positive(strokeM, 'stroke') * positive(speedPerS, 'engine speed');
}

/** Exhaust to intake ratio of one figure, with what speaks against it. */
export type ExhaustIntakeRatio = { ratio: number; cautions: string[] };

/** Exhaust/intake ratio: Qe/Qi, meaningful at like pressure and with the exhaust's stub stated.
 * @param intake `flowM3PerS` above 0, m³/s, and `pressureDropPa` really used, Pa
 * @param exhaust the same, flow 0 or above @param isStubStated whether the sheet says with or without an exhaust stub
 * @returns ratio, dimensionless, and cautions @throws OutOfRangeError (a RangeError) for numbers outside those ranges
 * Range: 0.65 to 0.80 is usual [practice]. Source: common practice of the trade.
 * @example exhaustIntakeRatio({ flowM3PerS: 0.12, pressureDropPa: 6974 }, { flowM3PerS: 0.09, pressureDropPa: 6974 }, true).ratio // 0.75
 */
export function exhaustIntakeRatio(
  intake: { flowM3PerS: number; pressureDropPa: number },
  exhaust: { flowM3PerS: number; pressureDropPa: number },
  isStubStated: boolean,
): ExhaustIntakeRatio {
  const ratio = zeroOrMore(exhaust.flowM3PerS, 'exhaust flow') / positive(intake.flowM3PerS, 'intake flow');
  const cautions: string[] = [];
  if (!isLikePressure(intake.pressureDropPa, exhaust.pressureDropPa))
    cautions.push('Intake and exhaust were pulled at unlike pressures.');
  if (!isStubStated) cautions.push('It is not said whether the exhaust was flowed with a stub.');
  return { ratio, cautions };
}

export type PortSpread = {
  meanM3PerS: number;
  /** highest less lowest */
  spreadM3PerS: number;
  /** the same as a share of the mean */
  spreadRatio: number;
  /** places in the list */
  lowestIndex: number;
  highestIndex: number;
  /** each port's difference from the mean, as a share of it */
  deviationRatios: number[];
};

/** Port-to-port spread of one figure: (Qmax − Qmin)/Q̄.
 * @param flowsM3PerS the same figure of two ports or more, m³/s, each 0 or above
 * @returns mean, spread, its share of the mean, which port is lowest and highest
 * @throws OutOfRangeError (a RangeError) for fewer than two ports, a negative flow, or a mean of 0
 * Range: like kind, stage and pressure. Source: common practice of the trade.
 * @example portToPortSpread([0.1, 0.104, 0.096]).spreadRatio // 0.08
 */
export function portToPortSpread(flowsM3PerS: readonly number[]): PortSpread {
  if (flowsM3PerS.length < 2) throw new OutOfRangeError('ports', 'A spread needs two ports.');
  flowsM3PerS.forEach((flow) => zeroOrMore(flow, 'flow'));
  const highest = Math.max(...flowsM3PerS);
  const lowest = Math.min(...flowsM3PerS);
  const meanM3PerS = flowsM3PerS.reduce((sum, flow) => sum + flow, 0) / flowsM3PerS.length;
  positive(meanM3PerS, 'mean flow');
  return {
    meanM3PerS,
    spreadM3PerS: highest - lowest,
    spreadRatio: (highest - lowest) / meanM3PerS,
    lowestIndex: flowsM3PerS.indexOf(lowest),
    highestIndex: flowsM3PerS.indexOf(highest),
    deviationRatios: flowsM3PerS.map((flow) => finite(flow, 'flow') / meanM3PerS - 1),
  };
}
