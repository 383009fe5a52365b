import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { factorise } from '../../../analysis/unmixing/orthogonal.ts';

/** Powers of 1 to 30, whole numbers below 2^53: with ten columns the condition is some 1e6. */
function powers(size: number): Float64Array[] {
  return Array.from({ length: size }, (_, k) =>
    Float64Array.from({ length: 30 }, (__, i) => (i + 1) ** k),
  );
}

function combined(columns: readonly Float64Array[], amounts: readonly number[]): Float64Array {
  return Float64Array.from({ length: columns[0]?.length ?? 0 }, (_, i) =>
    columns.reduce((sum, column, k) => sum + (column[i] ?? 0) * (amounts[k] ?? 0), 0),
  );
}

describe('refinement', () => {
  it('is not misled by an amount that is zero', () => {
    const columns = powers(10);
    for (const zero of columns.keys()) {
      const amounts = columns.map((_, k) => (k === zero ? 0 : 1));
      // sums of whole numbers below 2^53: the right-hand side is exact
      const answer = factorise(columns).solve(combined(columns, amounts));
      for (const [k, right] of amounts.entries()) {
        // exact but for the last rounding; a zero stands within a digit of the largest column's amounts
        expect(Math.abs((answer[k] ?? Number.NaN) - right)).toBeLessThanOrEqual(3e-16);
      }
    }
  });

  it('finds zero for a right-hand side that no column has a part in', () => {
    const columns = [Float64Array.of(60, 0, 0.3, 0), Float64Array.of(0, 60, 0.1, 0)];
    expect([...factorise(columns).solve(Float64Array.of(0, 0, 0, 2))]).toEqual([0, 0]);
  });

  it('takes the low halves of the columns into account', () => {
    // 1/3 as a pair of doubles: times 3 it is 1 to 32 digits, the high half alone only to 16
    const third = 1 / 3;
    const low = 2 ** -54 / 3;
    const columns = [Float64Array.of(third, 1), Float64Array.of(third, 1 + 2 ** -20)];
    const lows = [Float64Array.of(low, 0), Float64Array.of(low, 0)];
    // x + y = 3 and x + y + 2^-20 y = 3 + 2^-20 hold for y = 1 if the third is the whole third
    const rhs = Float64Array.of(1, 3 + 2 ** -20);
    const [, whole] = factorise(columns, lows).solve(rhs);
    const [, rounded] = factorise(columns).solve(rhs);
    expect(Math.abs((whole ?? 0) - 1)).toBeLessThan(1e-15);
    // the rounding of the third, 2^-54, times 3 · 2^20
    expect(Math.abs((rounded ?? 0) - 1)).toBeGreaterThan(1e-11);
  });
});

describe('the unit of a column', () => {
  const bands = [100, 140, 250].map((centre) =>
    Float64Array.from({ length: 400 }, (_, i) => Math.exp(-(((i - centre) / 40) ** 2) / 2)),
  );

  it('changes neither rank nor condition', () => {
    const { condition } = factorise(bands);
    fc.assert(
      fc.property(fc.double({ min: 1e-100, max: 1e100, noNaN: true }), (unit) => {
        const other = factorise(
          bands.map((band, k) => (k === 1 ? band.map((value) => value * unit) : band)),
        );
        expect(other.rank).toBe(3);
        // rounding of the scaled column moves the smallest singular value by some units of the last place
        expect(Math.abs(other.condition / condition - 1)).toBeLessThan(1e-12);
      }),
    );
  });

  it('does not change what two columns of one shape share', () => {
    const [first = new Float64Array(), second = new Float64Array()] = bands;
    const rhs = combined([first, second], [2, 1]);
    fc.assert(
      fc.property(fc.double({ min: 1e-3, max: 1e3, noNaN: true }), (unit) => {
        const all = [first, second, first.map((value) => value * unit)];
        const answer = factorise(all).solve(rhs);
        // least norm in columns of norm 1: each takes half; not refined, condition below 10
        expect(Math.abs((answer[0] ?? 0) - 1)).toBeLessThan(1e-12);
        expect(Math.abs((answer[2] ?? 0) * unit - 1)).toBeLessThan(1e-12);
      }),
    );
  });

  it('does not matter for the right-hand side either, up to what a double holds', () => {
    const column = Float64Array.of(1, 2, 3);
    for (const unit of [1e-306, 1e-150, 1e150, 1e306]) {
      const [amount = Number.NaN] = factorise([column]).solve(column.map((value) => value * unit));
      expect(Math.abs(amount / unit - 1)).toBeLessThan(1e-15);
    }
  });
});

describe('what is no least-squares problem is a fault', () => {
  const column = Float64Array.of(1, 2, 3);

  it('columns of unequal length, none at all, or a right-hand side of another length', () => {
    expect(() => factorise([])).toThrow(RangeError);
    expect(() => factorise([column, Float64Array.of(1, 2)])).toThrow(RangeError);
    expect(() => factorise([column], [Float64Array.of(0)])).toThrow(RangeError);
    expect(() => factorise([column]).solve(Float64Array.of(1, 2))).toThrow(RangeError);
  });

  it('entries that are not finite', () => {
    for (const value of [Number.NaN, Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY]) {
      const spoilt = Float64Array.of(1, value, 3);
      expect(() => factorise([spoilt])).toThrow(RangeError);
      expect(() => factorise([column], [spoilt])).toThrow(RangeError);
      expect(() => factorise([column]).solve(spoilt)).toThrow(RangeError);
    }
  });
});
