import { chiSquareQuantile } from '../distributions/chi-square.ts';
import type { NoiseModel } from './noise.ts';

/** A noise model and where it is from; null where each spectrum must tell its own. */
export interface KnownNoise {
  readonly model: NoiseModel | null;
  readonly from: 'sheet' | 'scans' | 'spectrum';
}

/** The chance that a noise that was stated rightly is found wanting. */
const falseAlarm = 0.01;

/**
 * Factor on the variance that residuals call for. Where the noise is not known beforehand, it is what
 * they show. A stated noise stands as long as they agree with it (χ², 1 %, both sides): above it is
 * lack of fit, below it the noise of an instrument that smooths after its noise was stated.
 *
 * @param shown mean square of the whitened residual
 * @param df degrees of freedom behind it
 */
export function levelToUse(
  shown: number,
  df: number,
  from: KnownNoise['from'],
): { readonly level: number; readonly measured: boolean } {
  if (!(df >= 1) || !Number.isFinite(shown)) return { level: 1, measured: false };
  if (from === 'spectrum') return { level: shown, measured: true };
  const [low, high] = [falseAlarm / 2, 1 - falseAlarm / 2].map(
    (probability) => chiSquareQuantile(probability, df) / df,
  );
  const agrees = low !== undefined && high !== undefined && shown >= low && shown <= high;
  return agrees ? { level: 1, measured: false } : { level: shown, measured: true };
}
