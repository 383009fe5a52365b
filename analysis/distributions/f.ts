import { incompleteBeta } from './incomplete-beta.ts';
import { positiveRoot } from './positive-root.ts';

/** F distribution function; real d1, d2 > 0, else RangeError. */
export function fCdf(x: number, d1: number, d2: number): number {
  const { below, above } = shares(x, d1, d2);
  return incompleteBeta(d1 / 2, d2 / 2, below, above);
}

/** Chance of a ratio above `x`, without cancellation. */
export function fUpper(x: number, d1: number, d2: number): number {
  const { below, above } = shares(x, d1, d2);
  return incompleteBeta(d2 / 2, d1 / 2, above, below);
}

/** F quantile; RangeError unless 0 < p < 1. */
export function fQuantile(p: number, d1: number, d2: number): number {
  if (!(p > 0 && p < 1)) throw new RangeError(`fQuantile needs 0 < p < 1, not ${p}`);
  // by the smaller tail, which keeps its digits; 1 - p is exact from 1/2 on
  return positiveRoot(p > 0.5 ? (x) => fUpper(x, d1, d2) > 1 - p : (x) => fCdf(x, d1, d2) < p);
}

/** d1 x/(d1 x + d2) and its complement, neither as a difference. */
function shares(x: number, d1: number, d2: number): { below: number; above: number } {
  const ratio = x < 0 ? 0 : (d1 / d2) * x;
  return ratio === Number.POSITIVE_INFINITY
    ? { below: 1, above: 0 }
    : { below: ratio / (1 + ratio), above: 1 / (1 + ratio) };
}
