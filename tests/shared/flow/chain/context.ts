import { referenceAir, referenceDensityKgPerM3 } from '@/shared/flow/air/referenceAir';
import type { ChainContext, ChainReading } from '@/shared/flow/chain/chainTypes';

/** A bench with a vane in the room, drawing, with air recorded and nothing else. */
export function chainContext(over: Partial<ChainContext> = {}): ChainContext {
  const air = referenceAir('dry20C');
  return {
    bench: {
      element: 'vane',
      place: 'room',
      scaledDensityKgPerM3: null,
      plate: null,
      leakExponent: 0.5,
      isLeakBeforeElement: true,
    },
    direction: 'drawing',
    range: null,
    zero: null,
    calibration: null,
    leak: null,
    room: { pressureAbsPa: 99400, temperatureK: 297.15, humidityRatio: 0.45 },
    plenum: null,
    standardPressure: { text: '28', unit: 'inH2O' },
    reference: { label: air.label, densityKgPerM3: referenceDensityKgPerM3('dry20C'), air },
    show: { flowUnit: 'cfm', pressureUnit: 'inH2O', decimalMark: '.' },
    ...over,
  };
}

/** A reading in cfm and inH2O. */
export function chainReading(flowText: string, pressureText: string): ChainReading {
  return { flow: { text: flowText, unit: 'cfm' }, pressure: { text: pressureText, unit: 'inH2O' } };
}
