import type { ColumnRung } from '@/components/column/rungState';
import type { StatusFacts } from '@/components/ui/StatusStrip';
import type { KeypadEvent, KeypadState } from '@/shared/entry/keypad';
import type { FlowUnit, PressureUnit } from '@/shared/schema/primitives';
import type { Chip } from '@/shared/schema/records';

/** The reading that stands in the result row. */
export type ShownResult = {
  readingId: string;
  /** null while it cannot be computed; the words then say why */
  correctedText: string | null;
  /** "Saved on this device", "sent" */
  words: string;
  /** UNDO stands there until then (clock of Date.now); null: not from here */
  undoUntilMs: number | null;
};
/** A second look at the reading just saved. Keying on means "keep, undecided". */
export type ShownDoubt = { sentence: string; answers: { id: string; title: string }[] };

export type CaptureProps = {
  /** "Intake 1", with the stage where there is room */
  runTitle: string;
  /** lowest lift first */
  rungs: ColumnRung[];
  /** null when every lift is saved or skipped */
  currentRungId: string | null;
  keypad: KeypadState;
  result: ShownResult | null;
  doubt?: ShownDoubt | null;
  facts: StatusFacts;
  flowUnit: FlowUnit;
  pressureUnit: PressureUnit;
  /** "28 inH2O": what corrected figures stand at */
  standardPressure: string;
  /** what was noted for the reading being keyed */
  chips: Chip[];
  /** why this run cannot be keyed (handed in, another tab); the pad then gives way to it */
  lockedSentence?: string | null;
  /** every key, pad and keyboard; step the reducer with it and save when it says commit */
  onKeypadEvent: (event: KeypadEvent) => void;
  onUndo: (readingId: string) => void;
  onAnswerDoubt?: (answerId: string) => void;
  onRepeat: () => void;
  onSkip: () => void;
  onGoToRung: (rungId: string) => void;
  onAddLift: () => void;
  onToggleChip: (chip: Chip) => void;
  onOpenWorking: (readingId: string) => void;
  onOpenStatus: () => void;
  /** to the list of runs, nothing finished */
  onLeave: () => void;
  onFinishRun: () => void;
};

const subscripts: Record<string, string> = {
  inH2O: 'inH₂O',
  mmH2O: 'mmH₂O',
  'm3/h': 'm³/h',
  'm3/min': 'm³/min',
};
/** A unit as it is written for people. */
export function unitLabel(unit: string): string {
  return subscripts[unit] ?? unit;
}

export const chipWords: Record<Chip, string> = {
  loud: 'Loud',
  breaksAway: 'Breaks away',
  unsteady: 'Unsteady',
  stall: 'Stall',
  leakHeard: 'Leak heard',
};
