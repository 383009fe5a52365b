import { incompleteGamma } from './incomplete-gamma.ts';
import { inverted } from './inverted.ts';

/** Chi-square distribution function; real df > 0. */
export function chiSquareCdf(x: number, df: number): number {
  return x <= 0 ? 0 : incompleteGamma(df / 2, x / 2).lower;
}

/** Chance of a value above `x`, without cancellation. */
export function chiSquareUpper(x: number, df: number): number {
  return x <= 0 ? 1 : incompleteGamma(df / 2, x / 2).upper;
}

/** Chi-square quantile; RangeError unless 0 < p < 1. */
export function chiSquareQuantile(p: number, df: number): number {
  if (!(p > 0 && p < 1)) throw new RangeError(`chiSquareQuantile needs 0 < p < 1, not ${p}`);
  return inverted((x) => chiSquareCdf(x, df), p, [0, df + 10]);
}
