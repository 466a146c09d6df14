import type { z } from 'zod';
import type { TemperatureUnit } from '@/shared/schema/primitives';
import { OutOfRangeError, positive } from './outOfRange';
import { readSignedNumber } from './quantity';

type Unit = z.infer<typeof TemperatureUnit>;

const zeroCelsiusK = 273.15;
const zeroFahrenheitK = 459.67 / 1.8;

/** Temperature in SI: T = t + 273.15, or T = (t + 459.67)/1.8.
 * @param text temperature as keyed, in `unit` @param unit °C or °F
 * @returns K @throws RangeError when it is not one number, OutOfRangeError at or below absolute zero
 * Range: above absolute zero. Source: NIST SP 811 (2008) appendix B.
 * @example temperatureInK('60', 'degF') // 288.705556
 */
export function temperatureInK(text: string, unit: Unit): number {
  const value = readSignedNumber(text);
  const temperatureK = unit === 'degC' ? value + zeroCelsiusK : value / 1.8 + zeroFahrenheitK;
  if (!(temperatureK > 0))
    throw new OutOfRangeError('temperature', 'The temperature is below absolute zero.');
  return temperatureK;
}

/** Temperature out of SI: t = T − 273.15, or t = 1.8 T − 459.67.
 * @param valueK temperature, K @param unit °C or °F
 * @returns number in `unit` @throws OutOfRangeError (a RangeError) unless finite and above 0 K
 * Range: above absolute zero. Source: NIST SP 811 (2008) appendix B.
 * @example temperatureFromK(293.15, 'degF') // 68.0
 */
export function temperatureFromK(valueK: number, unit: Unit): number {
  const temperatureK = positive(valueK, 'temperature in kelvin');
  return unit === 'degC' ? temperatureK - zeroCelsiusK : (temperatureK - zeroFahrenheitK) * 1.8;
}
