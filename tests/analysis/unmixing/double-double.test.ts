import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  addTo,
  type DoubleDoubleVector,
  dotProduct,
  product,
  subtractMultiple,
} from '../../../analysis/unmixing/double-double.ts';

// Whole numbers up to 2^53 are doubles, and BigInt knows their sums and products without rounding.
const largest = 2 ** 53 - 1;
const whole = fc.integer({ min: -largest, max: largest });

function vector(...values: readonly number[]): DoubleDoubleVector {
  return { high: Float64Array.from(values), low: new Float64Array(values.length) };
}

function exact(high: number, low: number): bigint {
  return BigInt(high) + BigInt(low);
}

function size(value: bigint): bigint {
  return value < 0n ? -value : value;
}

describe('arithmetic on pairs of doubles', () => {
  it('multiplies two doubles without any error', () => {
    fc.assert(
      fc.property(whole, whole, (a, b) => {
        const [high, low] = product(a, 0, b, 0);
        expect(exact(high, low)).toBe(BigInt(a) * BigInt(b));
      }),
    );
  });

  it('keeps the low part below the last place of the high one', () => {
    fc.assert(
      fc.property(whole, whole, (a, b) => {
        const [high, low] = product(a, 0, b, 0);
        // not toBe: a zero may come out with either sign
        expect(high + low === high && high === a * b).toBe(true);
      }),
    );
  });

  it('sums products to some 30 digits of the largest, however much cancels', () => {
    fc.assert(
      fc.property(
        fc.array(fc.tuple(whole, whole), { minLength: 1, maxLength: 20 }),
        whole,
        (terms, rest) => {
          // every product comes with its opposite: only `rest` should be left
          const left = [rest, ...terms.map(([a]) => a), ...terms.map(([a]) => -a)];
          const right = [1, ...terms.map(([, b]) => b), ...terms.map(([, b]) => b)];
          const total = terms.reduce((sum, [a, b]) => sum + size(BigInt(a) * BigInt(b)), 0n);
          // each of up to 41 additions is right to some 2^-103 of the sum so far; then one rounding
          const tolerance = 41 * 2 ** -103 * Number(total) + Number.EPSILON * Math.abs(rest);
          const sum = dotProduct(vector(...left), vector(...right));
          expect(Math.abs(sum - rest)).toBeLessThanOrEqual(tolerance);
        },
      ),
    );
  });

  it('subtracts a multiple without losing what is left', () => {
    fc.assert(
      fc.property(whole, whole, whole, (value, factor, rest) => {
        // (value·factor + rest) - value·factor, the first as a double-double
        const [high, low] = product(value, 0, factor, 0);
        const sum = { high: Float64Array.of(high), low: Float64Array.of(low) };
        addTo(sum, Float64Array.of(rest));
        subtractMultiple(sum, vector(value), factor, 0);
        const left = (sum.high[0] ?? Number.NaN) + (sum.low[0] ?? Number.NaN);
        // two additions, each right to some 2^-103 of the product
        const tolerance =
          4 * 2 ** -103 * Math.abs(value * factor) + Number.EPSILON * Math.abs(rest);
        expect(Math.abs(left - rest)).toBeLessThanOrEqual(tolerance);
      }),
    );
  });

  it('raises to the tenth power with thirty digits', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 1_000_000 }), (x) => {
        let power: readonly [number, number] = [1, 0];
        for (let k = 0; k < 10; k++) power = product(power[0], power[1], x, 0);
        const right = BigInt(x) ** 10n;
        const error = size(exact(power[0], power[1]) - right);
        // ten roundings of some 2^-103 each: below 1e-30 of the value
        expect(error * 10n ** 30n <= right).toBe(true);
      }),
    );
  });

  it('keeps what a double would lose', () => {
    expect(dotProduct(vector(1e16, 1, -1e16), vector(1, 1, 1))).toBe(1);
    expect(1e16 + 1 - 1e16).not.toBe(1);
  });
});
