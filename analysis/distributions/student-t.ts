import { incompleteBeta } from './incomplete-beta.ts';
import { inverted } from './inverted.ts';
import { normalCdf, normalQuantile } from './normal.ts';

/** Student's t: chance of a value above `t`, without cancellation. Real df > 0; Infinity is the normal. */
export function studentTUpper(t: number, df: number): number {
  if (!(df > 0)) throw new RangeError(`Student's t needs df > 0, not ${df}`);
  if (df === Number.POSITIVE_INFINITY) return normalCdf(-t);
  if (t < 0) return 1 - studentTUpper(-t, df);
  const total = df + t * t;
  return incompleteBeta(df / 2, 0.5, df / total, (t * t) / total) / 2;
}

/** Student's t distribution function. */
export function studentTCdf(t: number, df: number): number {
  return studentTUpper(-t, df);
}

/** Student's t quantile; RangeError unless 0 < p < 1. */
export function studentTQuantile(p: number, df: number): number {
  if (!(p > 0 && p < 1)) throw new RangeError(`studentTQuantile needs 0 < p < 1, not ${p}`);
  if (df === Number.POSITIVE_INFINITY) return normalQuantile(p);
  if (p > 0.5) return -studentTQuantile(1 - p, df);
  return p === 0.5 ? 0 : inverted((t) => studentTUpper(-t, df), p, [-10, 0]);
}
