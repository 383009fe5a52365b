import { Refusal } from '../refusal.ts';
import type { FitSettings } from '../sheet/defaults.ts';
import { correlate, type NoiseCorrelation } from '../spectrum/correlated-noise.ts';
import type { NoiseModel } from '../spectrum/noise.ts';
import { divided, dot, orthonormal, projectedOut, rooted, taken } from '../spectrum/vectors.ts';
import type { SampledNoise } from '../standards/contrasts.ts';
import type { MolarAbsorptivity } from '../standards/molar-absorptivity.ts';
import type { SpeciesStandard } from '../standards/species-standard.ts';
import { commonWeights } from './batch/common-weights.ts';
import { choosePoints, pointUse, usedPoints } from './choose-points.ts';
import type { BaselineName, Design } from './design.ts';
import { firstNoise, noiseModelOf } from './noise-model.ts';
import { type FoundBand, type NoiseOfFit, noiseOfFit } from './noise-of-fit.ts';
import { pointCovariance } from './point-covariance.ts';
import {
  largestShiftNm,
  type Measurement,
  type Solution,
  solveWith,
  standardsAt,
  statedStrayLight,
  strayLightColumn,
} from './solve.ts';
import { shiftSlope } from './standards-on-points.ts';
import type { WeightedFit } from './weighted-fit.ts';

export interface UnmixInput extends Measurement {
  /** Noise that other measurements of the sheet show. */
  readonly noiseSamples: readonly SampledNoise[];
  /** True where the level of the standards' noise was found between solutions of one species. */
  readonly noiseLevelSeen: boolean;
  /** For the message of a refusal: "aliquot a1". */
  readonly what: string;
}

/** One crude spectrum taken apart. Species are in the order of the standards. */
export interface Unmixing {
  readonly species: readonly string[];
  /** The standards as they were used, the stray light of the fit taken out. */
  readonly standards: readonly SpeciesStandard[];
  readonly pathLengthCm: number;
  /** Why each point of the crude is used or not (`pointUse`). */
  readonly use: Uint8Array;
  /** Positions of the fitted points. */
  readonly at: Int32Array;
  /** Absorbance at the fitted points, stray light taken out. */
  readonly measured: Float64Array;
  /** Standards on the crude's points, moved by the shift. */
  readonly molarAbsorptivity: readonly MolarAbsorptivity[];
  /** Unconstrained amounts in the cuvette, mol/L: they carry the inference. */
  readonly amounts: Float64Array;
  /** Non-negative amounts, mol/L: they are drawn, and quoted where the others are negative. */
  readonly drawn: Float64Array;
  /** Unconstrained baseline terms, with the standard deviation that the points give them. */
  readonly baseline: readonly {
    readonly term: BaselineName;
    readonly value: number;
    readonly sd: number;
    readonly drawn: number;
  }[];
  readonly shiftNm: { readonly value: number; readonly sd: number };
  /** Fraction of the light in the reference beam: stated, or found with its standard deviation. */
  readonly strayLight: { readonly value: number; readonly sd: number };
  readonly noise: NoiseModel;
  readonly noiseFrom: FitSettings['noiseFrom'];
  /** How the noise of one point leans on that of its neighbours. */
  readonly correlation: NoiseCorrelation;
  /** Variance of each fitted point that is this aliquot's own: photometric noise with lack of fit. */
  readonly pointVariance: Float64Array;
  /** Share of it that is lack of fit, 0 to 1. */
  readonly lackOfFit: number;
  /** Factor on the variance of the weights that the residual calls for, lack of fit aside. */
  readonly instrumentLevel: number;
  /** Factor on the variance of the standards' noise. */
  readonly standardsLevel: number;
  /** Degrees of freedom behind `excess` and the correlation; Infinity where the noise is known and nothing lacks. */
  readonly df: number;
  /** What stands out most from the residual; null where there are too few points to look. */
  readonly band: FoundBand | null;
  /** What a free wavelength offset (nm) and free stray light would come to, where they are not fitted. */
  readonly shiftHint: Hint | null;
  readonly strayLightHint: Hint | null;
  /** Null where the noise is known from this residual only. */
  readonly reducedChiSquare: number | null;
  /** Covariance of all parameters of `fit` from noise, lack of fit and priors. */
  readonly covariance: readonly Float64Array[];
  readonly fit: WeightedFit;
}

/**
 * Weighted least squares of one crude spectrum on the standards and the baseline, on the crude's
 * own points. Throws a `Refusal` where too few points are left or the ranges do not meet.
 */
export function unmix(input: UnmixInput): Unmixing {
  const { crude, settings, pathLengthCm } = input;
  const standards = input.standardsAt(statedStrayLight(settings));
  const onCrude = standardsAt(standards, crude.wavelengthNm, 0);
  const use = usableAtEveryShift(input, standards, choosePoints(crude, onCrude, settings));
  const at = usedPoints(use);
  refuseTooFew(input, standards.length, use, at);
  const first = solveWith(input, at, firstNoise(input));
  const { noise, known, alike } = noiseModelOf(input, input.noiseSamples, at, first);
  const solved = settings.noise ? first : solveWith(input, at, noise, first);
  const { fit, sizes, molarAbsorptivity, design } = solved;
  const nm = taken(crude.wavelengthNm, at);
  const shiftColumn =
    settings.shift === 'none'
      ? shiftSlope(molarAbsorptivity, at, pathLengthCm, fit.parameters)
      : null;
  const strayColumn = strayLightColumn(input, at, solved);
  const beside = [shiftColumn, strayColumn].filter((column) => column !== null);
  const ofFit = noiseOfFit({ at, nm, fit, beside }, alike, settings.noiseFrom);
  const { excess, instrumentLevel, correlation } = ofFit;
  const pointVariance = ownVariance(fit, excess, input.noiseLevelSeen);
  const size = standards.length;
  const drawn = drawnParameters(fit, solved.measured, design, size);
  const covariance = pointCovariance({ at, fit, correlation, pointVariance });
  const sdOf = (k: number): number => Math.sqrt(covariance[k]![k]!);
  const shifts = settings.shift === 'common' ? 1 : 0;
  const baselines = design.baseline.length;
  return {
    species: standards.map(({ species }) => species),
    standards: solved.standards,
    pathLengthCm,
    use,
    at,
    measured: solved.measured,
    molarAbsorptivity,
    amounts: fit.parameters.slice(0, size),
    drawn: drawn.slice(0, size),
    baseline: design.baseline.map(({ term }, j) => ({
      term,
      value: fit.parameters[size + j]!,
      sd: sdOf(size + j),
      drawn: drawn[size + j]!,
    })),
    shiftNm: { value: sizes.shiftNm, sd: shifts === 1 ? sdOf(size + baselines) : 0 },
    strayLight: {
      value: sizes.strayLight,
      sd: settings.strayLight === 'fit' ? sdOf(size + baselines + shifts) : 0,
    },
    noise,
    noiseFrom: settings.noiseFrom,
    correlation,
    pointVariance,
    lackOfFit: Math.max(1 - instrumentLevel / excess, 0),
    instrumentLevel,
    standardsLevel: input.noiseLevelSeen ? 1 : instrumentLevel,
    df: ofFit.df,
    band: known ? ofFit.band : null,
    shiftHint: hintOf(solved, shiftColumn, ofFit),
    strayLightHint: hintOf(solved, strayColumn, ofFit),
    reducedChiSquare: known ? fit.reducedChiSquare : null,
    covariance,
    fit,
  };
}

/** With a free shift, only points that the standards cover at every shift that may be tried. */
function usableAtEveryShift(
  { crude, settings }: UnmixInput,
  standards: readonly SpeciesStandard[],
  use: Uint8Array,
): Uint8Array {
  if (settings.shift === 'none') return use;
  const ends = [-largestShiftNm, largestShiftNm].flatMap((shift) =>
    standardsAt(standards, crude.wavelengthNm, shift),
  );
  return use.map((reason, i) =>
    reason === pointUse.used && ends.some(({ epsilon }) => Number.isNaN(epsilon[i]))
      ? pointUse.noStandard
      : reason,
  );
}

/** One Gauss-Newton step of an error of the instrument that is not in the fit (score test). */
export interface Hint {
  readonly value: number;
  /** With the noise's correlation and level. */
  readonly sd: number;
  /** Against independent noise of unit level, as a band's z is. */
  readonly z: number;
}

function hintOf(
  { fit }: Solution,
  column: Float64Array | null,
  { correlation, instrumentLevel }: NoiseOfFit,
): Hint | null {
  if (!column) return null;
  const sd = fit.variance.map(Math.sqrt);
  const whitened = column.map((value, i) => value / sd[i]!);
  const rest = projectedOut(orthonormal(fit.whitened), whitened);
  const squares = dot(rest, rest);
  if (!(squares > 1e-10 * dot(whitened, whitened))) return null;
  const residual = fit.residual.map((value, i) => value / sd[i]!);
  const value = dot(rest, residual) / squares;
  const variance = (instrumentLevel * dot(rest, correlate(correlation.rho, rest))) / squares ** 2;
  return { value, sd: Math.sqrt(variance), z: value * Math.sqrt(squares) };
}

/**
 * What of the variance of the points is the aliquot's own. Where the standards' part is known for
 * itself, a variance that is larger than supposed is the aliquot's; else it is both's.
 */
function ownVariance(
  { variance, noiseVariance }: WeightedFit,
  excess: number,
  standardsKnown: boolean,
): Float64Array {
  return noiseVariance.map((noise, i) => {
    if (!standardsKnown) return excess * noise;
    return Math.max(excess * variance[i]! - (variance[i]! - noise), 0.1 * excess * noise);
  });
}

function drawnParameters(
  fit: WeightedFit,
  measured: Float64Array,
  design: Design,
  size: number,
): Float64Array {
  const negative = fit.parameters.slice(0, size).some((amount) => amount < 0);
  if (!negative && fit.unseen.length === 0) return fit.parameters;
  const columns = fit.whitened.slice(0, size + design.baseline.length);
  return commonWeights(
    columns,
    divided(measured, rooted(fit.variance)),
    columns.map((_, k) => k >= size),
  );
}

function refuseTooFew(
  { settings, what, crude }: UnmixInput,
  species: number,
  use: Uint8Array,
  at: Int32Array,
): void {
  const baseline = { none: 0, offset: 1, line: 2, scatter: 2 }[settings.baseline];
  const errors = (settings.shift === 'common' ? 1 : 0) + (settings.strayLight === 'fit' ? 1 : 0);
  const unknowns = species + baseline + errors;
  if (at.length >= unknowns) return;
  const [low, high] = [crude.wavelengthNm[0], crude.wavelengthNm.at(-1)];
  if (settings.windowNm && use.every((reason) => reason === pointUse.outsideWindow)) {
    throw new Refusal({
      code: 'window-empty',
      message: `The window from ${settings.windowNm[0]} to ${settings.windowNm[1]} nm holds no point of the crude, which runs from ${low} to ${high} nm.`,
      where: { what },
      mend: 'Move the window to where the crude was recorded.',
    });
  }
  if (at.length === 0 && use.includes(pointUse.noStandard)) {
    throw new Refusal({
      code: 'ranges-do-not-meet',
      message: `The crude runs from ${low} to ${high} nm, and the standards do not all cover any of the window there.`,
      where: { what },
      mend: 'Record crude and standards over a common range, or move the window to where all of them reach.',
    });
  }
  throw new Refusal({
    code: 'too-few-points',
    message: `${at.length === 0 ? 'No point is' : `Only ${at.length} points are`} left to find ${unknowns} unknowns.`,
    where: { what },
    mend: 'Widen the window, exclude less, dilute more so that fewer points are over range, or use a simpler baseline.',
  });
}
