/* Invented bench days: modelled, not measured. Used by the demonstration shop only. Texts as an operator keys them. */

type Row = readonly [lift: string, flow: string, pressure: string];

/** Two-valve head, bench left flat out, so that the pressure sags as the port opens; the intake stalls from 0.550. */
export const twoValveIntake: readonly Row[] = [
  ['0.050', '31', '29.3'],
  ['0.100', '60', '29.1'],
  ['0.150', '88', '28.7'],
  ['0.200', '117', '28.3'],
  ['0.250', '142', '27.6'],
  ['0.300', '166', '27.0'],
  ['0.350', '180', '26.5'],
  ['0.400', '192', '26.2'],
  ['0.450', '202', '25.9'],
  ['0.500', '206', '25.6'],
  ['0.550', '200', '25.8'],
  ['0.600', '201', '25.9'],
];

export const twoValveExhaust: readonly Row[] = [
  ['0.050', '25', '29.4'],
  ['0.100', '47', '29.1'],
  ['0.150', '69', '29.0'],
  ['0.200', '89', '28.6'],
  ['0.250', '109', '28.3'],
  ['0.300', '123', '28.0'],
  ['0.350', '133', '27.8'],
  ['0.400', '140', '27.8'],
  ['0.450', '146', '27.6'],
  ['0.500', '150', '27.5'],
  ['0.550', '151', '27.4'],
  ['0.600', '152', '27.5'],
];

/** Four-valve intake, both valves open, trimmed to 28 inH2O and flat out from 6 mm. */
export const fourValveIntake: readonly Row[] = [
  ['1', '32', '28.0'],
  ['2', '62', '28.0'],
  ['3', '92', '27.9'],
  ['4', '125', '27.9'],
  ['5', '156', '28.0'],
  ['6', '183', '27.6'],
  ['7', '201', '26.2'],
  ['8', '210', '24.9'],
  ['9', '219', '24.0'],
  ['10', '226', '23.4'],
  ['11', '230', '23.0'],
];
