import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { factorise } from '../../../analysis/unmixing/orthogonal.ts';

/** Six decimals: values of 1e-300 beside values of 10 would test underflow, not these laws. */
const number = fc.integer({ min: -10_000_000, max: 10_000_000 }).map((value) => value / 1e6);
const small = fc.integer({ min: -3, max: 3 });
/** Tall matrices of full rank: random columns with a strong entry of their own. */
const problem = fc
  .tuple(fc.integer({ min: 1, max: 5 }), fc.integer({ min: 8, max: 30 }))
  .chain(([size, rows]) =>
    fc.record({
      columns: fc
        .array(fc.array(number, { minLength: rows, maxLength: rows }), {
          minLength: size,
          maxLength: size,
        })
        .map((list) =>
          list.map((column, k) =>
            Float64Array.from(column, (value, i) => (i === k ? value + 60 : value)),
          ),
        ),
      rhs: fc
        .array(number, { minLength: rows, maxLength: rows })
        .map((list) => Float64Array.from(list)),
    }),
  );

function dot(a: Float64Array, b: Float64Array): number {
  return a.reduce((sum, value, i) => sum + value * b[i]!, 0);
}

function residual(
  columns: readonly Float64Array[],
  rhs: Float64Array,
  x: Float64Array,
): Float64Array {
  return rhs.map((value, i) =>
    columns.reduce((left, column, k) => left - column[i]! * x[k]!, value),
  );
}

describe('orthogonal decomposition', () => {
  it('leaves a residual that is orthogonal to every column', () => {
    fc.assert(
      fc.property(problem, ({ columns, rhs }) => {
        const left = residual(columns, rhs, factorise(columns).solve(rhs));
        for (const column of columns) {
          const size = Math.sqrt(dot(column, column) * Math.max(dot(rhs, rhs), 1));
          // sums of up to 30 products in doubles
          expect(Math.abs(dot(column, left))).toBeLessThanOrEqual(1e-11 * size);
        }
      }),
    );
  });

  it('answers a scaled column with an amount scaled the other way', () => {
    fc.assert(
      fc.property(
        problem,
        fc.double({ min: 1e-6, max: 1e6, noNaN: true }),
        ({ columns, rhs }, factor) => {
          const plain = factorise(columns).solve(rhs);
          const scaled = factorise(
            columns.map((column, k) => (k === 0 ? column.map((value) => value * factor) : column)),
          ).solve(rhs);
          const size = Math.max(...plain.map(Math.abs), 1e-3);
          for (const [k, value] of plain.entries()) {
            expect(Math.abs((k === 0 ? factor : 1) * scaled[k]! - value)).toBeLessThanOrEqual(
              1e-10 * size,
            );
          }
        },
      ),
    );
  });

  it('has a pseudo-inverse that undoes the columns', () => {
    fc.assert(
      fc.property(problem, ({ columns }) => {
        for (const [k, row] of factorise(columns).pseudoInverse().entries()) {
          for (const [l, column] of columns.entries()) {
            expect(Math.abs(dot(row, column) - (k === l ? 1 : 0))).toBeLessThanOrEqual(1e-10);
          }
        }
      }),
    );
  });

  it('sees that a column given twice adds no rank, and shares the answer between the two', () => {
    fc.assert(
      fc.property(problem, ({ columns, rhs }) => {
        const first = columns[0]!;
        const twice = factorise([...columns, first.slice()]);
        expect(twice.rank).toBe(columns.length);
        expect(twice.condition).toBe(Number.POSITIVE_INFINITY);
        const [direction] = twice.nullSpace();
        expect(Math.abs(direction![0]! + direction!.at(-1)!)).toBeLessThanOrEqual(1e-9);
        const answer = twice.solve(rhs);
        const alone = factorise(columns).solve(rhs);
        const size = Math.max(...alone.map(Math.abs), 1e-3);
        // no answers of 1e14: the least-norm one halves the amount
        expect(Math.abs(answer[0]! - alone[0]! / 2)).toBeLessThanOrEqual(1e-8 * size);
      }),
    );
  });

  it('does not depend on the order of the columns or of the rows', () => {
    fc.assert(
      fc.property(problem, ({ columns, rhs }) => {
        const plain = factorise(columns).solve(rhs);
        const columnsTurned = factorise(columns.toReversed()).solve(rhs).toReversed();
        const rowsTurned = factorise(columns.map((column) => column.toReversed())).solve(
          rhs.toReversed(),
        );
        // refined to the last digit or two of the largest amount (conditions below some 20); what the
        // right-hand side has across the columns (longer than 50) leaves rounding of its own
        const tolerance = 1e-14 * Math.max(...plain.map(Math.abs)) + 1e-15 * Math.hypot(...rhs);
        for (const [k, value] of plain.entries()) {
          expect(Math.abs(columnsTurned[k]! - value)).toBeLessThanOrEqual(tolerance);
          expect(Math.abs(rowsTurned[k]! - value)).toBeLessThanOrEqual(tolerance);
        }
      }),
    );
  });

  it('is linear in the right-hand side, and is what the pseudo-inverse says', () => {
    fc.assert(
      fc.property(problem, small, ({ columns, rhs }, factor) => {
        const factors = factorise(columns);
        const rows = factors.pseudoInverse();
        const plain = factors.solve(rhs);
        const scaled = factors.solve(rhs.map((value) => value * factor));
        // the pseudo-inverse is not refined: up to 30 products of size |row|·|b|
        for (const [k, row] of rows.entries()) {
          const tolerance = 1e-13 * Math.hypot(...row) * Math.hypot(...rhs);
          expect(Math.abs(dot(row, rhs) - plain[k]!)).toBeLessThanOrEqual(tolerance);
          expect(Math.abs(scaled[k]! - factor * plain[k]!)).toBeLessThanOrEqual(10 * tolerance);
        }
      }),
    );
  });

  it('has the inverse of the normal matrix in its pseudo-inverse', () => {
    fc.assert(
      fc.property(problem, ({ columns }) => {
        const rows = factorise(columns).pseudoInverse();
        for (const [k, row] of rows.entries()) {
          for (const l of columns.keys()) {
            // entry k, l of (P Pᵀ)(AᵀA)
            const entry = columns.reduce(
              (sum, middle, m) => sum + dot(row, rows[m]!) * dot(middle, columns[l]!),
              0,
            );
            // the product squares the condition (below some 20) and the ratio of column lengths
            expect(Math.abs(entry - (k === l ? 1 : 0))).toBeLessThanOrEqual(1e-10);
          }
        }
      }),
    );
  });

  it('keeps the identities of a pseudo-inverse where columns depend on each other', () => {
    fc.assert(
      // small whole factors: others could cancel to a column of rounding errors, which is no multiple
      fc.property(problem, small, small, ({ columns }, p, q) => {
        const first = columns[0]!;
        const last = columns.at(-1)!;
        const all = [...columns, first.map((value, i) => p * value + q * last[i]!), first.slice()];
        const factors = factorise(all);
        expect(factors.rank).toBe(columns.length);
        const rows = factors.pseudoInverse();
        const largest = Math.max(...all.map((column) => Math.sqrt(dot(column, column))));
        for (const column of all) {
          // A P A = A
          const amounts = rows.map((row) => dot(row, column));
          for (let i = 0; i < column.length; i++) {
            const back = all.reduce((sum, each, k) => sum + each[i]! * amounts[k]!, 0);
            expect(Math.abs(back - column[i]!)).toBeLessThanOrEqual(1e-11 * largest);
          }
        }
        for (let i = 0; i < first.length; i++) {
          for (let j = 0; j < i; j++) {
            // A P is a projection, hence symmetric; its entries are at most 1
            const entry = all.reduce((sum, each, k) => sum + each[i]! * rows[k]![j]!, 0);
            const mirrored = all.reduce((sum, each, k) => sum + each[j]! * rows[k]![i]!, 0);
            expect(Math.abs(entry - mirrored)).toBeLessThanOrEqual(1e-11);
          }
        }
      }),
      // each run forms a whole projection matrix
      { numRuns: 50 },
    );
  });

  it('names the combinations of columns that cancel', () => {
    fc.assert(
      fc.property(problem, ({ columns }) => {
        expect(factorise(columns).nullSpace()).toEqual([]);
        const first = columns[0]!;
        const all = [...columns, first.map((value) => 3 * value), first.map((value) => -value)];
        const directions = factorise(all).nullSpace();
        expect(directions).toHaveLength(2);
        for (const direction of directions) {
          expect(Math.hypot(...direction)).toBeGreaterThan(0);
          for (let i = 0; i < first.length; i++) {
            const sum = all.reduce((so, column, k) => so + column[i]! * direction[k]!, 0);
            // sums of up to seven products in doubles, direction and columns scaled to about 1
            expect(Math.abs(sum)).toBeLessThanOrEqual(1e-12);
          }
        }
      }),
    );
  });

  it('solves a system of condition 1e8 to the last digit, which plain elimination cannot', () => {
    // the Hilbert matrix of order 6 times 27720 is one of whole numbers; the answer is ones
    const columns = Array.from({ length: 6 }, (_, k) =>
      Float64Array.from({ length: 6 }, (__, i) => 27720 / (i + k + 1)),
    );
    const rhs = columns[0]!.map((_, i) => columns.reduce((sum, column) => sum + column[i]!, 0));
    const factors = factorise(columns);
    expect(factors.condition).toBeGreaterThan(1e6);
    expect([...factors.solve(rhs)]).toEqual([1, 1, 1, 1, 1, 1]);
  });

  it('gives the least answer where there are fewer rows than columns', () => {
    const wide = factorise([Float64Array.of(1), Float64Array.of(1)]);
    expect(wide.rank).toBe(1);
    // one equation x + y = 2: the shortest of all answers is (1, 1)
    for (const value of wide.solve(Float64Array.of(2))) expect(value).toBeCloseTo(1, 14);
  });

  it('takes a column at the upper end of what a double holds', () => {
    const huge = factorise([Float64Array.of(1e308, 1e308, 1e308)]);
    // the power of two nearest to this column's length, 2^1024, would be infinite itself
    expect(huge.rank).toBe(1);
    const [amount] = huge.solve(Float64Array.of(1.5e10, 1.5e10, 1.5e10));
    expect(amount! / 1.5e-298).toBeCloseTo(1, 12);
  });

  it('takes a column of zeros without turning into NaN', () => {
    const answer = factorise([Float64Array.of(1, 2, 3), new Float64Array(3)]).solve(
      Float64Array.of(2, 4, 6),
    );
    expect(answer[0]).toBeCloseTo(2, 12);
    expect(answer[1]).toBe(0);
  });
});
