import { inverse, type Matrix } from 'ml-matrix';
import { chiSquareQuantile } from '../distributions/chi-square.ts';
import { linearityFalseAlarm } from './linearity.ts';
import type { Solution } from './solution.ts';

/** Whether the scales of several solutions agree within their uncertainties. */
export interface Agreement {
  readonly chiSquare: number;
  readonly df: number;
  readonly limit: number;
  /** The one solution without which the others agree, and how far it is from them; null if there is no such. */
  readonly apart: { readonly standard: string; readonly relative: number } | null;
}

/** The chance that solutions which do agree are called inconsistent; see `linearityFalseAlarm`. */
const falseAlarm = linearityFalseAlarm;

/**
 * χ² of the scales about their best mean.
 *
 * @param logScales logarithm of each solution's scale
 * @param covariance of them
 */
export function agreementOf(
  solutions: readonly Solution[],
  logScales: readonly number[],
  covariance: Matrix,
): Agreement | null {
  if (solutions.length < 2) return null;
  const all = Array.from(solutions.keys());
  const { chiSquare, limit } = consistency(logScales, covariance, all);
  return {
    chiSquare,
    df: all.length - 1,
    limit,
    apart: chiSquare > limit ? apartOf(solutions, logScales, covariance) : null,
  };
}

/** χ² of the scales of some solutions about their best mean, and what it stays below if they agree. */
function consistency(
  logScales: readonly number[],
  covariance: Matrix,
  members: readonly number[],
): { chiSquare: number; limit: number; mean: number } {
  const weight = inverse(covariance.selection([...members], [...members]));
  const rows = weight.to2DArray();
  let [top, bottom] = [0, 0];
  for (const [s, row] of rows.entries()) {
    const sum = row.reduce((all, entry) => all + entry, 0);
    top += sum * logScales[members[s]!]!;
    bottom += sum;
  }
  const mean = top / bottom;
  let chiSquare = 0;
  for (const [s, row] of rows.entries()) {
    for (const [t, entry] of row.entries()) {
      chiSquare += entry * (logScales[members[s]!]! - mean) * (logScales[members[t]!]! - mean);
    }
  }
  const df = members.length - 1;
  const limit = df > 0 ? chiSquareQuantile(1 - falseAlarm, df) : Number.POSITIVE_INFINITY;
  return { chiSquare, limit, mean };
}

/** The solution whose leaving brings the others best together, if they then agree. Two cannot tell. */
function apartOf(
  solutions: readonly Solution[],
  logScales: readonly number[],
  covariance: Matrix,
): Agreement['apart'] {
  if (solutions.length < 3) return null;
  const all = Array.from(solutions.keys());
  const without = all.map((s) => ({
    s,
    ...consistency(
      logScales,
      covariance,
      all.filter((t) => t !== s),
    ),
  }));
  const best = without.reduce((a, b) => (b.chiSquare < a.chiSquare ? b : a));
  if (best.chiSquare > best.limit) return null;
  return {
    standard: solutions[best.s]!.standard,
    relative: Math.exp(logScales[best.s]! - best.mean) - 1,
  };
}
