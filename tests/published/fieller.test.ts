import * as v from 'valibot';
import { describe, expect, it } from 'vitest';
import { normalQuantile } from '../../analysis/distributions/normal.ts';
import { studentTQuantile } from '../../analysis/distributions/student-t.ts';
import type { AmountEstimate } from '../../analysis/split/amounts.ts';
import { fiellerSet, type UncertainRatio } from '../../analysis/split/fieller.ts';
import { ratiosOf } from '../../analysis/split/fractions.ts';
import { factorise } from '../../analysis/unmixing/orthogonal.ts';
import { published } from './values.ts';

const answerSchema = { lower: v.number(), upper: v.number() };
const lineSchema = v.object({
  id: v.string(),
  x: v.array(v.number()),
  y: v.array(v.number()),
  y0: v.number(),
  level: v.number(),
  meanResponse: v.boolean(),
  published: v.object({ estimate: v.number(), ...answerSchema }),
  computed: v.object({ estimate: v.number(), ...answerSchema }),
});
const meansSchema = v.object({
  id: v.string(),
  meanA: v.number(),
  sdA: v.number(),
  nA: v.number(),
  meanB: v.number(),
  sdB: v.number(),
  nB: v.number(),
  level: v.number(),
  published: v.object(answerSchema),
  computed: v.object(answerSchema),
});
const estimatesSchema = v.object({
  id: v.string(),
  a: v.number(),
  b: v.number(),
  sdA: v.number(),
  sdB: v.number(),
  df: v.number(),
  published: v.object(answerSchema),
  computed: v.object(answerSchema),
});
const tableSchema = v.object({
  rows: v.array(
    v.tuple([
      v.number(),
      v.number(),
      v.number(),
      v.number(),
      v.number(),
      v.picklist(['bounded', 'outside of', 'everything']),
      v.nullable(v.number()),
      v.nullable(v.number()),
      v.number(),
    ]),
  ),
});
const entrySchema = v.union([lineSchema, meansSchema, estimatesSchema, tableSchema]);
const { fieller: entries } = v.parse(
  v.object({ fieller: v.array(entrySchema) }),
  published('uncertainty-worked.json'),
);
const lines = entries.filter((entry) => v.is(lineSchema, entry));
const means = entries.filter((entry) => v.is(meansSchema, entry));
const estimates = entries.filter((entry) => v.is(estimatesSchema, entry));
const rows = entries.filter((entry) => v.is(tableSchema, entry)).flatMap((table) => table.rows);

/** 1e-11: the values were computed to fifteen digits, a straight line by doubles loses two or three. */
const computedTolerance = 1e-11;

function expectEnds(
  set: ReturnType<typeof fiellerSet>,
  computed: { readonly lower: number; readonly upper: number },
): { readonly lower: number; readonly upper: number } {
  if (set.shape === 'everything') throw new Error('no ends');
  expect(Math.abs(set.lower / computed.lower - 1)).toBeLessThan(computedTolerance);
  expect(Math.abs(set.upper / computed.upper - 1)).toBeLessThan(computedTolerance);
  return set;
}

/** Decimals that all of these are printed to (a final 0 is lost in the file: the fewest count). */
function decimalsOf(...values: number[]): number {
  return Math.min(...values.map((value) => `${value}`.split('.')[1]?.length ?? 0));
}

function expectPrinted(value: number, printed: number, decimals: number): void {
  // half a unit of the last digit printed, and a hair: the printed figure itself is no exact binary number
  expect(Math.abs(value - printed)).toBeLessThanOrEqual(0.5001 * 10 ** -decimals);
}

/** x - mean of x at which the line reaches y0: (y0 - height at the mean)/slope, both from our least squares. */
function crossing({ x, y, y0, meanResponse }: v.InferOutput<typeof lineSchema>): {
  readonly ratio: UncertainRatio;
  readonly df: number;
  readonly middle: number;
} {
  const middle = x.reduce((sum, value) => sum + value, 0) / x.length;
  const columns = [Float64Array.from(x, () => 1), Float64Array.from(x, (value) => value - middle)];
  const factors = factorise(columns);
  const [height = Number.NaN, slope = Number.NaN] = factors.solve(Float64Array.from(y));
  const [ofHeight, ofSlope] = factors.pseudoInverse();
  if (!ofHeight || !ofSlope) throw new Error('two parameters have two rows');
  const rss = y.reduce(
    (sum, value, i) => sum + (value - height - slope * ((x[i] ?? Number.NaN) - middle)) ** 2,
    0,
  );
  const df = x.length - 2;
  const scatter = rss / df;
  const product = (a: Float64Array, b: Float64Array) =>
    scatter * a.reduce((sum, value, i) => sum + value * (b[i] ?? Number.NaN), 0);
  return {
    df,
    middle,
    ratio: {
      numerator: y0 - height,
      denominator: slope,
      // a single further observation scatters itself; a mean response does not
      numeratorVariance: product(ofHeight, ofHeight) + (meanResponse ? 0 : scatter),
      denominatorVariance: product(ofSlope, ofSlope),
      covariance: -product(ofHeight, ofSlope),
    },
  };
}

describe("Fieller's interval", () => {
  it('has its examples all here', () => {
    expect([lines.length, means.length, estimates.length, rows.length]).toEqual([5, 3, 1, 13]);
    expect(entries).toHaveLength(10);
  });

  // Status: Graybill and Iyer, Regression Analysis (1994), chapter 6, and Greenwell and Schubert
  // Kabban, R Journal 6(1) (2014) 90: data and answers read in an open regression package that cites
  // them; further digits computed with mpmath.
  it.each(lines)('of the x at which a fitted line reaches y0: $id', (line) => {
    const { ratio, df, middle } = crossing(line);
    const set = fiellerSet(ratio, studentTQuantile((1 + line.level) / 2, df));
    if (set.shape !== 'bounded') throw new Error('these are bounded');
    const ends = { lower: middle + set.lower, upper: middle + set.upper };
    const { lower, upper } = expectEnds({ shape: 'bounded', ...ends }, line.computed);
    const estimate = middle + ratio.numerator / ratio.denominator;
    expect(Math.abs(estimate / line.computed.estimate - 1)).toBeLessThan(computedTolerance);
    const decimals = decimalsOf(line.published.lower, line.published.upper);
    expectPrinted(lower, line.published.lower, decimals);
    expectPrinted(upper, line.published.upper, decimals);
    expectPrinted(estimate, line.published.estimate, decimalsOf(line.published.estimate));
  });

  // Status: inputs and answers of a public statistics calculator (method: Fieller 1940), read on a
  // found page; further digits computed with mpmath.
  it.each(means)('of two sample means: $id', (pair) => {
    const df = pair.nA + pair.nB - 2;
    // that calculator pools nothing: each mean has its own variance
    const ratio = {
      numerator: pair.meanA,
      denominator: pair.meanB,
      numeratorVariance: pair.sdA ** 2 / pair.nA,
      denominatorVariance: pair.sdB ** 2 / pair.nB,
      covariance: 0,
    };
    const set = fiellerSet(ratio, studentTQuantile((1 + pair.level) / 2, df));
    expect(set.shape).toBe('bounded');
    const { lower, upper } = expectEnds(set, pair.computed);
    expectPrinted(lower, pair.published.lower, 2);
    expectPrinted(upper, pair.published.upper, 2);
  });

  // Status: inputs and answer read on a found page; further digits computed with mpmath. That page
  // takes one-sided 0.05: a two-sided 90 % interval.
  it.each(estimates)('of two independent estimates: $id', (pair) => {
    const ratio = {
      numerator: pair.a,
      denominator: pair.b,
      numeratorVariance: pair.sdA ** 2,
      denominatorVariance: pair.sdB ** 2,
      covariance: 0,
    };
    const set = fiellerSet(ratio, studentTQuantile(0.95, pair.df));
    expect(set.shape).toBe('bounded');
    const { lower, upper } = expectEnds(set, pair.computed);
    expectPrinted(lower, pair.published.lower, 6);
    expectPrinted(upper, pair.published.upper, 6);
  });

  // Status: computed with mpmath from the definition (Fieller, J. R. Statist. Soc. B 16 (1954) 175).
  it.each(rows)(
    'of %d over %d, variances %d and %d, covariance %d: %s',
    (a, b, varianceA, varianceB, covariance, shape, lower, upper) => {
      const ratio = {
        numerator: a,
        denominator: b,
        numeratorVariance: varianceA,
        denominatorVariance: varianceB,
        covariance,
      };
      const set = fiellerSet(ratio, normalQuantile(0.975));
      expect(set.shape).toBe(shape === 'outside of' ? 'outside' : shape);
      if (lower !== null && upper !== null) expectEnds(set, { lower, upper });
    },
  );

  it('is the interval of a ratio in the results, where no bound shows in it', () => {
    const clear = rows.filter(
      ([a, b, varianceA, varianceB]) =>
        a / Math.sqrt(varianceA) > 5 && b / Math.sqrt(varianceB) > 5,
    );
    // the first four rows and no other: 1 over 1 thrice, 10 over 1
    expect(clear).toHaveLength(4);
    for (const [a, b, varianceA, varianceB, covariance, , lower, upper] of clear) {
      const own = [Float64Array.of(varianceA, covariance), Float64Array.of(covariance, varianceB)];
      const [result] = ratiosOf(estimateOf([a, b], own), [0, 1]);
      const [low, high] = result?.value.interval95 ?? [null, null];
      expect(result?.value.value).toBeCloseTo(a / b, 14);
      // through the fraction a/(a + b) and back to the ratio: a digit more is lost
      expect(Math.abs((low ?? Number.NaN) / (lower ?? 1) - 1)).toBeLessThan(1e-10);
      expect(Math.abs((high ?? Number.NaN) / (upper ?? 1) - 1)).toBeLessThan(1e-10);
    }
  });

  it('leaves a ratio open upwards in the results where the closed form is not bounded', () => {
    for (const [a, b, varianceA, varianceB, covariance, shape] of rows) {
      if (shape === 'bounded') continue;
      const own = [Float64Array.of(varianceA, covariance), Float64Array.of(covariance, varianceB)];
      const [result] = ratiosOf(estimateOf([a, b], own), [0, 1]);
      const [low, high] = result?.value.interval95 ?? [Number.NaN, Number.NaN];
      // a ratio of amounts is never negative, and open upwards where the denominator may be nothing
      expect(low).toBeGreaterThanOrEqual(0);
      expect(high).toBeNull();
    }
  });
});

function estimateOf(amounts: number[], own: readonly Float64Array[]): AmountEstimate {
  const nothing = own.map((row) => row.map(() => 0));
  return {
    species: ['mono', 'bis'],
    amounts: Float64Array.from(amounts),
    drawn: Float64Array.from(amounts),
    own,
    common: nothing,
    selfScale: new Float64Array(amounts.length),
    df: Number.POSITIVE_INFINITY,
  };
}
