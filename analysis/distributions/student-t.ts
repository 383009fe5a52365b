import { incompleteBeta } from './incomplete-beta.ts';
import { logGamma } from './log-gamma.ts';
import { normalCdf, normalQuantile } from './normal.ts';
import { positiveRoot } from './positive-root.ts';

/** From here on Hill's expansion is exact to doubles (its first term left out is below 1e-20). */
const manyDf = 1e5;
/** From here on no double tells Student's t from the normal, and powers of the expansion could overflow. */
const normalDf = 1e30;
/** Beyond this t² would overflow; the tail is a power of t there, to all digits. */
const farOut = 1e100;

/** Student's t: chance of a value above `t`, without cancellation. Real df > 0; Infinity is the normal. */
export function studentTUpper(t: number, df: number): number {
  if (!(df > 0)) throw new RangeError(`Student's t needs df > 0, not ${df}`);
  if (df >= normalDf) return normalCdf(-t);
  if (t < 0) return 1 - studentTUpper(-t, df);
  if (df >= manyDf) return normalCdf(-equivalentNormal(t, df));
  const ratio = t / Math.sqrt(df);
  if (ratio > farOut) return powerTail(t, df);
  const total = 1 + ratio * ratio;
  return incompleteBeta(df / 2, 0.5, 1 / total, (ratio * ratio) / total) / 2;
}

/** Student's t distribution function. */
export function studentTCdf(t: number, df: number): number {
  return studentTUpper(-t, df);
}

/** Student's t quantile; RangeError unless 0 < p < 1. */
export function studentTQuantile(p: number, df: number): number {
  if (!(p > 0 && p < 1)) throw new RangeError(`studentTQuantile needs 0 < p < 1, not ${p}`);
  if (df >= normalDf) return normalQuantile(p);
  // by the smaller tail, which keeps its digits; 1 - p is exact from 1/2 on
  if (p > 0.5) return -studentTQuantile(1 - p, df);
  if (p === 0.5) return 0;
  const known = lately.find((each) => each.p === p && each.df === df);
  if (known) return known.quantile;
  const quantile = -positiveRoot((t) => studentTUpper(t, df) > p);
  lately = [{ p, df, quantile }, ...lately.slice(0, mostLately - 1)];
  return quantile;
}

/** The last few quantiles: the amounts of one spectrum ask for the same ones over and over. */
let lately: readonly { readonly p: number; readonly df: number; readonly quantile: number }[] = [];
const mostLately = 8;

/** The normal deviate with the same tail (G. W. Hill, algorithm 395, Comm. ACM 13 (1970) 617). */
function equivalentNormal(t: number, df: number): number {
  const a = df - 0.5;
  const b = 48 * a * a;
  const ratio = t / Math.sqrt(df);
  // ratio² may overflow, its logarithm does not
  const y = a * (ratio > farOut ? 2 * Math.log(ratio) : Math.log1p(ratio * ratio));
  if (y === Number.POSITIVE_INFINITY) return y;
  const second = (((-0.4 * y - 3.3) * y - 24) * y - 85.5) / (0.8 * y * y + 100 + b);
  return ((second + y + 3) / b + 1) * Math.sqrt(y);
}

/** First term of the tail's expansion: x^(df/2) / (df B(df/2, 1/2)) with x = df/t². */
function powerTail(t: number, df: number): number {
  const logBeta = logGamma(df / 2) + logGamma(0.5) - logGamma((df + 1) / 2);
  return Math.exp(-df * (Math.log(t) - Math.log(df) / 2) - logBeta) / df;
}
