import fc from 'fast-check';
import { expect, it } from 'vitest';
import { nonNegativeLeastSquares } from '../../../analysis/unmixing/non-negative.ts';

const rows = 12;
const vector = fc
  .array(fc.double({ min: -3, max: 3, noNaN: true }), { minLength: rows, maxLength: rows })
  .map((list) => Float64Array.from(list));

it('meets the Karush-Kuhn-Tucker conditions on any problem, repeated and empty columns too', () => {
  fc.assert(
    fc.property(
      fc.array(vector, { minLength: 1, maxLength: 6 }),
      vector,
      fc.boolean(),
      (columns, rhs, isRepeated) => {
        const all = isRepeated
          ? [...columns, columns[0]!.slice(), new Float64Array(rows)]
          : columns;
        const { x, dual, passive } = nonNegativeLeastSquares(all, rhs);
        expect(Math.min(...x)).toBeGreaterThanOrEqual(0);
        for (const [k, slope] of dual.entries()) {
          // norms up to 36: rounding of the sums of 12 products, and of the passive solve
          expect(slope).toBeLessThanOrEqual(1e-7);
          if (passive.includes(k)) expect(Math.abs(slope)).toBeLessThanOrEqual(1e-7);
        }
      },
    ),
    { numRuns: 400 },
  );
});

it('lets a free column be negative', () => {
  const { x } = nonNegativeLeastSquares([Float64Array.of(1, 1, 1)], Float64Array.of(-1, -1, -1), [
    true,
  ]);
  expect(x[0]).toBeCloseTo(-1, 12);
});
