import { absorbanceVariance } from '../../../analysis/spectrum/noise.ts';
import { withStrayLight } from '../../../analysis/spectrum/stray-light.ts';
import type { Solution } from '../../../analysis/standards/solution.ts';
import { type Bands, epsilonAt, usual } from '../synthetic.ts';

/** One solution to make, of an invented species. */
export interface Recipe {
  readonly standard: string;
  /** True absorbance at the strongest band. */
  readonly peak: number;
  readonly bands?: Bands;
  /** Offset of the recording, absorbance. */
  readonly offset?: number;
  /** Relative error of the concentration, as made. */
  readonly scaleError?: number;
  /** What the sheet says of it, and of the stock. */
  readonly u?: number;
  readonly stockU?: number;
  readonly strayLight?: number;
  /** Factor on the usual noise. */
  readonly noisier?: number;
  /** Points over which the instrument smooths. */
  readonly smoothing?: number;
  readonly upperAbsorbance?: number;
  readonly wavelengthNm?: Float64Array;
}

export const usualNm = Float64Array.from({ length: 241 }, (_, i) => 230 + i);
export const monoBands = usual.bands.mono ?? [];

/** The solution as a spectrometer would show it, brought to ε; `gauss` draws the noise. */
export function madeSolution(gauss: () => number, recipe: Recipe): Solution {
  const { bands = monoBands, wavelengthNm = usualNm, noisier = 1, smoothing = 1 } = recipe;
  const concentration = recipe.peak / Math.max(...bands.map(([, , height]) => height));
  const white = Array.from({ length: wavelengthNm.length + smoothing - 1 }, gauss);
  const epsilon = new Float64Array(wavelengthNm.length).fill(Number.NaN);
  const sd = new Float64Array(wavelengthNm.length);
  const usable = new Uint8Array(wavelengthNm.length);
  let largestAbsorbance = 0;
  for (const [i, nm] of wavelengthNm.entries()) {
    const truth = concentration * (1 + (recipe.scaleError ?? 0)) * epsilonAt(bands, nm);
    const shown = withStrayLight(truth, recipe.strayLight ?? 0) + (recipe.offset ?? 0);
    const noise = noisier * Math.sqrt(absorbanceVariance(usual.noise, shown));
    const draws = white.slice(i, i + smoothing).reduce((sum, draw) => sum + draw, 0);
    const absorbance = shown + (noise * draws) / smoothing;
    if (absorbance > (recipe.upperAbsorbance ?? 2)) continue;
    usable[i] = 1;
    epsilon[i] = absorbance / concentration;
    sd[i] =
      (noisier * Math.sqrt(absorbanceVariance(usual.noise, absorbance) / smoothing)) /
      concentration;
    largestAbsorbance = Math.max(largestAbsorbance, absorbance);
  }
  return {
    standard: recipe.standard,
    species: 'mono',
    wavelengthNm,
    epsilon,
    sd,
    usable,
    largestAbsorbance,
    absorbancePerEpsilon: concentration,
    scaleErrors: [
      { source: `dilution of ${recipe.standard}`, relative: recipe.u ?? 0 },
      { source: 'stock A', relative: recipe.stockU ?? 0 },
    ],
  };
}
