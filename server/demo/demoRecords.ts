import type {
  Bench,
  Calibration,
  Customer,
  Head,
  PortDimension,
  ShopSettings,
  Stage,
} from '@/shared/schema/records';

/* What the demonstration shop has. Invented. */

export const demoSettings: ShopSettings = {
  standardPressureText: '28',
  standardPressureUnit: 'inH2O',
  flowUnit: 'cfm',
  pressureUnit: 'inH2O',
  liftUnit: 'in',
  decimalMark: '.',
  referenceAir: 'dry20C',
  allowsSelfApproval: false,
};

export const demoBench: Bench = {
  name: 'Corner bench',
  element: 'vane',
  elementPlace: 'afterPort',
  settingKind: 'area',
  settingText: '12.57',
  settingUnit: 'in2',
  settingStepText: '0.01',
  settingStepUnit: 'in2',
  flowResolutionText: '1',
  flowResolutionUnit: 'cfm',
  pressureResolutionText: '0.1',
  pressureResolutionUnit: 'inH2O',
  pressureLowText: '20',
  pressureLowUnit: 'inH2O',
  pressureHighText: '30',
  pressureHighUnit: 'inH2O',
  ranges: [],
  leakExponentText: '0.5',
  status: 'inUse',
  statusWhy: '',
};

/** A bench that reads true: the invented bench days were modelled with a factor of one. */
export const demoCalibration = (
  benchId: string,
  direction: Calibration['direction'],
  adoptedBy: string,
  fromAt: string,
): Calibration => ({
  benchId,
  direction,
  grade: 'computed',
  fit: { kind: 'factor', factorText: '1.000' },
  stepsOn: [],
  asFoundText: '12.31',
  asFoundUnit: 'in2',
  asLeftText: '12.57',
  asLeftUnit: 'in2',
  adoptedBy,
  fromAt,
  untilAt: null,
  withdrawnAt: null,
  note: 'Two-inch plate by its dimensions, three pulls.',
});

export const demoCustomer = (name: string): Customer => ({ name, mail: null, phone: null, note: '' });

const portsOf = (cylinderCount: number): Head['ports'] =>
  (['intake', 'exhaust'] as const).flatMap((side) =>
    Array.from({ length: cylinderCount }, (_, index) => ({ side, port: String(index + 1) })),
  );

export const demoTwoValveHead = (customerId: string): Head => ({
  customerId,
  name: 'Saloon head, iron',
  casting: 'two-valve, casting mark BW-204',
  cylinderCount: 4,
  boreText: '4.030',
  boreUnit: 'in',
  intakeValveCount: 1,
  exhaustValveCount: 1,
  ports: portsOf(4),
});

export const demoFourValveHead = (customerId: string): Head => ({
  customerId,
  name: 'Hill-climb head',
  casting: 'four-valve, casting mark BW-411',
  cylinderCount: 4,
  boreText: '86',
  boreUnit: 'mm',
  intakeValveCount: 2,
  exhaustValveCount: 2,
  ports: portsOf(4),
});

export const demoStage = (headId: string, stageOrdinal: number, name: string, workDone: string): Stage => ({
  headId,
  stageOrdinal,
  name,
  workDone,
});

type Diameters = { unit: 'in' | 'mm'; valve: string; stem: string; throat: string };

export const demoDimension = (
  stageId: string,
  side: PortDimension['side'],
  { unit, valve, stem, throat }: Diameters,
): PortDimension => ({
  stageId,
  side,
  port: null,
  valveText: valve,
  valveUnit: unit,
  seatInnerText: null,
  seatInnerUnit: null,
  stemText: stem,
  stemUnit: unit,
  throatText: throat,
  throatUnit: unit,
  seatAngleText: '45',
  seatAngleUnit: 'deg',
  smallestSectionText: null,
  smallestSectionUnit: null,
  portVolumeText: null,
  portVolumeUnit: null,
});
