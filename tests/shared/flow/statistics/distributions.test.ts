import fc from 'fast-check';
import {
  chiSquaredCdf,
  chiSquaredQuantile,
  normalCdf,
  normalQuantile,
  tCdf,
  tQuantile,
} from '@/shared/flow/statistics/distributions';
import { lnGamma, regularizedBeta, regularizedGammaQ } from '@/shared/flow/statistics/specialFunctions';
import vectors from '@/tests/vectors/distributions.json';

const functions: Record<string, (...args: number[]) => number> = {
  chiSquaredCdf,
  chiSquaredQuantile,
  normalCdf,
  normalQuantile,
  tCdf,
  tQuantile,
};

// source: tests/vectors/distributions.json, a source and a mark on each line
it.each(vectors.cases)('$fn($args) is $expected [$mark] $source', ({ fn, args, expected, tolerance }) => {
  expect(Math.abs(functions[fn]!(...args) - expected)).toBeLessThanOrEqual(tolerance);
});

it('gives Student’s t its closed forms at one and two degrees of freedom', () => {
  fc.assert(
    fc.property(fc.double({ min: -300, max: 300, noNaN: true }), (t) => {
      expect(tCdf(t, 1)).toBeCloseTo(0.5 + Math.atan(t) / Math.PI, 12);
      expect(tCdf(t, 2)).toBeCloseTo(0.5 + t / (2 * Math.sqrt(2 + t * t)), 12);
    }),
  );
});

it('comes back to the probability that a quantile was asked for', () => {
  const p = fc.double({ min: 1e-6, max: 1 - 1e-6, noNaN: true });
  fc.assert(
    fc.property(
      p,
      fc.double({ min: 0.6, max: 2e5, noNaN: true }),
      fc.integer({ min: 1, max: 300 }),
      (p, nu, n) => {
        expect(Math.abs(tCdf(tQuantile(p, nu), nu) - p)).toBeLessThan(1e-10);
        expect(Math.abs(normalCdf(normalQuantile(p)) - p)).toBeLessThan(1e-13);
        expect(Math.abs(chiSquaredCdf(chiSquaredQuantile(p, n), n) - p)).toBeLessThan(1e-11);
      },
    ),
  );
});

it('narrows from Student’s t to the normal distribution as freedom grows', () => {
  const values = [1, 2, 5, 30, 1e3, 9e4, 2e5, 1e7, Infinity].map((nu) => tQuantile(0.975, nu));
  values.slice(1).forEach((value, i) => expect(value).toBeLessThan(values[i]!));
  expect(values.at(-1)).toBeCloseTo(1.959963984540054, 12);
});

it('knows the factorials and the smallest cases of the functions below', () => {
  expect(Math.exp(lnGamma(6))).toBeCloseTo(120, 9);
  expect(lnGamma(0.5)).toBeCloseTo(Math.log(Math.PI) / 2, 13);
  expect([regularizedBeta(0, 2, 3), regularizedBeta(1, 2, 3)]).toEqual([0, 1]);
  expect(regularizedGammaQ(3, 0)).toBe(1);
  expect([normalCdf(Infinity), normalCdf(-Infinity)]).toEqual([1, 0]);
});

it('refuses what lies outside a function’s range', () => {
  const bad = [Number.NaN, -1];
  for (const value of bad) {
    expect(() => lnGamma(value)).toThrow(RangeError);
    expect(() => regularizedBeta(value, 1, 1)).toThrow(RangeError);
    expect(() => regularizedGammaQ(1, value)).toThrow(RangeError);
    expect(() => tQuantile(value, 5)).toThrow(RangeError);
    expect(() => tQuantile(0.5, value)).toThrow(RangeError);
    expect(() => chiSquaredQuantile(0.5, value)).toThrow(RangeError);
    expect(() => chiSquaredCdf(value, 3)).toThrow(RangeError);
  }
  expect(() => normalCdf(Number.NaN)).toThrow(RangeError);
  expect(() => tCdf(Infinity, 3)).toThrow(RangeError);
  expect(() => normalQuantile(1)).toThrow(RangeError);
});
