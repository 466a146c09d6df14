import type { DecimalMark, FlowUnit, PressureUnit } from '@/shared/schema/primitives';
import { anyFlowFromSi } from '@/shared/units/massFlow';
import { showNumber } from '@/shared/units/quantity';
import { unitTables } from '@/shared/units/unitTables';

/** Says SI figures in the shop's units. */
export type Speech = {
  flow: (valueM3PerS: number) => string;
  pressure: (valuePa: number) => string;
  density: (valueKgPerM3: number) => string;
  number: (value: number, decimals: number) => string;
};

/** Says nothing: for figures whose sentences nobody reads, as the leak's own way through the chain or a whole session's. */
export const silence: Speech = { flow: () => '', pressure: () => '', density: () => '', number: () => '' };

/** Ways to say figures in the shop's units: number = value / factor, with the decimals that suit the size.
 * @param shop.flowUnit unit of flow @param shop.pressureUnit unit of pressure @param shop.decimalMark point or comma
 * @param shop.densityKgPerM3 density a mass flow is reckoned with, kg/m³
 * @returns functions from SI (m³/s, Pa, kg/m³) to text @throws OutOfRangeError (a RangeError) when a mass flow has no density
 * Range: any finite figure. Source: product.md, display units are text at the edges.
 * @example speech({ flowUnit: 'cfm', pressureUnit: 'inH2O', decimalMark: ',', densityKgPerM3: 1.2 }).flow(0.1) // "211,89 cfm"
 */
export function speech(shop: {
  flowUnit: FlowUnit;
  pressureUnit: PressureUnit;
  decimalMark: DecimalMark;
  densityKgPerM3: number;
}): Speech {
  const number = (value: number, decimals: number) => showNumber(value, decimals, shop.decimalMark);
  return {
    number,
    flow: (valueM3PerS) => {
      const value = anyFlowFromSi({ valueM3PerS, unit: shop.flowUnit, densityKgPerM3: shop.densityKgPerM3 });
      return `${number(value, decimalsFor(value))} ${shop.flowUnit}`;
    },
    pressure: (valuePa) => {
      const value = valuePa / unitTables.pressure[shop.pressureUnit];
      return `${number(value, decimalsFor(value))} ${shop.pressureUnit}`;
    },
    density: (valueKgPerM3) => `${number(valueKgPerM3, 4)} kg/m³`,
  };
}

/** A hundredth for figures of a bench, finer below ten, so that no step of the working hides what it did. */
function decimalsFor(value: number): number {
  const size = Math.abs(value);
  if (size >= 10) return 2;
  return size >= 1 ? 3 : 4;
}
