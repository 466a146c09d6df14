/** A number that a formula cannot take: which quantity it was, and a sentence in the shop's words. */
export class OutOfRangeError extends RangeError {
  readonly quantity: string;

  constructor(quantity: string, sentence: string) {
    super(sentence);
    this.name = 'OutOfRangeError';
    this.quantity = quantity;
  }
}

/** Lets a finite number above 0 through: x > 0.
 * @param value number to judge, any unit @param quantity what it is called in the sentence
 * @returns the same number, in its own unit @throws OutOfRangeError (a RangeError) unless it is finite and above 0
 * Range: (0, ∞). Source: none, a guard.
 * @example positive(28, 'test pressure') // 28
 */
export function positive(value: number, quantity: string): number {
  if (!(value > 0 && Number.isFinite(value)))
    throw new OutOfRangeError(quantity, `The ${quantity} must be above 0.`);
  return value;
}

/** Lets a finite number from 0 on through: x ≥ 0.
 * @param value number to judge, any unit @param quantity what it is called in the sentence
 * @returns the same number, in its own unit @throws OutOfRangeError (a RangeError) unless it is finite and 0 or more
 * Range: [0, ∞). Source: none, a guard.
 * @example zeroOrMore(0, 'leak') // 0
 */
export function zeroOrMore(value: number, quantity: string): number {
  if (!(value >= 0 && Number.isFinite(value)))
    throw new OutOfRangeError(quantity, `The ${quantity} must be 0 or more.`);
  return value;
}

/** Lets a number between two ends through: low ≤ x ≤ high.
 * @param value number to judge, any unit @param low smallest allowed, same unit @param high largest allowed, same unit
 * @param quantity what it is called in the sentence
 * @returns the same number, in its own unit @throws OutOfRangeError (a RangeError) outside the ends or when not a number
 * Range: [low, high]. Source: none, a guard.
 * @example between(0.5, 0, 1, 'humidity') // 0.5
 */
export function between(value: number, low: number, high: number, quantity: string): number {
  if (!(value >= low && value <= high))
    throw new OutOfRangeError(quantity, `The ${quantity} must lie between ${low} and ${high}.`);
  return value;
}

/** Lets any finite number through.
 * @param value number to judge, any unit @param quantity what it is called in the sentence
 * @returns the same number, in its own unit @throws OutOfRangeError (a RangeError) when it is not a finite number
 * Range: (−∞, ∞). Source: none, a guard.
 * @example finite(-3, 'zero') // -3
 */
export function finite(value: number, quantity: string): number {
  if (!Number.isFinite(value)) throw new OutOfRangeError(quantity, `The ${quantity} is not a number.`);
  return value;
}
