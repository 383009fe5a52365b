import { incompleteGamma } from './incomplete-gamma.ts';
import { positiveRoot } from './positive-root.ts';

/** Chi-square distribution function; real df > 0, else RangeError. */
export function chiSquareCdf(x: number, df: number): number {
  return incompleteGamma(df / 2, x < 0 ? 0 : x / 2).lower;
}

/** Chance of a value above `x`, without cancellation. */
export function chiSquareUpper(x: number, df: number): number {
  return incompleteGamma(df / 2, x < 0 ? 0 : x / 2).upper;
}

/** Chi-square quantile; RangeError unless 0 < p < 1. */
export function chiSquareQuantile(p: number, df: number): number {
  if (!(p > 0 && p < 1)) throw new RangeError(`chiSquareQuantile needs 0 < p < 1, not ${p}`);
  // by the smaller tail, which keeps its digits; 1 - p is exact from 1/2 on
  return positiveRoot(
    p > 0.5 ? (x) => chiSquareUpper(x, df) > 1 - p : (x) => chiSquareCdf(x, df) < p,
  );
}
