/** Every refusal the program can answer: one closed table, the same on device, server and screen.
 * `status` is the HTTP status, `again` says whether sending the same thing later can succeed,
 * `sentence` is what a person reads. Nobody matches on message text, only on the code.
 */
const table = {
  bad_request: { status: 400, again: 'never', sentence: 'That could not be read. Check what was entered.' },
  bad_json: { status: 400, again: 'never', sentence: 'The message was not readable. Nothing was changed.' },
  invalid: {
    status: 422,
    again: 'never',
    sentence: 'Something in it is not right. Check the marked fields.',
  },
  too_large: {
    status: 413,
    again: 'never',
    sentence: 'That is too much in one go. Send it in smaller parts.',
  },
  not_found: { status: 404, again: 'never', sentence: 'There is nothing at this address.' },
  no_such_record: { status: 404, again: 'never', sentence: 'That record is not in this shop.' },
  method_not_allowed: { status: 405, again: 'never', sentence: 'That cannot be done at this address.' },
  unsupported_type: { status: 415, again: 'never', sentence: 'That kind of message is not read here.' },
  sign_in_needed: { status: 401, again: 'never', sentence: 'Sign in to go on.' },
  wrong_sign_in: { status: 401, again: 'never', sentence: 'Mail address and password do not match.' },
  sign_in_ended: { status: 401, again: 'never', sentence: 'This sign-in has ended. Sign in again.' },
  device_unknown: {
    status: 401,
    again: 'never',
    sentence: 'The shop no longer knows this device. Enrol it again; the readings on it stay.',
  },
  device_revoked: {
    status: 403,
    again: 'never',
    sentence: 'This device was shut out by the shop. What it sends waits for the supervisor.',
  },
  not_allowed: { status: 403, again: 'never', sentence: 'Your role in this shop does not allow that.' },
  wrong_code: {
    status: 422,
    again: 'never',
    sentence: 'That code is not valid any more, or was mistyped. Ask for a new one at the desk.',
  },
  changed_meanwhile: {
    status: 409,
    again: 'never',
    sentence: 'It changed since you looked. Look again first.',
  },
  state_forbids: {
    status: 409,
    again: 'never',
    sentence: 'The session is in a state that does not allow that.',
  },
  gap: {
    status: 409,
    again: 'later',
    sentence: 'Some changes before these are missing. They will be sent first.',
  },
  forked: {
    status: 409,
    again: 'later',
    sentence: 'This device was copied or set back. It will be enrolled anew; the readings stay.',
  },
  server_restored: {
    status: 409,
    again: 'later',
    sentence: 'The shop’s server was set back to an earlier copy. This device sends everything again.',
  },
  update_needed: {
    status: 426,
    again: 'never',
    sentence: 'This version of the app is too old to read on. Update it.',
  },
  too_many_tries: { status: 429, again: 'later', sentence: 'Too many tries. Wait a little, then try again.' },
  busy: {
    status: 503,
    again: 'later',
    sentence: 'The server is busy or restarting. It will be tried again.',
  },
  internal: {
    status: 500,
    again: 'later',
    sentence: 'The server had a fault. What was entered is still here.',
  },
  offline: { status: 0, again: 'later', sentence: 'No network. What was entered is still here.' },
  not_saved: {
    status: 0,
    again: 'later',
    sentence:
      'This device could not store it. What was entered is still here. Try again, or free some space.',
  },
  timeout: { status: 0, again: 'later', sentence: 'The server did not answer in time. Try again.' },
} as const;

export type ErrorCode = keyof typeof table;

/** One field that was refused, with the sentence to show beside it. */
export type FieldProblem = { path: string; sentence: string };

/** The one error class of the product. Throw it with a code; never match on its text. */
export class AppError extends Error {
  readonly code: ErrorCode;
  readonly fields: FieldProblem[];
  /** extra members of the problem document, such as `last` of a gap */
  readonly extra: Record<string, unknown>;
  constructor(code: ErrorCode, options: { fields?: FieldProblem[]; extra?: Record<string, unknown> } = {}) {
    super(table[code].sentence);
    this.name = 'AppError';
    this.code = code;
    this.fields = options.fields ?? [];
    this.extra = options.extra ?? {};
  }
  get status(): number {
    return table[this.code].status;
  }
  get again(): 'never' | 'later' {
    return table[this.code].again;
  }
}

/** True when `code` is a member of the closed table (used when a problem document is read). */
export function isErrorCode(code: unknown): code is ErrorCode {
  return typeof code === 'string' && Object.prototype.hasOwnProperty.call(table, code);
}
