import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { nonNegativeLeastSquares } from '../../../analysis/unmixing/non-negative.ts';
import { factorise } from '../../../analysis/unmixing/orthogonal.ts';

const rows = 12;
/** Up to 3 with six decimals, zeros often: what absorbances and absorptivities look like when scaled. */
const vector = fc
  .array(fc.integer({ min: -3_000_000, max: 3_000_000 }), { minLength: rows, maxLength: rows })
  .map((list) => Float64Array.from(list, (value) => value / 1e6));
const fewColumns = fc.array(vector, { minLength: 1, maxLength: 5 });
/** Columns of full rank, condition below some 10: an entry of its own on each outweighs the rest. */
const distinctColumns = fewColumns.map((columns) =>
  columns.map((column, k) => column.map((value, i) => (i === k ? value + 30 : value))),
);
/** Nearly dependent columns: the last is a sum of two others, out by up to `gap`. */
const dependentColumns = fc
  .record({
    columns: fc.array(vector, { minLength: 2, maxLength: 5 }),
    error: vector,
    gap: fc.constantFrom(0, 1e-16, 1e-14, 1e-12, 1e-9, 1e-5),
    weight: fc.double({ min: -0.5, max: 1.5, noNaN: true }),
  })
  .map(({ columns, error, gap, weight }) => {
    const [a, b] = columns;
    const sum = Float64Array.from({ length: rows }, (_, i) => {
      const plain = weight * (a?.[i] ?? 0) + (b?.[i] ?? 0);
      return plain + gap * (error[i] ?? 0);
    });
    return [...columns, sum];
  });

function norm(values: Float64Array): number {
  return Math.hypot(...values);
}

/**
 * Rounding of a residual and of its products with a column, relative to the sizes of what is
 * summed, is some 1e-15 (12 products), and the method itself stops at 1e-14: measured 1e-14 at the
 * worst in 36,000 nearly dependent problems.
 */
const slopeTolerance = 1e-13;

function expectOptimal(columns: readonly Float64Array[], rhs: Float64Array): void {
  const { x, dual, passive, residualNorm } = nonNegativeLeastSquares(columns, rhs);
  // nearly parallel columns can cancel amounts far larger than the right-hand side
  const summed = columns.reduce((sum, column, k) => sum + norm(column) * (x[k] ?? 0), norm(rhs));
  expect(residualNorm).toBeLessThanOrEqual(norm(rhs) + slopeTolerance * summed);
  for (const [k, column] of columns.entries()) {
    expect(x[k]).toBeGreaterThanOrEqual(0);
    if (!passive.includes(k)) expect(x[k]).toBe(0);
    const scale = slopeTolerance * norm(column) * summed;
    expect(dual[k]).toBeLessThanOrEqual(scale);
    if (passive.includes(k)) expect(dual[k]).toBeGreaterThanOrEqual(-scale);
  }
}

/** The least residual over all subsets of columns whose own answer is non-negative: slow and sure. */
function leastResidual(columns: readonly Float64Array[], rhs: Float64Array): number {
  let best = norm(rhs);
  for (let subset = 1; subset < 2 ** columns.length; subset++) {
    const chosen = columns.filter((_, k) => (subset >> k) % 2 === 1);
    const x = factorise(chosen).solve(rhs);
    if (Math.min(...x) < 0) continue;
    const left = rhs.map((value, i) =>
      chosen.reduce((rest, column, k) => rest - (column[i] ?? 0) * (x[k] ?? 0), value),
    );
    best = Math.min(best, norm(left));
  }
  return best;
}

describe('non-negative least squares', () => {
  it('meets the Karush-Kuhn-Tucker conditions on any problem', () => {
    fc.assert(
      fc.property(fewColumns, vector, (columns, rhs) => expectOptimal(columns, rhs)),
      { numRuns: 400 },
    );
  });

  it('ends at an optimum where columns repeat, are empty or nearly depend on each other', () => {
    fc.assert(
      fc.property(dependentColumns, vector, fc.boolean(), (columns, rhs, isExact) => {
        const all = [...columns, ...columns.slice(0, 1), new Float64Array(rows)];
        // a right-hand side that lies in the columns leaves a residual of rounding alone
        const inside = Float64Array.from(rhs, (_, i) =>
          columns.reduce((sum, column) => sum + (column[i] ?? 0), 0),
        );
        expectOptimal(all, isExact ? inside : rhs);
      }),
      { numRuns: 400 },
    );
  });

  it('leaves no larger residual than the best of all subsets', () => {
    fc.assert(
      fc.property(distinctColumns, vector, (columns, rhs) => {
        const { residualNorm } = nonNegativeLeastSquares(columns, rhs);
        // at a minimum errors of x enter in second order: only the rounding of the norms is left
        const gap = Math.abs(residualNorm - leastResidual(columns, rhs));
        expect(gap).toBeLessThanOrEqual(1e-13 * norm(rhs));
      }),
    );
  });

  it('does not depend on the order of the columns', () => {
    fc.assert(
      fc.property(distinctColumns, vector, (columns, rhs) => {
        const plain = nonNegativeLeastSquares(columns, rhs).x;
        const turned = nonNegativeLeastSquares(columns.toReversed(), rhs).x.toReversed();
        for (const [k, value] of plain.entries()) {
          // |x| is at most |b| / 20 here; conditions below 10
          expect(Math.abs((turned[k] ?? Number.NaN) - value)).toBeLessThanOrEqual(
            1e-14 * norm(rhs),
          );
        }
      }),
    );
  });

  it('answers a right-hand side scaled by a power of two with amounts scaled alike, to the last bit', () => {
    fc.assert(
      fc.property(
        distinctColumns,
        vector.filter((rhs) => norm(rhs) > 1e-3),
        fc.integer({ min: -30, max: 30 }),
        (columns, rhs, power) => {
          const plain = nonNegativeLeastSquares(columns, rhs).x;
          const factor = 2 ** power;
          const scaled = nonNegativeLeastSquares(
            columns,
            rhs.map((value) => value * factor),
          ).x;
          expect([...scaled]).toEqual([...plain].map((value) => value * factor));
        },
      ),
    );
  });

  it('is the plain answer where that is positive already', () => {
    fc.assert(
      fc.property(distinctColumns, (columns) => {
        const rhs = Float64Array.from({ length: rows }, (_, i) =>
          columns.reduce((sum, column, k) => sum + (k + 1) * (column[i] ?? 0), 0),
        );
        const { x, passive } = nonNegativeLeastSquares(columns, rhs);
        expect(passive).toHaveLength(columns.length);
        // the sums that make the right-hand side round; the amounts are 1 to 5
        for (const [k, value] of x.entries()) expect(value).toBeCloseTo(k + 1, 12);
      }),
    );
  });

  it('lets a free column be negative, and only that one', () => {
    const minusOne = Float64Array.of(-1, -1, -1);
    const { x, passive } = nonNegativeLeastSquares(
      [Float64Array.of(1, 1, 1), Float64Array.of(1, 1, 1.5)],
      minusOne,
      [true, false],
    );
    expect(x[0]).toBeCloseTo(-1, 14);
    expect(x[1]).toBe(0);
    expect(passive).toEqual([0]);
  });

  it('gives zeros for a right-hand side of zeros', () => {
    const { x, residualNorm, passive } = nonNegativeLeastSquares(
      [Float64Array.of(1, 2, 3)],
      new Float64Array(3),
    );
    expect([...x]).toEqual([0]);
    expect(residualNorm).toBe(0);
    expect(passive).toEqual([]);
  });
});
