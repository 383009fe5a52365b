import { logGamma } from './log-gamma.ts';

const halfLogTwoPi = Math.log(2 * Math.PI) / 2;
/** From here on the series' first term left out is below 1e-16. */
const seriesFrom = 10;

/**
 * What Stirling's formula leaves out: ln Γ(a) - [(a - 1/2) ln a - a + ln(2π)/2], for a > 0.
 * It stays small where ln Γ itself grows, so densities built on it keep their digits for large a
 * (C. Loader, Fast and accurate computation of binomial probabilities, 2000).
 */
export function stirlingError(a: number): number {
  if (a < seriesFrom) return logGamma(a) - ((a - 0.5) * Math.log(a) - a + halfLogTwoPi);
  const s = 1 / (a * a);
  const tail = 1 / 1680 - s * (1 / 1188 - s * (691 / 360360 - s / 156));
  return (1 / 12 - s * (1 / 360 - s * (1 / 1260 - s * tail))) / a;
}
