import { z } from 'zod';

/** Id of any record: UUIDv7, made where the record is born. Lower case only, so that equal ids have equal text. */
export const Id = z.uuid({ version: 'v7', error: 'not a record id' }).lowercase({ error: 'not a record id' });
export type Id = z.infer<typeof Id>;

/** Instant, ISO 8601 in UTC. */
export const Instant = z.iso.datetime({ error: 'not a time in UTC' });

const oneNumber = 'not one number: digits with at most one decimal mark';

/** A quantity exactly as keyed: digits, at most one point or comma, digits after it when it is there. */
export const KeyedText = z
  .string({ error: 'a number is missing' })
  .max(12, { error: 'too long for a reading' })
  .regex(/^\d{1,7}(?:[.,]\d{1,6})?$/, { error: oneNumber });
export type KeyedText = z.infer<typeof KeyedText>;

/** Like KeyedText, with a minus allowed: temperatures, zeros, lift zero. */
export const SignedKeyedText = z
  .string({ error: 'a number is missing' })
  .max(13, { error: 'too long for a reading' })
  .regex(/^-?\d{1,7}(?:[.,]\d{1,6})?$/, { error: oneNumber });

export const FlowUnit = z.enum(['cfm', 'L/s', 'm3/h', 'm3/min', 'kg/h', 'lb/min']);
export type FlowUnit = z.infer<typeof FlowUnit>;
export const PressureUnit = z.enum(['inH2O', 'mmH2O', 'kPa', 'mbar', 'inHg', 'psi']);
export type PressureUnit = z.infer<typeof PressureUnit>;
export const LengthUnit = z.enum(['in', 'mm']);
export type LengthUnit = z.infer<typeof LengthUnit>;
/** A lift is a length or a multiple of the valve's head diameter. */
export const LiftUnit = z.enum(['in', 'mm', 'L/D']);
export type LiftUnit = z.infer<typeof LiftUnit>;
export const TemperatureUnit = z.enum(['degC', 'degF']);
export const AreaUnit = z.enum(['in2', 'mm2', 'cm2']);
export const VolumeUnit = z.enum(['cc', 'in3']);

export const Side = z.enum(['intake', 'exhaust']);
export type Side = z.infer<typeof Side>;
export const Direction = z.enum(['drawing', 'blowing']);
export type Direction = z.infer<typeof Direction>;
export const Pass = z.enum(['up', 'down', 'mixed']);
export type Pass = z.infer<typeof Pass>;
export const DecimalMark = z.enum(['.', ',']);
export type DecimalMark = z.infer<typeof DecimalMark>;

/** Short text of a person's own: a name, a label. */
export const Label = z.string().trim().min(1, { error: 'a name is missing' }).max(120, { error: 'too long' });
/** Longer free text. */
export const Note = z.string().max(4000, { error: 'too long' });

/** A lift as planned: text and unit exactly as keyed. */
export const PlannedLift = z.strictObject({ text: KeyedText, unit: LiftUnit });
export type PlannedLift = z.infer<typeof PlannedLift>;

export const Role = z.enum(['operator', 'technician', 'supervisor', 'owner']);
export type Role = z.infer<typeof Role>;
