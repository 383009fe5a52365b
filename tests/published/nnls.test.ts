import * as v from 'valibot';
import { describe, expect, it } from 'vitest';
import { nonNegativeLeastSquares } from '../../analysis/unmixing/non-negative.ts';
import { columnsOf, published } from './values.ts';

// Problems made here after Lawson and Hanson, Solving Least Squares Problems (1974), NNLS. Status:
// computed, x, dual and residual norm exact (every subset of columns in rationals, the one kept that
// meets the Karush-Kuhn-Tucker conditions), then rounded to doubles.
const problemSchema = v.object({
  kind: v.string(),
  A: v.array(v.array(v.number())),
  b: v.array(v.number()),
  unique: v.boolean(),
  x: v.array(v.number()),
  passive: v.array(v.number()),
  residualNorm: v.number(),
  dual: v.array(v.number()),
  conditionColumnScaled: v.optional(v.nullable(v.number())),
});
const { problems } = v.parse(
  v.object({ problems: v.array(problemSchema) }),
  published('nnls-exact.json'),
);

/**
 * A residual in doubles is off by the rounding of its sums, some 1e-16 of |b| (K at most 8 terms),
 * whatever the condition: the minimum is flat, errors of x enter it in second order. Measured: 1.8e-16
 * at the worst; so are its products with the columns, the dual: 1.5e-16 of |column|·|b|.
 */
const residualTolerance = 1e-15;
/**
 * The refined answer is right to its last digit or two for the A and b it is given, but those are
 * decimals rounded to doubles, and the condition (up to 1.5e4) multiplies that rounding.
 */
const amountTolerance = 4 * Number.EPSILON;

function norm(values: readonly number[] | Float64Array): number {
  return Math.hypot(...values);
}

describe('non-negative least squares against exact solutions', () => {
  it('has all 33 problems, 28 of them with one answer only', () => {
    expect(problems).toHaveLength(33);
    expect(problems.filter(({ unique }) => unique)).toHaveLength(28);
  });

  it.each(problems.map((problem, index) => [index, problem.kind, problem] as const))(
    'problem %i, %s: least residual, and nothing left to gain',
    (_, __, { A, b, residualNorm, dual }) => {
      const columns = columnsOf(A);
      const answer = nonNegativeLeastSquares(columns, Float64Array.from(b));
      const size = norm(b);
      expect(Math.min(...answer.x)).toBeGreaterThanOrEqual(0);
      expect(Math.abs(answer.residualNorm - residualNorm)).toBeLessThanOrEqual(
        residualTolerance * size,
      );
      for (const [k, column] of columns.entries()) {
        const slope = answer.dual[k] ?? Number.NaN;
        const tolerance = residualTolerance * norm(column) * size;
        // the residual is unique even where x is not, and with it the dual
        expect(Math.abs(slope - (dual[k] ?? Number.NaN))).toBeLessThanOrEqual(tolerance);
        // Karush-Kuhn-Tucker: nothing to gain on a column left out, nothing left on one taken in
        expect(slope).toBeLessThanOrEqual(tolerance);
        if (answer.passive.includes(k)) expect(Math.abs(slope)).toBeLessThanOrEqual(tolerance);
        else expect(answer.x[k]).toBe(0);
      }
    },
  );

  const settled = problems.filter(({ unique }) => unique);
  it.each(settled.map((problem) => [problem.kind, problem.x.length, problem] as const))(
    '%s, %i columns: every amount',
    (_, __, { A, b, x, passive, conditionColumnScaled }) => {
      const columns = columnsOf(A);
      const answer = nonNegativeLeastSquares(columns, Float64Array.from(b));
      expect(answer.passive).toEqual(passive);
      expect(conditionColumnScaled).toBeGreaterThanOrEqual(1);
      const tolerance = amountTolerance * (conditionColumnScaled ?? Number.NaN);
      for (const [k, right] of x.entries()) {
        const scale = norm(b) / norm(columns[k] ?? []);
        const error = Math.abs((answer.x[k] ?? Number.NaN) - right);
        expect(error).toBeLessThanOrEqual(tolerance * scale);
      }
    },
  );
});
