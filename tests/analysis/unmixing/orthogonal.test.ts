import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { factorise } from '../../../analysis/unmixing/orthogonal.ts';

const number = fc.double({ min: -10, max: 10, noNaN: true });
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

  it('takes a column of zeros without turning into NaN', () => {
    const answer = factorise([Float64Array.of(1, 2, 3), new Float64Array(3)]).solve(
      Float64Array.of(2, 4, 6),
    );
    expect(answer[0]).toBeCloseTo(2, 12);
    expect(answer[1]).toBe(0);
  });
});
