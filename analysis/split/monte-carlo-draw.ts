import { smoothed } from '../spectrum/correlated-noise.ts';
import type { Spectrum } from '../spectrum/spectrum.ts';
import { withoutStrayLight, withStrayLight } from '../spectrum/stray-light.ts';
import { absorbanceScale } from '../standards/overlaid.ts';
import type { Solution } from '../standards/solution.ts';
import { combineSolutions, type SpeciesStandard } from '../standards/species-standard.ts';
import type { Unmixing } from '../unmixing/unmix.ts';
import type { RandomNumbers } from './monte-carlo-generator.ts';

/** One drawing of every error that the standards have, in units of its standard deviation. */
export interface StandardsDraw {
  /** Errors common to whole spectra, by the name of their source. */
  readonly common: ReadonlyMap<string, number>;
  /** Noise of the points of each solution, by the standard's id: unit variance, correlated. */
  readonly noise: ReadonlyMap<string, Float64Array>;
  /** A constant in ε that the solutions of a species leave open, by species. */
  readonly constant: ReadonlyMap<string, number>;
}

/**
 * Noise of unit variance whose neighbouring points lean on each other: white noise, drawn beyond both
 * ends so that these vary as much as the middle, smoothed by the kernel and brought to unit variance.
 *
 * @param kernel symmetric, of odd length; [1] is independent points
 */
export function noiseDraw(
  { normal }: RandomNumbers,
  kernel: Float64Array,
  points: number,
): Float64Array {
  const margin = kernel.length >> 1;
  const white = Float64Array.from({ length: points + 2 * margin }, normal);
  const size = Math.hypot(...kernel);
  return smoothed(kernel, white)
    .slice(margin, margin + points)
    .map((value) => value / size);
}

export function standardsDraw(
  random: RandomNumbers,
  standards: readonly SpeciesStandard[],
  kernel: Float64Array,
): StandardsDraw {
  const common = new Map<string, number>();
  const noise = new Map<string, Float64Array>();
  const constant = new Map<string, number>();
  for (const { species, solutions } of standards) {
    const sources = [
      ...solutions.flatMap(({ scaleErrors }) => scaleErrors.map(({ source }) => source)),
      scatterOf(species),
    ];
    for (const source of sources) if (!common.has(source)) common.set(source, random.normal());
    constant.set(species, random.normal());
    for (const { standard, epsilon } of solutions) {
      noise.set(standard, noiseDraw(random, kernel, epsilon.length));
    }
  }
  return { common, noise, constant };
}

/** What `combineSolutions` adds where the solutions scatter more than their uncertainties allow. */
function scatterOf(species: string): string {
  return `scatter between standards of ${species}`;
}

interface StandardsNoise {
  /** Factor on the standard deviation of the standards' noise. */
  readonly level: number;
  /** As in `combineSolutions`. */
  readonly inflation: number;
}

/**
 * The standards as they could as well have been recorded and weighed, combined anew. Scales are drawn
 * on their logarithm, as `combineSolutions` takes them; a stock's error is one and the same in all its
 * solutions.
 */
export function redrawnStandard(
  standard: SpeciesStandard,
  draw: StandardsDraw,
  { level, inflation }: StandardsNoise,
): SpeciesStandard {
  const { species, solutions, offsets, scaleErrors, constantUncertainty } = standard;
  const scatter = scaleErrors.find(({ source }) => source === scatterOf(species))?.relative ?? 0;
  const ofSpecies = scatter * (draw.common.get(scatterOf(species)) ?? 0);
  const constant = constantUncertainty * (draw.constant.get(species) ?? 0);
  const redrawn = solutions.map((solution, s): Solution => {
    const noise = draw.noise.get(solution.standard);
    const scale = Math.exp(
      solution.scaleErrors.reduce(
        (sum, { source, relative }) => sum + relative * (draw.common.get(source) ?? 0),
        ofSpecies,
      ),
    );
    // the offset was taken out of the recording: it goes back, to be found again
    const shift = constant + (offsets[s] ?? 0) / absorbanceScale(solution);
    return {
      ...solution,
      epsilon: solution.epsilon.map(
        (value, i) => (value + shift + level * solution.sd[i]! * (noise?.[i] ?? 0)) / scale,
      ),
    };
  });
  return combineSolutions(redrawn, { noiseInflation: inflation });
}

/**
 * The crude as it could as well have been recorded: at every point that was fitted, the reading with
 * the aliquot's own noise and lack of fit drawn anew; all others missing. Where the noise is known
 * from few degrees of freedom its size is drawn as well (scaled and shifted t, JCGM 101, 6.4.9).
 *
 * @param shiftNm added to the wavelengths: a prior on the wavelength offset is a reading of that offset
 */
export function redrawnCrude(
  crude: Spectrum,
  { at, pointVariance, strayLight, correlation, df }: Unmixing,
  random: RandomNumbers,
  shiftNm: number,
): Spectrum {
  const noise = noiseDraw(random, correlation.kernel, crude.values.length);
  const size = Number.isFinite(df) && df > 0 ? Math.sqrt(df / random.chiSquare(df)) : 1;
  const values = new Float64Array(crude.values.length).fill(Number.NaN);
  for (const [j, i] of at.entries()) {
    const drawn = size * Math.sqrt(pointVariance[j]!) * noise[i]!;
    const absorbance = withoutStrayLight(crude.values[i]!, strayLight.value) + drawn;
    values[i] = strayLight.value === 0 ? absorbance : withStrayLight(absorbance, strayLight.value);
  }
  return {
    ...crude,
    wavelengthNm:
      shiftNm === 0 ? crude.wavelengthNm : crude.wavelengthNm.map((value) => value + shiftNm),
    values,
  };
}
