import { dot, orthonormal, projectedOut } from '../spectrum/vectors.ts';
import type { WeightedFit } from './weighted-fit.ts';

/**
 * By how much the uncertainty of each amount is inflated because the standards are alike in the
 * window: its standard deviation with everything fitted over that with only the baseline beside it,
 * as it were if the other spectra lay elsewhere. 1 is perfectly separated; Infinity where the data
 * do not see it. The square root of a variance inflation factor (Marquardt, Technometrics 12 (1970) 591).
 *
 * @param species number of species; their columns come first in the fit
 */
export function separationOf(fit: WeightedFit, species: number): number[] {
  const { whitened, gain, variance, unseen, priors } = fit;
  const beside = orthonormal(whitened.slice(species));
  return whitened.slice(0, species).map((column, k) => {
    const alone = projectedOut(beside, column);
    if (unseen.length === 0 && priors.length === 0) {
      // what the others leave of a column is one over the length of its row of the pseudo-inverse
      let squares = 0;
      for (let i = 0; i < variance.length; i++) squares += gain[k]![i]! ** 2 * variance[i]!;
      return Math.sqrt(dot(alone, alone) * squares);
    }
    const others = orthonormal(whitened.filter((_, l) => l !== k));
    const together = projectedOut(others, column);
    const [most, left] = [dot(alone, alone), dot(together, together)];
    return left > 1e-14 * most ? Math.sqrt(most / left) : Number.POSITIVE_INFINITY;
  });
}
