import { correlate } from '../spectrum/correlated-noise.ts';
import { dot } from '../spectrum/vectors.ts';
import { standardsNoiseThrough } from './error-sources.ts';
import { spreadOut } from './noise-of-fit.ts';
import { factorise } from './orthogonal.ts';
import type { Unmixing } from './unmix.ts';
import { withPriors } from './weighted-fit.ts';

/** How much of the fitted points is left out at each end, as shares of their number. */
export interface Narrowing {
  readonly below: number;
  readonly above: number;
}

/** A refit on part of the window, with the weights of the whole. */
export interface NarrowedFit {
  readonly narrowing: Narrowing;
  /** First and last fitted point, positions among the fitted points. */
  readonly from: number;
  readonly to: number;
  /** Unconstrained amounts, mol/L. */
  readonly amounts: Float64Array;
  /** Change of the quantity asked for against the whole window, to first order. */
  readonly change: number;
  /** Standard deviation of that change if the model is right. */
  readonly sd: number;
}

/** Smallest number of points for each unknown that a narrowed window must keep. */
const pointsAnUnknown = 4;
const smallestSingular = 1e-7;

/**
 * Refits over narrowed windows. Both fits see the same noise, so the change is uncertain by less
 * than either: its variance is taken from the *difference* of the two gains on the noise of the points,
 * as they lean on each other, and on that of the standards (the test of Hausman, Econometrica 46 (1978)
 * 1251, in a form that asks of neither fit that it be efficient). Errors of scale move both alike.
 * Windows that keep too few points are left out.
 *
 * @param gradient of the quantity by the amounts, one entry a species
 * @param leastChange changes smaller than this are of no interest and left out: most of the work is in their `sd`
 */
export function narrowedFits(
  unmixing: Unmixing,
  gradient: Float64Array,
  narrowings: readonly Narrowing[],
  leastChange = 0,
): NarrowedFit[] {
  const points = unmixing.at.length;
  const unknowns = unmixing.fit.whitened.length;
  return narrowings.flatMap((narrowing) => {
    const from = Math.round(narrowing.below * points);
    const to = points - 1 - Math.round(narrowing.above * points);
    if (to - from + 1 < pointsAnUnknown * unknowns) return [];
    return narrowedFit({ unmixing, gradient, leastChange }, narrowing, from, to);
  });
}

function narrowedFit(
  {
    unmixing,
    gradient,
    leastChange,
  }: {
    readonly unmixing: Unmixing;
    readonly gradient: Float64Array;
    readonly leastChange: number;
  },
  narrowing: Narrowing,
  from: number,
  to: number,
): NarrowedFit[] {
  const { fit, measured, amounts, at, correlation, pointVariance } = unmixing;
  const columns = fit.whitened.map((column) => column.subarray(from, to + 1));
  const factors = factorise(withPriors(columns, fit.priors), undefined, smallestSingular);
  if (factors.rank < columns.length) return [];
  const right = new Float64Array(columns[0]!.length + fit.priors.length);
  for (let i = from; i <= to; i++) right[i - from] = measured[i]! / Math.sqrt(fit.variance[i]!);
  for (const [m, { value, sd }] of fit.priors.entries()) right[to - from + 1 + m] = value / sd;
  const narrowed = factors.solvePlain(right).slice(0, amounts.length);
  const change = gradient.reduce(
    (sum, weight, k) => sum + weight * (narrowed[k]! - amounts[k]!),
    0,
  );
  if (Math.abs(change) < leastChange) return [];
  const rows = factors.pseudoInverse();
  const difference = new Float64Array(at.length);
  for (const [k, weight] of gradient.entries()) {
    const [row, whole] = [rows[k]!, fit.gain[k]!];
    for (let i = 0; i < difference.length; i++) {
      const gain = i < from || i > to ? 0 : row[i - from]! / Math.sqrt(fit.variance[i]!);
      difference[i]! += weight * (gain - whole[i]!);
    }
  }
  const noise = spreadOut(
    at,
    difference.map((value, i) => value * Math.sqrt(pointVariance[i]!)),
  );
  const variance =
    dot(noise, correlate(correlation.rho, noise)) + standardsNoiseThrough(unmixing, difference);
  return [{ narrowing, from, to, amounts: narrowed, change, sd: Math.sqrt(variance) }];
}
