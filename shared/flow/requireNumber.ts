/** Guards of the computation: what lies outside a formula is refused by name, so that no NaN travels on. */

/** Lets a finite number through: f(v) = v.
 * @param name what the number is, for the message @param value any unit
 * @returns the same number, same unit @throws RangeError when it is not finite
 * Range: every finite number. Source: convention of this project.
 * @example requireFinite('lift', -2.5) // -2.5
 */
export function requireFinite(name: string, value: number): number {
  if (!Number.isFinite(value)) throw new RangeError(`${name} must be a finite number`);
  return value;
}

/** Lets a number above 0 through: f(v) = v.
 * @param name what the number is, for the message @param value any unit
 * @returns the same number, same unit @throws RangeError when it is not finite or not above 0
 * Range: above 0. Source: convention of this project.
 * @example requireAboveZero('area', 0.25) // 0.25
 */
export function requireAboveZero(name: string, value: number): number {
  if (!(Number.isFinite(value) && value > 0)) throw new RangeError(`${name} must be above 0`);
  return value;
}

/** Lets 0 and every number above through: f(v) = v.
 * @param name what the number is, for the message @param value any unit
 * @returns the same number, same unit @throws RangeError when it is not finite or below 0
 * Range: 0 and above. Source: convention of this project.
 * @example requireNotNegative('standard uncertainty', 0) // 0
 */
export function requireNotNegative(name: string, value: number): number {
  if (!(Number.isFinite(value) && value >= 0)) throw new RangeError(`${name} must be 0 or above`);
  return value;
}

/** Lets a probability through: f(v) = v.
 * @param name what it is, for the message @param value probability, 0..1
 * @returns the same probability @throws RangeError unless it lies strictly between 0 and 1
 * Range: 0 < value < 1. Source: convention of this project.
 * @example requireProbability('level', 0.95) // 0.95
 */
export function requireProbability(name: string, value: number): number {
  if (!(value > 0 && value < 1)) throw new RangeError(`${name} must lie between 0 and 1`);
  return value;
}

/** Lets degrees of freedom through, infinity included: f(v) = v.
 * @param value degrees of freedom, a count @returns the same @throws RangeError unless above 0
 * Range: above 0, infinity allowed (a spread known by statement). Source: GUM G.4.3.
 * @example requireDegreesOfFreedom(16) // 16
 */
export function requireDegreesOfFreedom(value: number): number {
  if (!(value > 0)) throw new RangeError('degrees of freedom must be above 0');
  return value;
}
