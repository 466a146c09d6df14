import { KeyedText, Label, Note } from '@/shared/schema/primitives';

/** Checks of what is written into a form: a sentence, or null. */
export const checkLabel = (text: string): string | null => firstIssue(Label.safeParse(text), 'Enter a name.');

export const checkNote = (text: string): string | null =>
  Note.safeParse(text).success ? null : 'That is longer than 4000 characters.';

export const checkShort =
  (most: number) =>
  (text: string): string | null =>
    text.length <= most ? null : `That is longer than ${most} characters.`;

/** A whole number within bounds. */
export const checkCount =
  (least: number, most: number) =>
  (text: string): string | null => {
    const value = Number(text);
    return /^\d+$/.test(text.trim()) && value >= least && value <= most
      ? null
      : `Enter a whole number from ${least} to ${most}.`;
  };

/** One number as keyed. */
export const checkNumber = (text: string): string | null =>
  KeyedText.safeParse(text).success ? null : 'Enter one number, with at most one decimal mark.';

/** One number, or nothing. */
export const checkNumberOrNothing = (text: string): string | null => (text === '' ? null : checkNumber(text));

function firstIssue(result: ReturnType<typeof Label.safeParse>, whenEmpty: string): string | null {
  if (result.success) return null;
  return result.error.issues[0]?.code === 'too_small' ? whenEmpty : 'That is longer than 120 characters.';
}
