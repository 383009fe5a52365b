import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  chiSquareCdf,
  chiSquareQuantile,
  chiSquareUpper,
} from '../../../analysis/distributions/chi-square.ts';
import { fCdf, fQuantile, fUpper } from '../../../analysis/distributions/f.ts';
import { normalCdf, normalQuantile } from '../../../analysis/distributions/normal.ts';
import {
  studentTCdf,
  studentTQuantile,
  studentTUpper,
} from '../../../analysis/distributions/student-t.ts';

const chance = fc.double({ min: 1e-12, max: 1 - 1e-9, noNaN: true });
const df = fc.double({ min: 0.7, max: 5000, noNaN: true });

/** Sums of up to some hundred terms in doubles, and a quantile rounded to a double: twelve digits of p. */
const roundTrip = 1e-12;

/** The least doubles have fewer digits: some 2000 steps of them are let pass. */
const leastStep = 1e-320;

function expectClose(value: number, right: number, relative: number): void {
  expect(Math.abs(value - right)).toBeLessThanOrEqual(relative * Math.abs(right) + leastStep);
}

describe('a quantile is where the distribution function has its chance', () => {
  // p near 0 with few df asks for tails that a change of x in its last digit moves by 1e-16 · df
  it('normal', () => {
    fc.assert(fc.property(chance, (p) => expectClose(normalCdf(normalQuantile(p)), p, roundTrip)));
  });

  it("Student's t", () => {
    fc.assert(
      fc.property(chance, df, (p, degrees) =>
        expectClose(studentTCdf(studentTQuantile(p, degrees), degrees), p, roundTrip),
      ),
    );
  });

  it('chi-square', () => {
    fc.assert(
      fc.property(chance, df, (p, degrees) =>
        expectClose(chiSquareCdf(chiSquareQuantile(p, degrees), degrees), p, roundTrip),
      ),
    );
  });

  it('F', () => {
    fc.assert(
      fc.property(chance, df, df, (p, d1, d2) =>
        expectClose(fCdf(fQuantile(p, d1, d2), d1, d2), p, roundTrip),
      ),
    );
  });
});

describe('one distribution against another', () => {
  it('F with one degree of freedom above is the square of Student’s t', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-3, max: 50, noNaN: true }), df, (t, degrees) =>
        expectClose(fUpper(t * t, 1, degrees), 2 * studentTUpper(t, degrees), roundTrip),
      ),
    );
  });

  it('chi-square with one degree of freedom is the square of a normal deviate', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-3, max: 30, noNaN: true }), (z) =>
        expectClose(chiSquareUpper(z * z, 1), 2 * normalCdf(-z), roundTrip),
      ),
    );
  });

  it('the reciprocal of an F ratio has its degrees of freedom exchanged', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-2, max: 1e2, noNaN: true }), df, df, (x, d1, d2) => {
        const right = fCdf(1 / x, d2, d1);
        // 1/x is rounded, and the tail of 5000 df turns that into 5000 times as much; tails below 1e-300 have no digits
        expect(Math.abs(fUpper(x, d1, d2) - right)).toBeLessThanOrEqual(1e-11 * right + 1e-300);
      }),
    );
  });

  it('Student becomes the normal as degrees of freedom grow', () => {
    expect(studentTQuantile(0.975, Number.POSITIVE_INFINITY)).toBe(normalQuantile(0.975));
    expect(studentTQuantile(0.975, 1e300)).toBe(normalQuantile(0.975));
    expect(studentTUpper(40, 1e300)).toBe(normalCdf(-40));
    const z = normalQuantile(0.975);
    for (const degrees of [1e6, 1e9, 1e15]) {
      // the expansion in 1/df to its first term; the next is some 1/df²
      const right = z + (z ** 3 + z) / (4 * degrees);
      expect(Math.abs(studentTQuantile(0.975, degrees) - right)).toBeLessThanOrEqual(
        10 / degrees ** 2 + 1e-14,
      );
    }
  });

  it('Student has no step where the expansion for many degrees of freedom takes over', () => {
    for (const t of [0.01, 1, 3, 12, 40]) {
      const [below, above] = [studentTUpper(t, 99_999.999_999), studentTUpper(t, 100_000)];
      // the step in df itself moves the tail by t⁴/(4 df²) · 1e-6, below 1e-10 at t = 40
      expectClose(below, above, t > 30 ? 1e-10 : 2e-12);
    }
  });
});

describe('tails', () => {
  it('of two degrees of freedom follow their closed forms down to 1e-200', () => {
    for (const x of [0.1, 5, 60, 400, 920]) {
      expectClose(chiSquareUpper(x, 2), Math.exp(-x / 2), 1e-12);
    }
    for (const t of [0.1, 3, 1e3, 1e8, 1e100]) {
      const s = Math.sqrt(2 + t * t);
      // (1 - t/s)/2 without its cancellation
      expectClose(studentTUpper(t, 2), 1 / (s * (s + t)), 1e-12);
    }
  });

  it('of one degree of freedom follow the arc tangent, far beyond where t² overflows', () => {
    for (const t of [0.5, 10, 1e5, 1e99, 1e101, 1e160, 1e300]) {
      // multiplied out in logarithms of some 700: twelve digits
      expectClose(studentTUpper(t, 1), Math.atan(1 / t) / Math.PI, 1e-12);
    }
  });

  it('end in 0 and 1', () => {
    expect(studentTUpper(Number.POSITIVE_INFINITY, 3)).toBe(0);
    expect(studentTUpper(Number.NEGATIVE_INFINITY, 3)).toBe(1);
    expect(chiSquareUpper(Number.POSITIVE_INFINITY, 3)).toBe(0);
    expect(chiSquareCdf(-1, 3)).toBe(0);
    expect(fUpper(Number.POSITIVE_INFINITY, 3, 4)).toBe(0);
    expect(fCdf(-1, 3, 4)).toBe(0);
    expect(normalCdf(Number.NEGATIVE_INFINITY)).toBe(0);
    expect(normalCdf(Number.POSITIVE_INFINITY)).toBe(1);
  });

  it('give quantiles of any size', () => {
    // for small x the chi-square distribution is x^(df/2) / (2^(df/2) Γ(df/2 + 1)); df = 1: sqrt(2x/π)
    expectClose(chiSquareQuantile(1e-100, 1), (Math.PI / 2) * 1e-200, 1e-12);
    // tail of one degree of freedom: 1/(π t)
    expectClose(studentTQuantile(1e-250, 1), -1e250 / Math.PI, 1e-12);
  });
});

it('refuses chances and degrees of freedom that are none', () => {
  for (const p of [0, 1, -1, Number.NaN]) {
    expect(() => normalQuantile(p)).toThrow(RangeError);
    expect(() => studentTQuantile(p, 5)).toThrow(RangeError);
    expect(() => chiSquareQuantile(p, 5)).toThrow(RangeError);
    expect(() => fQuantile(p, 5, 5)).toThrow(RangeError);
  }
  for (const degrees of [0, -1, Number.NaN]) {
    expect(() => studentTUpper(1, degrees)).toThrow(RangeError);
    expect(() => chiSquareUpper(1, degrees)).toThrow(RangeError);
    expect(() => chiSquareCdf(-1, degrees)).toThrow(RangeError);
    expect(() => fUpper(1, degrees, 5)).toThrow(RangeError);
    expect(() => fUpper(1, 5, degrees)).toThrow(RangeError);
  }
  expect(() => normalCdf(Number.NaN)).toThrow(RangeError);
  expect(() => studentTUpper(Number.NaN, 5)).toThrow(RangeError);
});
