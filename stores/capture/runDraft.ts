import { z } from 'zod';
import { Id } from '@/shared/schema/primitives';
import { Chip } from '@/shared/schema/records';
import type { KeypadDraft } from '@/shared/entry/keypad';

const Digits = z.string().regex(/^(?:\d{1,6}(?:[.,]\d{0,4})?)?$/);

/** What a run's capture screen opens on: the lift being keyed and the digits in its fields. */
export const RunDraft = z.strictObject({
  /** null: the run was finished */
  rungId: Id.nullable(),
  lane: z.enum(['flow', 'pressure']),
  flowText: Digits,
  pressureText: Digits,
  isPressureRepeated: z.boolean(),
  chips: z.array(Chip).max(5),
});
export type RunDraft = z.infer<typeof RunDraft>;

/** Reads what the device kept; null when there is nothing, or nothing this version can read. */
export const parseRunDraft = (kept: unknown): RunDraft | null => RunDraft.nullable().catch(null).parse(kept);

/** Nothing keyed, on a given rung. */
export const emptyDraft = (rungId: string | null): RunDraft => ({
  rungId,
  lane: 'flow',
  flowText: '',
  pressureText: '',
  isPressureRepeated: false,
  chips: [],
});

/** The pad's part of a draft. */
export const keypadPart = ({ lane, flowText, pressureText, isPressureRepeated }: RunDraft): KeypadDraft => ({
  lane,
  flowText,
  pressureText,
  isPressureRepeated,
});
