import * as v from 'valibot';
import { describe, expect, it } from 'vitest';
import { chiSquareCdf, chiSquareQuantile } from '../../analysis/distributions/chi-square.ts';
import { incompleteBeta } from '../../analysis/distributions/incomplete-beta.ts';
import { normalCdf, normalQuantile } from '../../analysis/distributions/normal.ts';
import { studentTCdf, studentTQuantile } from '../../analysis/distributions/student-t.ts';
import { published } from './values.ts';

// Status: computed with mpmath (30 digits), agrees with R 4.2.2 to 1.1e-13; printed to 15 digits.
const tableSchema = v.object({ rows: v.array(v.array(v.number())) });
const tables = v.parse(
  v.object({ t: tableSchema, chi2: tableSchema, f: tableSchema, normal: tableSchema }),
  published('quantiles-mp.json'),
);

function worstOf(
  rows: readonly (readonly number[])[],
  error: (row: readonly number[]) => number,
): number {
  return Math.max(...rows.map(error));
}

function relative(value: number, right: number): number {
  return right === 0 ? Math.abs(value) : Math.abs((value - right) / right);
}

describe('quantiles', () => {
  // 1e-11: iterated sums of some hundred terms in doubles, far below what an interval can show
  it("of Student's t", () => {
    expect(tables.t.rows.length).toBeGreaterThan(90);
    expect(
      worstOf(tables.t.rows, ([p = 0, df = 1, t = 0]) => relative(studentTQuantile(p, df), t)),
    ).toBeLessThan(1e-11);
    expect(
      worstOf(tables.t.rows, ([p = 0, df = 1, t = 0]) => relative(studentTCdf(t, df), p)),
    ).toBeLessThan(1e-11);
  });

  it('of chi-square', () => {
    expect(tables.chi2.rows.length).toBeGreaterThan(50);
    expect(
      worstOf(tables.chi2.rows, ([p = 0, df = 1, x = 0]) => relative(chiSquareQuantile(p, df), x)),
    ).toBeLessThan(1e-11);
    expect(
      worstOf(tables.chi2.rows, ([p = 0, df = 1, x = 0]) => relative(chiSquareCdf(x, df), p)),
    ).toBeLessThan(1e-11);
  });

  it('of the normal distribution', () => {
    expect(
      worstOf(tables.normal.rows, ([p = 0, z = 0]) => relative(normalQuantile(p), z)),
    ).toBeLessThan(1e-11);
    expect(worstOf(tables.normal.rows, ([p = 0, z = 0]) => relative(normalCdf(z), p))).toBeLessThan(
      1e-11,
    );
  });

  it('of F, through the incomplete beta function that Student t stands on', () => {
    const error = ([p = 0, d1 = 1, d2 = 1, f = 0]: readonly number[]): number => {
      const share = (d1 * f) / (d1 * f + d2);
      return relative(incompleteBeta(d1 / 2, d2 / 2, share), p);
    };
    expect(worstOf(tables.f.rows, error)).toBeLessThan(1e-11);
  });
});
