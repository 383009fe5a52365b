import { incompleteGamma } from './incomplete-gamma.ts';
import { positiveRoot } from './positive-root.ts';

/** Standard normal distribution function; the chance of a value above x is normalCdf(-x). */
export function normalCdf(x: number): number {
  const { lower, upper } = incompleteGamma(0.5, (x * x) / 2);
  return x < 0 ? upper / 2 : (1 + lower) / 2;
}

/** Standard normal quantile; RangeError unless 0 < p < 1. */
export function normalQuantile(p: number): number {
  if (!(p > 0 && p < 1)) throw new RangeError(`normalQuantile needs 0 < p < 1, not ${p}`);
  // by the lower tail, which keeps its digits; 1 - p is exact from 1/2 on
  if (p > 0.5) return -normalQuantile(1 - p);
  return p === 0.5 ? 0 : -positiveRoot((x) => normalCdf(-x) > p);
}
