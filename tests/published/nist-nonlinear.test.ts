import { readdirSync } from 'node:fs';
import path from 'node:path';
import * as v from 'valibot';
import { afterAll, describe, expect, it } from 'vitest';
import {
  type NonlinearProblem,
  nonlinearLeastSquares,
} from '../../analysis/unmixing/nonlinear-least-squares.ts';
import { nistModels } from './nist-models.ts';
import { digits, published } from './values.ts';

// NIST StRD, nonlinear regression: all 27 sets, both starts, none left out. Status: data, starts and
// certified values read in a public copy (lmfit-py; values/README.md), verified by refitting with
// mpmath at 60 digits (`refit`): every certified figure is right within its last printed digit.

/** The starting points' own names in the sets. */
const starts = ['start1', 'start2'] as const;

/**
 * What issue 3 asks of the worst parameter against the certified value. Those are printed to eleven
 * digits, so that no run can show more than 10.2 to 12.6.
 */
const leastDigits = 9;

/**
 * Residuals are computed in doubles: where they are large beside the rounding of y (all sets but
 * Lanczos 1), their sum of squares has nine digits of the eleven printed, and so have the standard
 * deviations, which hang on it, less what the condition of the Jacobian takes (Thurber's is the
 * worst). Lanczos 1 was made with y of fourteen digits and its residuals are 8e-14 beside y of 2.5:
 * double precision leaves 2.5 digits of them, and so of both figures; the parameters keep theirs.
 */
const ofSpread = (name: string) => (name === 'Lanczos1' ? 2 : 9);

const setSchema = v.object({
  name: v.string(),
  observations: v.number(),
  x: v.union([v.array(v.number()), v.array(v.array(v.number()))]),
  y: v.array(v.number()),
  start1: v.array(v.number()),
  start2: v.array(v.number()),
  certified: v.array(v.number()),
  certifiedSd: v.array(v.number()),
  rss: v.number(),
});
type PublishedSet = v.InferOutput<typeof setSchema>;

const folder = 'nist-nonlinear';
const names = readdirSync(path.join(import.meta.dirname, 'values', folder)).map((file) =>
  path.basename(file, '.json'),
);

function setOf(name: string): PublishedSet {
  return v.parse(setSchema, published(`${folder}/${name}.json`));
}

function problemOf(set: PublishedSet): NonlinearProblem {
  const model = nistModels[set.name];
  if (!model) throw new Error(`no model for ${set.name}`);
  const y = set.y.map((value) => model.of?.(value) ?? value);
  const x = set.x.map((entry) => (Array.isArray(entry) ? entry : [entry]));
  return {
    residual: (parameters) => {
      const b = Array.from(parameters);
      return Float64Array.from(x, (at, i) => model.value(b, at) - (y[i] ?? Number.NaN));
    },
    jacobian: (parameters) => {
      const b = Array.from(parameters);
      const rows = x.map((at) => model.slopes(b, at));
      return b.map((_, k) => Float64Array.from(rows, (row) => row[k] ?? Number.NaN));
    },
  };
}

function worstDigits(values: Float64Array, certified: readonly number[]): number {
  expect(values).toHaveLength(certified.length);
  return Math.min(...certified.map((right, k) => digits(values[k] ?? Number.NaN, right)));
}

describe('the nonlinear sets of NIST StRD through our least squares', () => {
  const table: string[] = [];
  afterAll(() => {
    const head = 'digits of the worst   parameter   sd     rss    |Qᵀr|/|r|   evaluations';
    console.log([head, ...table].join('\n'));
  });

  it('are all there', () => {
    expect(names).toHaveLength(27);
    expect(new Set(names)).toEqual(new Set(Object.keys(nistModels)));
    for (const name of names) expect(setOf(name).y).toHaveLength(setOf(name).observations);
  });

  it.each(names.flatMap((name) => starts.map((start) => [name, start] as const)))(
    '%s from %s keeps nine digits',
    (name, start) => {
      const set = setOf(name);
      const problem = problemOf(set);
      let evaluations = 0;
      const fit = nonlinearLeastSquares(Float64Array.from(set[start]), {
        ...problem,
        residual: (parameters) => {
          evaluations += 1;
          return problem.residual(parameters);
        },
      });
      const parameters = worstDigits(fit.parameters, set.certified);
      const sd = worstDigits(fit.standardDeviations, set.certifiedSd);
      const rss = digits(fit.sumOfSquares, set.rss);
      const figures = [parameters, sd, rss].map((figure) => figure.toFixed(1).padStart(4));
      const proof = fit.orthogonality.toExponential(1);
      table.push(
        `${name.padEnd(10)} ${start}      ${figures.join('       ')}    ${proof}     ${evaluations}`,
      );
      expect(fit.converged).toBe(true);
      expect(parameters).toBeGreaterThanOrEqual(leastDigits);
      expect(sd).toBeGreaterThanOrEqual(ofSpread(name));
      expect(rss).toBeGreaterThanOrEqual(ofSpread(name));
    },
  );

  it.each(names)('%s: the derivatives are those of the model', (name) => {
    const set = setOf(name);
    const { residual, jacobian } = problemOf(set);
    const at = Float64Array.from(set.certified);
    for (const [k, column] of jacobian(at).entries()) {
      const value = at[k] ?? Number.NaN;
      // central differences: their error is of the order of step² in the model and 1e-16/step in rounding
      const step = 1e-5 * Math.abs(value);
      const [more, less] = [1, -1].map((side) => residual(at.with(k, value + side * step)));
      const most = Math.max(...column.map(Math.abs));
      for (const [i, slope] of column.entries()) {
        const difference = ((more?.[i] ?? Number.NaN) - (less?.[i] ?? Number.NaN)) / (2 * step);
        // a wrong term shows in the first digits
        expect(Math.abs(slope - difference)).toBeLessThan(1e-4 * most);
      }
    }
  });
});
