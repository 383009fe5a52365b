import { quadratic } from '../spectrum/vectors.ts';

/**
 * Amounts (or shares) of the species with their uncertainty kept in two parts, so that what is
 * common to several aliquots can cancel. Matrices are species × species.
 */
export interface AmountEstimate {
  readonly species: readonly string[];
  /** Unconstrained. */
  readonly amounts: Float64Array;
  /** Non-negative; what is shown where the unconstrained are negative. */
  readonly drawn: Float64Array;
  /** Covariance that each aliquot has for itself. */
  readonly own: readonly Float64Array[];
  /** Covariance from the standards, common to all aliquots of the sheet. */
  readonly common: readonly Float64Array[];
  /** Relative variance of each amount from the scale of its own standards: goes with the amount. */
  readonly selfScale: Float64Array;
  /** Degrees of freedom behind `own`. */
  readonly df: number;
}

/** Variance of a linear function of the amounts, and the degrees of freedom behind it (Welch-Satterthwaite). */
export function varianceOf(
  estimate: AmountEstimate,
  weights: Float64Array,
): { readonly variance: number; readonly df: number } {
  const own = Math.max(quadratic(weights, estimate.own), 0);
  const variance = own + Math.max(quadratic(weights, estimate.common), 0);
  if (own === 0 || estimate.df === Number.POSITIVE_INFINITY) {
    return { variance, df: Number.POSITIVE_INFINITY };
  }
  return { variance, df: (variance / own) ** 2 * estimate.df };
}
