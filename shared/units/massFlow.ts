import type { FlowUnit } from '@/shared/schema/primitives';
import { positive } from './outOfRange';
import { flowFromSi, flowM3PerS, isVolumeFlow, readNumber } from './quantity';
import { fromSi, toSi } from './unitTables';

/** Flow of any unit as a volume flow: Q = number · factor, or Q = ṁ / ρ for a mass flow.
 * @param flow.text flow as keyed, in `flow.unit` @param flow.unit unit of flow, volume or mass
 * @param flow.densityKgPerM3 density of the air the volume is wanted in, kg/m³ (a volume flow does not use it)
 * @returns m³/s @throws RangeError when it is not one number, or a mass flow comes with a density not above 0
 * Range: 0 on. Source: NIST SP 811 (2008) appendix B, 1 lb = 0.45359237 kg.
 * @example anyFlowM3PerS({ text: '10', unit: 'lb/min', densityKgPerM3: 1.2 }) // 0.06299894
 */
export function anyFlowM3PerS(flow: { text: string; unit: FlowUnit; densityKgPerM3: number }): number {
  if (isVolumeFlow(flow.unit)) return flowM3PerS(flow.text, flow.unit);
  const densityKgPerM3 = positive(flow.densityKgPerM3, 'density of the air');
  return toSi('massFlow', readNumber(flow.text), flow.unit) / densityKgPerM3;
}

/** Volume flow in any unit of flow: number = Q / factor, or number = Q · ρ / factor for a mass flow.
 * @param flow.valueM3PerS volume flow, m³/s @param flow.unit unit of flow, volume or mass
 * @param flow.densityKgPerM3 density of that air, kg/m³ (a volume flow does not use it)
 * @returns number in `flow.unit` @throws RangeError when a mass flow is wanted with a density not above 0
 * Range: any finite number. Source: NIST SP 811 (2008) appendix B.
 * @example anyFlowFromSi({ valueM3PerS: 0.1, unit: 'kg/h', densityKgPerM3: 1.2 }) // 432.0
 */
export function anyFlowFromSi(flow: { valueM3PerS: number; unit: FlowUnit; densityKgPerM3: number }): number {
  if (isVolumeFlow(flow.unit)) return flowFromSi(flow.valueM3PerS, flow.unit);
  return fromSi(
    'massFlow',
    flow.valueM3PerS * positive(flow.densityKgPerM3, 'density of the air'),
    flow.unit,
  );
}
