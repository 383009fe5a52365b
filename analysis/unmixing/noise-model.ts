import { Refusal } from '../refusal.ts';
import {
  estimateNoise,
  levelsOfSquares,
  type NoiseLevelAt,
  roundingSd,
  twoParts,
} from '../spectrum/estimate-noise.ts';
import type { NoiseModel } from '../spectrum/noise.ts';
import { taken } from '../spectrum/vectors.ts';
import type { SampledNoise } from '../standards/contrasts.ts';
import { cleanedResidual } from './noise-of-fit.ts';
import type { Measurement, Solution } from './solve.ts';
import { shiftSlope, standardsVariance } from './standards-on-points.ts';

/** Smallest number of degrees of freedom from which a noise of its own is taken. */
const fewestForNoise = 1;
/** and from which its two parts are told apart. */
const fewestForTwoParts = 30;

/** Proportions of an ordinary instrument, for the weights of a first fit whose residual tells the noise. */
const ordinaryNoise: NoiseModel = { constant: 3e-4, transmittance: 2e-4 };

/** A noise to begin with. */
export function firstNoise({ settings }: Measurement): NoiseModel {
  return settings.noise ?? ordinaryNoise;
}

export interface FoundNoise {
  readonly noise: NoiseModel;
  /** False where the noise is known from this very residual's size alone. */
  readonly known: boolean;
  /** Of the noise that other measurements show, what is like this one's. */
  readonly alike: readonly SampledNoise[];
}

/**
 * The two parts of the noise of one crude spectrum: stated, or from the squares of its residual together
 * with other measurements of the sheet if their noise is alike. Throws a `Refusal` where nothing
 * can tell it.
 */
export function noiseModelOf(
  input: Measurement & { readonly what: string },
  others: readonly SampledNoise[],
  at: Int32Array,
  solution: Solution,
): FoundNoise {
  const { crude, settings, what } = input;
  if (settings.noise) {
    return { noise: settings.noise, known: true, alike: others.filter(isAsStated) };
  }
  const { fit } = solution;
  if (fit.df >= fewestForTwoParts) return noiseOfSquares(input, others, at, solution);
  const nm = taken(crude.wavelengthNm, at);
  const estimate = estimateNoise(nm, fit.residual, fit.fitted, roundingSd(crude.values));
  if (estimate) return { noise: estimate, known: true, alike: [] };
  if (fit.df < fewestForNoise) {
    throw new Refusal({
      code: 'noise-unknown',
      message: `There are as many unknowns as points (${at.length}), so the noise cannot be told from the spectrum and no interval can be given.`,
      where: { what },
      mend: 'Give the noise of the instrument in the fit section ("noise"), widen the window, or use more points.',
    });
  }
  const rms = Math.sqrt(fit.residual.reduce((sum, value) => sum + value * value, 0) / fit.df);
  return { noise: { constant: rms, transmittance: 0 }, known: false, alike: [] };
}

/**
 * Both parts of the noise from the squares of the residual (what a wavelength offset or a band
 * without a standard may have put there taken out, spikes cut) together with what the standards of
 * the sheet show between them; the standards' own part is taken off.
 */
function noiseOfSquares(
  { crude, pathLengthCm }: Measurement,
  others: readonly SampledNoise[],
  at: Int32Array,
  { fit, molarAbsorptivity }: Solution,
): FoundNoise {
  const nm = taken(crude.wavelengthNm, at);
  const slope = shiftSlope(molarAbsorptivity, at, pathLengthCm, fit.parameters);
  const { residual, directions } = cleanedResidual({ nm, fit, beside: [slope] });
  const ofStandards = standardsVariance(molarAbsorptivity, at, pathLengthCm, fit.parameters);
  const expected = {
    flat: new Float64Array(at.length).fill(1),
    rise: fit.fitted.map((absorbance) => 100 ** Math.min(absorbance, 6)),
  };
  const own = levelsOfSquares(residual, expected, 1 - directions / at.length, ofStandards);
  const floor = roundingSd(crude.values);
  const alike = others.filter(({ levels }) => areAlike(own, levels, floor));
  const levels = [...own, ...alike.flatMap(({ levels: each }) => each)];
  return { noise: twoParts(levels, floor), known: true, alike };
}

/** How far apart two noises may be, in variance, and still be one instrument's. */
const likeness = 3;

/** Whether two sets of levels are of one noise: each as the model of the other has it. */
function areAlike(
  own: readonly NoiseLevelAt[],
  others: readonly NoiseLevelAt[],
  floor: number,
): boolean {
  if (others.length === 0) return false;
  const { constant, transmittance } = twoParts(others, floor);
  let [expected, found] = [0, 0];
  for (const { variance, flat, rise, points } of own) {
    expected += points * Math.sqrt(constant ** 2 * flat + transmittance ** 2 * rise);
    found += points * Math.sqrt(Math.max(variance, 0));
  }
  return found ** 2 < likeness * expected ** 2 && expected ** 2 < likeness * found ** 2;
}

/** Whitened by the stated noise, a measurement of the same instrument is of about unit variance. */
function isAsStated({ sample: { values, used } }: SampledNoise): boolean {
  const squares = values.reduce((sum, value) => sum + value * value, 0);
  const points = used.reduce((sum, one) => sum + one, 0);
  // the stated noise may be that before smoothing over many points
  return squares > 0.02 * points && squares < 10 * points;
}
