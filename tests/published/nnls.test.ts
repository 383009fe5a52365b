import * as v from 'valibot';
import { describe, expect, it } from 'vitest';
import { nonNegativeLeastSquares } from '../../analysis/unmixing/non-negative.ts';
import { columnsOf, published } from './values.ts';

// Status: computed with exact rationals (all subsets, Karush-Kuhn-Tucker); method of Lawson and
// Hanson, Solving Least Squares Problems (1974).
const problemSchema = v.object({
  kind: v.string(),
  A: v.array(v.array(v.number())),
  b: v.array(v.number()),
  unique: v.boolean(),
  x: v.array(v.number()),
  residualNorm: v.number(),
  conditionColumnScaled: v.nullable(v.number()),
});
const { problems } = v.parse(
  v.object({ problems: v.array(problemSchema) }),
  published('nnls-exact.json'),
);

function norm(values: readonly number[] | Float64Array): number {
  return Math.hypot(...values);
}

describe('non-negative least squares against exact solutions', () => {
  it('has all 33 problems', () => {
    expect(problems).toHaveLength(33);
  });

  it.each(problems.map((problem, index) => [index, problem.kind, problem] as const))(
    'problem %i: %s',
    (_, __, { A, b, unique, x, residualNorm, conditionColumnScaled }) => {
      const columns = columnsOf(A);
      const answer = nonNegativeLeastSquares(columns, Float64Array.from(b));
      const size = norm(b);
      expect(Math.min(...answer.x)).toBeGreaterThanOrEqual(0);
      // the residual is a minimum: errors of x enter it in second order only
      expect(Math.abs(answer.residualNorm - residualNorm)).toBeLessThanOrEqual(1e-12 * size);
      for (const [k, slope] of answer.dual.entries()) {
        const scale = norm(columns[k]!) * size;
        // Karush-Kuhn-Tucker: nothing to gain on a column left out, nothing left on one taken in
        expect(slope).toBeLessThanOrEqual(1e-10 * scale);
        if (answer.passive.includes(k)) expect(Math.abs(slope)).toBeLessThanOrEqual(1e-10 * scale);
      }
      if (!unique) return;
      // an answer in doubles can be off by the condition times the unit roundoff, with some room
      const tolerance = 1e3 * Number.EPSILON * Math.max(conditionColumnScaled ?? 1, 1);
      for (const [k, right] of x.entries()) {
        const scale = size / (norm(columns[k]!) || 1);
        expect(Math.abs(answer.x[k]! - right)).toBeLessThanOrEqual(tolerance * scale);
      }
    },
  );
});
