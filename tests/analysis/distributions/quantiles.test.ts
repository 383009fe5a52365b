import fc from 'fast-check';
import { expect, it } from 'vitest';
import {
  chiSquareCdf,
  chiSquareQuantile,
  chiSquareUpper,
} from '../../../analysis/distributions/chi-square.ts';
import { normalCdf, normalQuantile } from '../../../analysis/distributions/normal.ts';
import {
  studentTCdf,
  studentTQuantile,
  studentTUpper,
} from '../../../analysis/distributions/student-t.ts';

const chance = fc.double({ min: 1e-6, max: 1 - 1e-6, noNaN: true });
const df = fc.double({ min: 0.7, max: 5000, noNaN: true });

it('a quantile is where the distribution function has its chance', () => {
  fc.assert(
    fc.property(chance, df, (p, degrees) => {
      // the smaller tail keeps twelve digits
      const tolerance = 1e-9 * Math.min(p, 1 - p) + 1e-12;
      expect(Math.abs(normalCdf(normalQuantile(p)) - p)).toBeLessThanOrEqual(tolerance);
      expect(Math.abs(studentTCdf(studentTQuantile(p, degrees), degrees) - p)).toBeLessThanOrEqual(
        tolerance,
      );
      expect(
        Math.abs(chiSquareCdf(chiSquareQuantile(p, degrees), degrees) - p),
      ).toBeLessThanOrEqual(tolerance);
    }),
  );
});

it('Student becomes the normal as degrees of freedom grow', () => {
  expect(studentTQuantile(0.975, Number.POSITIVE_INFINITY)).toBeCloseTo(normalQuantile(0.975), 14);
  // the next term of the expansion is (z³ + z)/(4 df)
  expect(studentTQuantile(0.975, 1e7)).toBeCloseTo(normalQuantile(0.975), 6);
});

it('small upper tails keep their digits', () => {
  // 1 - cdf would be 0 here; values from the asymptotic form, so to a tenth only
  expect(studentTUpper(12, 30) / 2.6e-13).toBeGreaterThan(0.1);
  expect(studentTUpper(12, 30) / 2.6e-13).toBeLessThan(10);
  expect(chiSquareUpper(200, 2)).toBeCloseTo(Math.exp(-100), 50);
});

it('refuses chances that are none', () => {
  for (const p of [0, 1, -1, Number.NaN]) {
    expect(() => normalQuantile(p)).toThrow(RangeError);
    expect(() => studentTQuantile(p, 5)).toThrow(RangeError);
    expect(() => chiSquareQuantile(p, 5)).toThrow(RangeError);
  }
});
