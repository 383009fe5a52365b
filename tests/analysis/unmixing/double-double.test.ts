import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { Accumulator, product } from '../../../analysis/unmixing/double-double.ts';

// Whole numbers up to 2^53 are doubles, and BigInt knows their sums and products without rounding.
const largest = 2 ** 53 - 1;
const whole = fc.integer({ min: -largest, max: largest });

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
        expect(high + low).toBe(high);
        expect(high).toBe(a * b);
      }),
    );
  });

  it('adds products to some 30 digits of the largest, however much cancels', () => {
    fc.assert(
      fc.property(
        fc.array(fc.tuple(whole, whole), { minLength: 1, maxLength: 20 }),
        whole,
        (terms, rest) => {
          // every product comes with its opposite: only `rest` should be left
          const sum = new Accumulator();
          sum.add(rest, 0);
          for (const [a, b] of terms) sum.addProduct(a, 0, b, 0);
          for (const [a, b] of terms) sum.addProduct(-a, 0, b, 0);
          const total = terms.reduce((so, [a, b]) => so + size(BigInt(a) * BigInt(b)), 0n);
          const error = Math.abs(sum.high + sum.low - rest);
          // each of up to 41 additions is right to some 2^-103 of the sum so far
          expect(error).toBeLessThanOrEqual(
            41 * 2 ** -103 * Number(total) + Number.EPSILON * Math.abs(rest),
          );
        },
      ),
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
    const sum = new Accumulator();
    sum.add(1e16, 0);
    sum.add(1, 0);
    sum.add(-1e16, 0);
    expect(sum.high).toBe(1);
    expect(1e16 + 1 - 1e16).not.toBe(1);
  });
});
