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

/** aᵀ M b for a symmetric matrix. */
export function quadratic(
  a: Float64Array,
  matrix: readonly Float64Array[],
  b: Float64Array = a,
): number {
  let sum = 0;
  for (let k = 0; k < matrix.length; k++) {
    const weight = a[k]!;
    if (weight === 0) continue;
    const row = matrix[k]!;
    for (let l = 0; l < row.length; l++) sum += weight * b[l]! * row[l]!;
  }
  return sum;
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
