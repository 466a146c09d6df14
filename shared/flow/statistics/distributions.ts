import { requireDegreesOfFreedom, requireProbability } from '@/shared/flow/statistics/requireProbability';
import { OutOfRangeError, finite, zeroOrMore } from '@/shared/units/outOfRange';
import { lnGamma, regularizedBeta, regularizedGammaQ } from '@/shared/flow/statistics/specialFunctions';

/** Above this many degrees of freedom the expansion about the normal distribution is good to 1e-10. */
const many = 1e5;

/** Probability below z of the standard normal distribution: Φ(z) = ½ Q(½, z²/2) for z < 0.
 * @param z standardized value, dimensionless, infinity allowed @returns probability 0..1 @throws OutOfRangeError (a RangeError) for NaN
 * Range: every z. Source: NIST DLMF 7.18 with 8.11.4; e-Handbook 1.3.6.6.1.
 * @example normalCdf(1.96) // 0.9750021048518
 */
export function normalCdf(z: number): number {
  if (Number.isNaN(z)) throw new OutOfRangeError('argument', 'A standardized value must be a number.');
  if (!Number.isFinite(z)) return z > 0 ? 1 : 0;
  const tail = 0.5 * regularizedGammaQ(0.5, (z * z) / 2);
  return z > 0 ? 1 - tail : tail;
}

/** Value of the standard normal distribution below which the share p lies: Φ(z) = p, solved by bracketed Newton steps.
 * @param p probability, strictly between 0 and 1 @returns z, dimensionless @throws OutOfRangeError (a RangeError) outside that range
 * Range: 1e-12 to 1 − 1e-12. Source: inverse of normalCdf; e-Handbook table 1.3.6.7.1.
 * @example normalQuantile(0.975) // 1.95996398454
 */
export function normalQuantile(p: number): number {
  requireProbability('probability', p);
  if (p === 0.5) return 0;
  if (p > 0.5) return -normalQuantile(1 - p);
  return solve(normalCdf, (z) => Math.exp((-z * z) / 2) / Math.sqrt(2 * Math.PI), p, -40, 0);
}

/** Probability below t of Student's distribution: 1 − ½ I_x(ν/2, ½) for t > 0, x = ν/(ν + t²).
 * @param t standardized value, dimensionless @param degreesOfFreedom ν, a count, fractions and infinity allowed
 * @returns probability 0..1 @throws OutOfRangeError (a RangeError) unless t is finite and ν above 0
 * Range: ν from 0.1 upward. Source: NIST e-Handbook 1.3.6.6.4; DLMF 8.17;
 * above 1e5 degrees of freedom Abramowitz and Stegun 26.7.8.
 * @example tCdf(2.228138852, 10) // 0.975000000
 */
export function tCdf(t: number, degreesOfFreedom: number): number {
  finite(t, 't');
  const nu = requireDegreesOfFreedom(degreesOfFreedom);
  if (nu > many) return normalCdf((t * (1 - 1 / (4 * nu))) / Math.sqrt(1 + (t * t) / (2 * nu)));
  // near t = 0 the other tail of the beta function keeps its digits
  const squared = t * t;
  const tail =
    squared < 1
      ? 0.5 - 0.5 * regularizedBeta(squared / (nu + squared), 0.5, nu / 2)
      : 0.5 * regularizedBeta(nu / (nu + squared), nu / 2, 0.5);
  return t > 0 ? 1 - tail : tail;
}

/** Value of Student's distribution below which the share p lies (bracketed Newton steps on tCdf).
 * @param p probability, strictly between 0 and 1; 0.975 for a two-sided 95 % interval
 * @param degreesOfFreedom ν, a count, fractions and infinity allowed
 * @returns t, dimensionless @throws OutOfRangeError (a RangeError) unless p lies in 0..1 and ν is above 0
 * Range: ν from 0.5, p from 1e-9 to 1 − 1e-9; 1e-10 relative. Source: NIST e-Handbook table 1.3.6.7.2;
 * above 1e5 degrees of freedom Abramowitz and Stegun 26.7.5.
 * @example tQuantile(0.975, 10) // 2.228138852
 */
export function tQuantile(p: number, degreesOfFreedom: number): number {
  requireProbability('probability', p);
  const nu = requireDegreesOfFreedom(degreesOfFreedom);
  if (nu > many) {
    const z = normalQuantile(p);
    return z + (z ** 3 + z) / (4 * nu) + (5 * z ** 5 + 16 * z ** 3 + 3 * z) / (96 * nu * nu);
  }
  if (p === 0.5) return 0;
  if (p > 0.5) return -tQuantile(1 - p, nu);
  const scale = Math.exp(lnGamma((nu + 1) / 2) - lnGamma(nu / 2)) / Math.sqrt(nu * Math.PI);
  const density = (t: number) => scale * (1 + (t * t) / nu) ** (-(nu + 1) / 2);
  let lowest = -2;
  while (tCdf(lowest, nu) > p) lowest *= 4;
  return solve((t) => tCdf(t, nu), density, p, lowest, 0);
}

/** Probability below x of the chi-squared distribution: 1 − Q(ν/2, x/2).
 * @param x value, dimensionless, 0 or above @param degreesOfFreedom ν, a finite count
 * @returns probability 0..1 @throws OutOfRangeError (a RangeError) outside those ranges
 * Range: ν from 1 to 400. Source: NIST e-Handbook 1.3.6.6.6.
 * @example chiSquaredCdf(9.487729, 4) // 0.950000
 */
export function chiSquaredCdf(x: number, degreesOfFreedom: number): number {
  zeroOrMore(x, 'chi-squared');
  finite(requireDegreesOfFreedom(degreesOfFreedom), 'degrees of freedom');
  return 1 - regularizedGammaQ(degreesOfFreedom / 2, x / 2);
}

/** Value of the chi-squared distribution below which the share p lies (bracketed Newton steps on chiSquaredCdf).
 * @param p probability, strictly between 0 and 1 @param degreesOfFreedom ν, a finite count
 * @returns chi-squared, dimensionless @throws OutOfRangeError (a RangeError) outside those ranges
 * Range: ν from 1 to 400. Source: NIST e-Handbook table 1.3.6.7.4.
 * @example chiSquaredQuantile(0.95, 4) // 9.487729
 */
export function chiSquaredQuantile(p: number, degreesOfFreedom: number): number {
  requireProbability('probability', p);
  const nu = finite(requireDegreesOfFreedom(degreesOfFreedom), 'degrees of freedom');
  const norm = lnGamma(nu / 2) + (nu / 2) * Math.LN2;
  const density = (x: number) => (x > 0 ? Math.exp((nu / 2 - 1) * Math.log(x) - x / 2 - norm) : 0);
  let highest = nu + 1;
  while (chiSquaredCdf(highest, nu) < p) highest *= 2;
  return solve((x) => chiSquaredCdf(x, nu), density, p, 0, highest);
}

/** Root of cdf(x) = p for a rising cdf between two ends: Newton's step, or half the bracket where that leaves it. */
function solve(
  cdf: (x: number) => number,
  density: (x: number) => number,
  p: number,
  from: number,
  to: number,
): number {
  let low = from;
  let high = to;
  let x = (low + high) / 2;
  for (let i = 0; i < 400; i++) {
    const gap = cdf(x) - p;
    if (gap > 0) high = x;
    else low = x;
    const slope = density(x);
    const newton = slope > 0 ? x - gap / slope : Number.NaN;
    const next = newton > low && newton < high ? newton : (low + high) / 2;
    // Newton squares its error: after a step this small the next one would be below the last digit
    if (Math.abs(next - x) <= (next === newton ? 1e-9 : 1e-15) * Math.abs(next)) return next;
    x = next;
  }
  return x;
}
