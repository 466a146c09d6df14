import { airDensityKgPerM3 } from '@/shared/flow/air/moistAir';
import { propagate, sensitivitiesOf } from '@/shared/flow/uncertainty/propagation';
import { between, zeroOrMore } from '@/shared/units/outOfRange';

/** Standard uncertainty of the air's density as a share of it: law of propagation through the density equation.
 * @param state `pressureAbsPa` (Pa), `temperatureK` (K), `humidityRatio` (0..1)
 * @param uncertainty standard uncertainties of the three, Pa, K, share of saturation; 0 or above
 * @returns u(ρ)/ρ, dimensionless @throws OutOfRangeError (a RangeError) for numbers outside the density's range
 * Range: as airDensityKgPerM3. Source: GUM 5.1.2 with CIPM-2007.
 * @example airDensityUncertaintyRatio({ pressureAbsPa: 101325, temperatureK: 293.15, humidityRatio: 0.5 }, { pressureAbsPa: 100, temperatureK: 0.5, humidityRatio: 0 }) // 0.00210
 */
export function airDensityUncertaintyRatio(
  state: { pressureAbsPa: number; temperatureK: number; humidityRatio: number },
  uncertainty: { pressureAbsPa: number; temperatureK: number; humidityRatio: number },
): number {
  const names = ['pressureAbsPa', 'temperatureK', 'humidityRatio'] as const;
  const inputs = names.map((name) => {
    const standardUncertainty = zeroOrMore(uncertainty[name], 'standard uncertainty');
    if (name !== 'humidityRatio') return { value: state[name], standardUncertainty };
    // density goes straight with humidity: the step is taken inside dry and saturated air
    const step = between(standardUncertainty, 0, 0.5, 'uncertainty of the humidity');
    return { value: Math.min(1 - step, Math.max(step, state[name])), standardUncertainty };
  });
  const density = ([pressureAbsPa = 0, temperatureK = 0, humidityRatio = 0]: readonly number[]) =>
    airDensityKgPerM3({ pressureAbsPa, temperatureK, humidityRatio });
  const sensitivities = sensitivitiesOf(density, inputs);
  const u = propagate(
    inputs.map(({ standardUncertainty }, i) => ({ sensitivity: sensitivities[i] ?? 0, standardUncertainty })),
  );
  return u / airDensityKgPerM3(state);
}
