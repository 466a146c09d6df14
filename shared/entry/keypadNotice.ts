/** Why a key changed nothing: closed table, one short line each, read in passing. */
const sentences = {
  secondMark: 'Only one decimal mark.',
  tooManyWhole: 'No more than 6 digits before the mark.',
  tooManyDecimals: 'No more than 4 digits after the mark.',
  tooLong: 'No more room for digits.',
  repeatIgnored: 'Repeat ignored.',
  flowMissing: 'Key the flow first.',
  pressureMissing: 'Key the test pressure.',
  flowEndsInMark: 'Flow: a digit must follow the mark.',
  pressureEndsInMark: 'Pressure: a digit must follow the mark.',
  noPressureBefore: 'No pressure before to take over.',
  stillSaving: 'Still saving. Key it again.',
  notSaved: 'Not saved. The digits are still here. Press SAVE again.',
} as const;

export type NoticeCode = keyof typeof sentences;
export type KeypadNotice = { code: NoticeCode; sentence: string };

/** The notice of a code with its sentence. */
export function noticeOf(code: NoticeCode): KeypadNotice {
  return { code, sentence: sentences[code] };
}
