/** Two estimates whose ratio numerator/denominator is asked for, with their covariance. */
export interface UncertainRatio {
  readonly numerator: number;
  readonly denominator: number;
  readonly numeratorVariance: number;
  readonly denominatorVariance: number;
  readonly covariance: number;
}

/**
 * The ratios that the estimates do not contradict: between two ends (one of them infinite where the
 * denominator is just as far from 0 as the quantile), all but those between two, or all.
 */
export type FiellerSet =
  | { readonly shape: 'bounded' | 'outside'; readonly lower: number; readonly upper: number }
  | { readonly shape: 'everything' };

/**
 * Fieller's confidence set in closed form: all ρ with (a - ρ b)² ≤ q² (V_a - 2 ρ C + ρ² V_b)
 * (E. C. Fieller, J. R. Statist. Soc. B 16 (1954) 175). Exact, unlike an interval from a standard
 * deviation of the ratio; not bounded where the denominator cannot be told from 0.
 *
 * @param quantile q, of the normal or Student's distribution (1.96 for 95 %)
 */
export function fiellerSet(ratio: UncertainRatio, quantile: number): FiellerSet {
  const { numerator: a, denominator: b } = ratio;
  const { numeratorVariance, denominatorVariance, covariance } = ratio;
  const square = quantile * quantile;
  // ρ² leading - 2 ρ middle + last ≤ 0
  const leading = b * b - square * denominatorVariance;
  const middle = a * b - square * covariance;
  const last = a * a - square * numeratorVariance;
  // middle² - leading · last without their cancellation
  const inner =
    b * b * numeratorVariance -
    2 * a * b * covariance +
    a * a * denominatorVariance -
    square * (numeratorVariance * denominatorVariance - covariance * covariance);
  if (leading <= 0 && !(inner > 0)) return { shape: 'everything' };
  const root = quantile * Math.sqrt(Math.max(inner, 0));
  if (leading === 0) return halfLine(middle, last);
  const larger = middle < 0 ? middle - root : middle + root;
  const ends = larger === 0 ? [0, 0] : [larger / leading, last / larger];
  return {
    shape: leading > 0 ? 'bounded' : 'outside',
    lower: Math.min(...ends),
    upper: Math.max(...ends),
  };
}

function halfLine(middle: number, last: number): FiellerSet {
  if (middle === 0) return { shape: 'everything' };
  const end = last / (2 * middle);
  return middle > 0
    ? { shape: 'bounded', lower: end, upper: Number.POSITIVE_INFINITY }
    : { shape: 'bounded', lower: Number.NEGATIVE_INFINITY, upper: end };
}
