import { z } from 'zod';
import {
  AreaUnit,
  DecimalMark,
  Direction,
  FlowUnit,
  Id,
  Instant,
  KeyedText,
  Label,
  LengthUnit,
  LiftUnit,
  Note,
  Pass,
  PlannedLift,
  PressureUnit,
  Role,
  Side,
  SignedKeyedText,
  TemperatureUnit,
  VolumeUnit,
} from './primitives';

/* The synced records, without the columns every one carries (shop, id, version, deleted, seq).
 * A quantity is two fields, `xText` and `xUnit`, exactly as keyed; the pair is one field to merge. */

export const Customer = z.strictObject({
  name: Label,
  mail: z.email({ error: 'not a mail address' }).nullable(),
  phone: z.string().max(40).nullable(),
  note: Note,
});
export type Customer = z.infer<typeof Customer>;

/** One port of a head, as the shop names it. */
export const PortName = z.strictObject({ side: Side, port: z.string().min(1).max(20) });
export type PortName = z.infer<typeof PortName>;

export const Head = z.strictObject({
  customerId: Id,
  name: Label,
  casting: z.string().max(120),
  cylinderCount: z.number().int().min(1).max(24),
  boreText: KeyedText.nullable(),
  boreUnit: LengthUnit.nullable(),
  intakeValveCount: z.number().int().min(1).max(6),
  exhaustValveCount: z.number().int().min(1).max(6),
  ports: z.array(PortName).min(1).max(96),
});
export type Head = z.infer<typeof Head>;

export const Stage = z.strictObject({
  headId: Id,
  stageOrdinal: z.number().int().min(1).max(1000),
  name: Label,
  workDone: Note,
});
export type Stage = z.infer<typeof Stage>;

/** Dimensions of a port at a stage; `port` null stands for every port of the side. Null fields are inherited. */
export const PortDimension = z.strictObject({
  stageId: Id,
  side: Side,
  port: z.string().min(1).max(20).nullable(),
  valveText: KeyedText.nullable(),
  valveUnit: LengthUnit.nullable(),
  seatInnerText: KeyedText.nullable(),
  seatInnerUnit: LengthUnit.nullable(),
  stemText: KeyedText.nullable(),
  stemUnit: LengthUnit.nullable(),
  throatText: KeyedText.nullable(),
  throatUnit: LengthUnit.nullable(),
  seatAngleText: KeyedText.nullable(),
  seatAngleUnit: z.literal('deg').nullable(),
  smallestSectionText: KeyedText.nullable(),
  smallestSectionUnit: AreaUnit.nullable(),
  portVolumeText: KeyedText.nullable(),
  portVolumeUnit: VolumeUnit.nullable(),
});
export type PortDimension = z.infer<typeof PortDimension>;

export const FlowElement = z.enum(['vane', 'hotWire', 'pitot', 'orificeFlow', 'orificeDrop', 'corrected']);
export const ElementPlace = z.enum(['room', 'afterPort', 'plenum']);

export const BenchRange = z.strictObject({ name: Label, fullScaleText: KeyedText, fullScaleUnit: FlowUnit });

export const Bench = z.strictObject({
  name: Label,
  element: FlowElement,
  elementPlace: ElementPlace,
  settingKind: z.enum(['area', 'diameter', 'none']),
  settingText: KeyedText.nullable(),
  settingUnit: z.enum(['in2', 'cm2', 'mm2', 'in', 'mm']).nullable(),
  settingStepText: KeyedText.nullable(),
  settingStepUnit: z.enum(['in2', 'cm2', 'mm2', 'in', 'mm']).nullable(),
  flowResolutionText: KeyedText,
  flowResolutionUnit: FlowUnit,
  pressureResolutionText: KeyedText,
  pressureResolutionUnit: PressureUnit,
  pressureLowText: KeyedText.nullable(),
  pressureLowUnit: PressureUnit.nullable(),
  pressureHighText: KeyedText.nullable(),
  pressureHighUnit: PressureUnit.nullable(),
  ranges: z.array(BenchRange).max(12),
  leakExponentText: KeyedText,
  status: z.enum(['inUse', 'needsCheck', 'outOfUse']),
  statusWhy: Note,
});
export type Bench = z.infer<typeof Bench>;

export const CalibrationGrade = z.enum(['traceable', 'computed', 'comparative', 'none']);
export type CalibrationGrade = z.infer<typeof CalibrationGrade>;

/** How indicated flow becomes true flow. `factorText` is the fitted number as adopted. */
export const CalibrationFit = z.strictObject({ kind: z.literal('factor'), factorText: KeyedText });
export type CalibrationFit = z.infer<typeof CalibrationFit>;

export const Calibration = z.strictObject({
  benchId: Id,
  direction: Direction,
  grade: CalibrationGrade,
  fit: CalibrationFit,
  /** steps of the chain that were on when it was fitted */
  stepsOn: z.array(z.enum(['zero', 'scale', 'element', 'leak'])).max(4),
  asFoundText: KeyedText.nullable(),
  asFoundUnit: z.enum(['in2', 'cm2', 'mm2', 'in', 'mm']).nullable(),
  asLeftText: KeyedText.nullable(),
  asLeftUnit: z.enum(['in2', 'cm2', 'mm2', 'in', 'mm']).nullable(),
  adoptedBy: Id,
  fromAt: Instant,
  untilAt: Instant.nullable(),
  withdrawnAt: Instant.nullable(),
  note: Note,
});
export type Calibration = z.infer<typeof Calibration>;

export const SessionState = z.enum(['open', 'handedIn', 'returned', 'approved']);
export type SessionState = z.infer<typeof SessionState>;

/** The calibration a session was started with, copied in: later changes to the bench do not move old sessions. */
export const SessionCalibration = z.strictObject({
  calibrationId: Id,
  grade: CalibrationGrade,
  fit: CalibrationFit,
});

export const SessionSettings = z.strictObject({
  standardPressureText: KeyedText,
  standardPressureUnit: PressureUnit,
  flowUnit: FlowUnit,
  pressureUnit: PressureUnit,
  liftUnit: LiftUnit,
  decimalMark: DecimalMark,
  referenceAir: z.enum(['dry20C', 'isa', 'saeJ607', 'saeJ1349', 'iso1217', 'scfm']),
  showPowerEstimate: z.boolean(),
  drawing: SessionCalibration.nullable(),
  blowing: SessionCalibration.nullable(),
});
export type SessionSettings = z.infer<typeof SessionSettings>;

export const Session = z.strictObject({
  stageId: Id,
  benchId: Id,
  /** what people call it: number of the device (0 is the desk), a dash, a count: "3-012" */
  label: z.string().regex(/^\d{1,4}-\d{3,6}$/, { error: 'not a session number' }),
  state: SessionState,
  settings: SessionSettings,
  liftPlan: z.array(PlannedLift).max(60),
  plannedBy: Id,
  note: Note,
});
export type Session = z.infer<typeof Session>;

/** What is on the port for a run. Free text in the shop's words; empty means nothing was noted. */
export const SetUp = z.strictObject({
  boreAdapter: z.string().max(80),
  inlet: z.enum(['bare', 'clay', 'radius', 'runner', 'notNoted']),
  exhaustStub: z.string().max(80),
  plug: z.string().max(80),
  valves: z.enum(['own', 'shop', 'notNoted']),
  springs: z.string().max(80),
  liftReadAt: z.string().max(80),
});
export type SetUp = z.infer<typeof SetUp>;

export const Run = z.strictObject({
  sessionId: Id,
  runOrdinal: z.number().int().min(1).max(1000),
  side: Side,
  port: z.string().min(1).max(20),
  direction: Direction,
  pass: Pass,
  setUp: SetUp,
  valvesOpenCount: z.number().int().min(1).max(6),
  liftZeroBeforeText: SignedKeyedText.nullable(),
  liftZeroBeforeUnit: LengthUnit.nullable(),
  liftZeroAfterText: SignedKeyedText.nullable(),
  liftZeroAfterUnit: LengthUnit.nullable(),
  airId: Id.nullable(),
  plenumTemperatureText: SignedKeyedText.nullable(),
  plenumTemperatureUnit: TemperatureUnit.nullable(),
});
export type Run = z.infer<typeof Run>;

/** A planned lift of a run. */
export const Rung = z.strictObject({
  runId: Id,
  rungOrdinal: z.number().int().min(1).max(1000),
  liftText: KeyedText,
  liftUnit: LiftUnit,
  isSkipped: z.boolean(),
});
export type Rung = z.infer<typeof Rung>;

export const Chip = z.enum(['loud', 'breaksAway', 'unsteady', 'stall', 'leakHeard']);
export type Chip = z.infer<typeof Chip>;

export const Reading = z.strictObject({
  runId: Id,
  rungId: Id.nullable(),
  readingOrdinal: z.number().int().min(1).max(100000),
  liftText: KeyedText,
  liftUnit: LiftUnit,
  flowText: KeyedText,
  flowUnit: FlowUnit,
  pressureText: KeyedText,
  pressureUnit: PressureUnit,
  range: z.string().max(40).nullable(),
  leakId: Id.nullable(),
  zeroId: Id.nullable(),
  /** the pressure was taken over from the reading before by one key, not read again */
  isPressureRepeated: z.boolean(),
  needleSwingText: KeyedText.nullable(),
  needleSwingUnit: FlowUnit.nullable(),
  fan: z.enum(['flatOut', 'trimmed', 'notNoted']),
  chips: z.array(Chip).max(5),
  isUsed: z.boolean(),
  notUsedWhy: Note,
  secondLook: z.enum(['none', 'doubted', 'kept', 'settled']),
  byPersonId: Id,
  deviceId: Id.nullable(),
  at: Instant,
});
export type Reading = z.infer<typeof Reading>;

/** Settings of the shop, copied into a session when it starts. */
export const ShopSettings = z.strictObject({
  standardPressureText: KeyedText,
  standardPressureUnit: PressureUnit,
  flowUnit: FlowUnit,
  pressureUnit: PressureUnit,
  liftUnit: LiftUnit,
  decimalMark: DecimalMark,
  referenceAir: SessionSettings.shape.referenceAir,
  allowsSelfApproval: z.boolean(),
});
export type ShopSettings = z.infer<typeof ShopSettings>;

export const RosterPerson = z.strictObject({
  id: Id,
  name: Label,
  roles: z.array(Role),
  /** bcrypt hash of the PIN; null while no PIN is set */
  pinHash: z.string().nullable(),
});
export type RosterPerson = z.infer<typeof RosterPerson>;
