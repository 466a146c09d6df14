import { OutOfRangeError } from '@/shared/units/outOfRange';

/** Lets a probability through: 0 < p < 1.
 * @param name what it is called in the sentence @param value probability, 0..1
 * @returns the same probability @throws OutOfRangeError (a RangeError) unless it lies strictly between 0 and 1
 * Range: (0, 1). Source: none, a guard.
 * @example requireProbability('level', 0.95) // 0.95
 */
export function requireProbability(name: string, value: number): number {
  if (!(value > 0 && value < 1)) throw new OutOfRangeError(name, `The ${name} must lie between 0 and 1.`);
  return value;
}

/** Lets degrees of freedom through, infinity included (a spread known by statement): ν > 0.
 * @param value degrees of freedom, a count, fractions allowed
 * @returns the same @throws OutOfRangeError (a RangeError) unless above 0
 * Range: (0, ∞]. Source: GUM (JCGM 100:2008) G.4.3.
 * @example requireDegreesOfFreedom(16) // 16
 */
export function requireDegreesOfFreedom(value: number): number {
  if (!(value > 0))
    throw new OutOfRangeError('degrees of freedom', 'The degrees of freedom must be above 0.');
  return value;
}
