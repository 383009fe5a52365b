import * as v from 'valibot';
import { describe, expect, it } from 'vitest';
import { chiSquareCdf, chiSquareQuantile } from '../../analysis/distributions/chi-square.ts';
import { fCdf, fQuantile } from '../../analysis/distributions/f.ts';
import { normalCdf, normalQuantile } from '../../analysis/distributions/normal.ts';
import { studentTCdf, studentTQuantile } from '../../analysis/distributions/student-t.ts';
import { published } from './values.ts';

// Status: computed with mpmath (30 digits), agrees with R 4.2.2 to 1.1e-13; printed to 15 digits.
const tableSchema = v.object({ rows: v.array(v.array(v.number())) });
const tables = v.parse(
  v.object({ t: tableSchema, chi2: tableSchema, f: tableSchema, normal: tableSchema }),
  published('quantiles-mp.json'),
);

type Row = readonly number[];

function worstOf(rows: readonly Row[], error: (row: Row) => number): number {
  return Math.max(...rows.map(error));
}

function relative(value: number, right: number): number {
  return right === 0 ? Math.abs(value) : Math.abs((value - right) / right);
}

/**
 * 1e-12: the tables are printed to 15 digits, our sums of some hundred terms in doubles lose two or
 * three of sixteen. Far below what an interval can show.
 */
const tolerance = 1e-12;

describe('quantiles and distribution functions, every row', () => {
  it("of Student's t", () => {
    const { rows } = tables.t;
    expect(rows).toHaveLength(102);
    const quantile = ([p = 0, df = 1, t = 0]: Row) => relative(studentTQuantile(p, df), t);
    const chance = ([p = 0, df = 1, t = 0]: Row) => relative(studentTCdf(t, df), p);
    expect(worstOf(rows, quantile)).toBeLessThan(tolerance);
    expect(worstOf(rows, chance)).toBeLessThan(tolerance);
  });

  it('of chi-square', () => {
    const { rows } = tables.chi2;
    expect(rows).toHaveLength(99);
    const quantile = ([p = 0, df = 1, x = 0]: Row) => relative(chiSquareQuantile(p, df), x);
    const chance = ([p = 0, df = 1, x = 0]: Row) => relative(chiSquareCdf(x, df), p);
    expect(worstOf(rows, quantile)).toBeLessThan(tolerance);
    expect(worstOf(rows, chance)).toBeLessThan(tolerance);
  });

  it('of F', () => {
    const { rows } = tables.f;
    expect(rows).toHaveLength(90);
    const quantile = ([p = 0, d1 = 1, d2 = 1, f = 0]: Row) => relative(fQuantile(p, d1, d2), f);
    const chance = ([p = 0, d1 = 1, d2 = 1, f = 0]: Row) => relative(fCdf(f, d1, d2), p);
    expect(worstOf(rows, quantile)).toBeLessThan(tolerance);
    expect(worstOf(rows, chance)).toBeLessThan(tolerance);
  });

  it('of the normal distribution', () => {
    const { rows } = tables.normal;
    expect(rows).toHaveLength(11);
    // the table's p is decimal: as a double it is off by up to half a unit, and so is its small tail
    // (p = 0.999999: 2e-12 in z), z moving by that over z² (Mills' ratio)
    const ofP = (p: number, z: number) => Number.EPSILON / 2 / (1 - p) / (z * z);
    const quantile = ([p = 0, z = 0]: Row) => relative(normalQuantile(p), z) - ofP(p, z);
    const chance = ([p = 0, z = 0]: Row) => relative(normalCdf(z), p);
    expect(worstOf(rows, quantile)).toBeLessThan(tolerance);
    expect(worstOf(rows, chance)).toBeLessThan(tolerance);
  });
});
