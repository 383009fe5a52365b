import { correlate, type NoiseCorrelation } from '../spectrum/correlated-noise.ts';
import { dot } from '../spectrum/vectors.ts';
import { spreadOut } from './noise-of-fit.ts';
import type { WeightedFit } from './weighted-fit.ts';

interface NoisyFit {
  /** Positions of the fitted points. */
  readonly at: Int32Array;
  readonly fit: Pick<WeightedFit, 'gain' | 'priorGain'>;
  readonly correlation: NoiseCorrelation;
  /** Variance of each point. */
  readonly pointVariance: Float64Array;
}

/**
 * Covariance of the parameters from photometric noise and lack of fit, G Σ Gᵀ with Σ the variance of
 * the points *and* how they lean on each other (the sandwich form; Huber 1967, White 1980), and from
 * priors. Parameters × parameters.
 */
export function pointCovariance({ at, fit, correlation, pointVariance }: NoisyFit): Float64Array[] {
  const sd = pointVariance.map(Math.sqrt);
  const rows = fit.gain.map((row) =>
    spreadOut(
      at,
      row.map((value, i) => value * sd[i]!),
    ),
  );
  const moved = rows.map((row) => correlate(correlation.rho, row));
  return rows.map((a, k) =>
    Float64Array.from(moved, (b, l) => dot(a, b) + dot(fit.priorGain[k]!, fit.priorGain[l]!)),
  );
}
