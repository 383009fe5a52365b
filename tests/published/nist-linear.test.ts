import * as v from 'valibot';
import { afterAll, describe, expect, it } from 'vitest';
import { product } from '../../analysis/unmixing/double-double.ts';
import { factorise } from '../../analysis/unmixing/orthogonal.ts';
import { digits, published } from './values.ts';

// NIST StRD, linear regression: all eleven sets, none left out. Status: data and certified values read
// in public copies (values/README.md), reproduced in exact rational arithmetic (`refit`).

/**
 * Digits each set must keep: what was measured, rounded down, less about half a digit for other
 * machines. Parameters are refined, so only the rounding of the data to doubles and of the 15 printed
 * digits is left (Wampler2's smallest coefficient, 1e-5, takes most of it). Standard deviations are
 * not: they lose what the condition takes (Filip's is 1.8e10, NIST's own hardest), which is ample for
 * an uncertainty. 15 digits are as many as the certified values have.
 */
const floors = {
  Norris: { parameters: 13.5, sd: 13 },
  Pontius: { parameters: 13, sd: 13 },
  NoInt1: { parameters: 14, sd: 14 },
  NoInt2: { parameters: 14, sd: 14 },
  Filip: { parameters: 13.5, sd: 7 },
  Longley: { parameters: 14, sd: 11.5 },
  Wampler1: { parameters: 14, sd: 14 },
  Wampler2: { parameters: 13, sd: 14 },
  Wampler3: { parameters: 14, sd: 13.5 },
  Wampler4: { parameters: 14, sd: 13.5 },
  Wampler5: { parameters: 14, sd: 13.5 },
} as const;

const setSchema = v.object({
  source: v.string(),
  model: v.string(),
  x: v.union([v.array(v.number()), v.array(v.array(v.number()))]),
  y: v.array(v.number()),
  certified: v.array(v.number()),
  certifiedSd: v.array(v.number()),
});
type PublishedSet = v.InferOutput<typeof setSchema>;

interface Design {
  readonly high: Float64Array[];
  readonly low: Float64Array[];
}

/** The model's columns; powers of x in double-double, since rounding them moves the answer (Filip). */
function designOf({ x, model, certified }: PublishedSet): Design {
  const size = certified.length;
  const powers = model.includes('no intercept') ? size + 1 : size;
  const rows = x.map((entry) => {
    if (Array.isArray(entry)) return [1, ...entry].map((value) => [value, 0] as const);
    const row: (readonly [number, number])[] = [[1, 0]];
    while (row.length < powers) row.push(product(...(row.at(-1) ?? [1, 0]), entry, 0));
    return row.slice(-size);
  });
  const part = (half: 0 | 1) =>
    certified.map((_, k) => Float64Array.from(rows, (row) => row[k]?.[half] ?? Number.NaN));
  return { high: part(0), low: part(1) };
}

/** Standard deviations of the parameters: the residual's, times the rows of the pseudo-inverse. */
function standardDeviations(
  { high }: Design,
  y: readonly number[],
  answer: Float64Array,
  pseudoInverse: readonly Float64Array[],
): number[] {
  const rss = y.reduce((sum, value, i) => {
    const fitted = high.reduce((so, column, k) => so + (column[i] ?? 0) * (answer[k] ?? 0), 0);
    return sum + (value - fitted) ** 2;
  }, 0);
  const residualSd = Math.sqrt(rss / (y.length - high.length));
  return pseudoInverse.map((row) => residualSd * Math.hypot(...row));
}

/** Digits of the worst entry; against a certified 0 (exact fits) those of the absolute error. */
function worstDigits(values: ArrayLike<number>, certified: readonly number[]): number {
  return Math.min(...certified.map((right, k) => digits(values[k] ?? Number.NaN, right)));
}

describe('the linear sets of NIST StRD through our least squares', () => {
  const table: string[] = [];
  afterAll(() => {
    console.log(['digits of the worst:  parameter   standard deviation', ...table].join('\n'));
  });

  it.each(Object.entries(floors))('%s keeps its digits', (name, floor) => {
    const set = v.parse(setSchema, published(`nist-linear/${name}.json`));
    const design = designOf(set);
    const factors = factorise(design.high, design.low);
    expect(factors.rank).toBe(set.certified.length);
    const answer = factors.solve(Float64Array.from(set.y));
    const sds = standardDeviations(design, set.y, answer, factors.pseudoInverse());
    const parameters = worstDigits(answer, set.certified);
    const sd = worstDigits(sds, set.certifiedSd);
    table.push(`${name.padEnd(22)}${parameters.toFixed(1)}        ${sd.toFixed(1)}`);
    expect(parameters).toBeGreaterThanOrEqual(floor.parameters);
    expect(sd).toBeGreaterThanOrEqual(floor.sd);
  });
});
