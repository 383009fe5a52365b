import { incompleteGamma } from './incomplete-gamma.ts';
import { inverted } from './inverted.ts';

/** Standard normal distribution function. */
export function normalCdf(x: number): number {
  if (x === Number.POSITIVE_INFINITY) return 1;
  if (x === Number.NEGATIVE_INFINITY) return 0;
  const { lower, upper } = incompleteGamma(0.5, (x * x) / 2);
  return x < 0 ? upper / 2 : (1 + lower) / 2;
}

/** Standard normal quantile; RangeError unless 0 < p < 1. */
export function normalQuantile(p: number): number {
  if (!(p > 0 && p < 1)) throw new RangeError(`normalQuantile needs 0 < p < 1, not ${p}`);
  // on the lower half, where the distribution function keeps its digits
  if (p > 0.5) return -normalQuantile(1 - p);
  return p === 0.5 ? 0 : inverted(normalCdf, p, [-40, 0]);
}
