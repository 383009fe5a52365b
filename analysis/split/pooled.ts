/** One number from each aliquot of a run, with its own variance and the effects of what all share. */
export interface AliquotNumber {
  readonly value: number;
  readonly ownVariance: number;
  /** Degrees of freedom behind `ownVariance`. */
  readonly df: number;
  /** Change per standard deviation of each shared source, in one order for the whole sheet. */
  readonly effects: Float64Array;
}

export interface PooledNumber {
  readonly mean: number;
  /** Variance of the mean from what the aliquots have for themselves: noise and scatter. */
  readonly ownVariance: number;
  readonly df: number;
  readonly effects: Float64Array;
}

/**
 * Mean of replicates: variance of each for itself, plus what they scatter beyond that
 * (τ² = s² - mean own variance, not below 0), over their number; degrees of freedom by
 * Welch-Satterthwaite. Shared errors are averaged as effects, so that they do not shrink and can
 * cancel against another run's.
 */
export function pooled(numbers: readonly AliquotNumber[]): PooledNumber {
  const n = numbers.length;
  const mean = numbers.reduce((sum, { value }) => sum + value, 0) / n;
  const own = numbers.reduce((sum, { ownVariance }) => sum + ownVariance, 0) / n;
  const ownDf =
    own ** 2 / numbers.reduce((sum, { ownVariance, df }) => sum + (ownVariance / n) ** 2 / df, 0);
  const scatter =
    n > 1 ? numbers.reduce((sum, { value }) => sum + (value - mean) ** 2, 0) / (n - 1) : 0;
  const between = Math.max(scatter - own, 0);
  const first = numbers[0];
  if (!first) throw new Error('there is nothing to pool');
  const effects = first.effects.map(
    (_, i) => numbers.reduce((sum, number) => sum + number.effects[i]!, 0) / n,
  );
  return {
    mean,
    ownVariance: (own + between) / n,
    df: (own + between) ** 2 / (own ** 2 / ownDf + (n > 1 ? between ** 2 / (n - 1) : 0)),
    effects,
  };
}

export function sumOfSquares(values: Float64Array): number {
  return values.reduce((sum, value) => sum + value * value, 0);
}
