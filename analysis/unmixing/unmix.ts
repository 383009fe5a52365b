import { Refusal } from '../refusal.ts';
import type { FitSettings } from '../sheet/defaults.ts';
import type { NoiseCorrelation } from '../spectrum/correlated-noise.ts';
import {
  estimateNoise,
  levelsOfSquares,
  roundingSd,
  twoParts,
} from '../spectrum/estimate-noise.ts';
import type { NoiseModel } from '../spectrum/noise.ts';
import type { Spectrum } from '../spectrum/spectrum.ts';
import { withoutStrayLight } from '../spectrum/stray-light.ts';
import type { SampledNoise } from '../standards/contrasts.ts';
import { type MolarAbsorptivity, molarAbsorptivityAt } from '../standards/molar-absorptivity.ts';
import type { SpeciesStandard } from '../standards/species-standard.ts';
import { choosePoints, pointUse, usedPoints } from './choose-points.ts';
import { type BaselineName, type Design, designOf } from './design.ts';
import { fitInstrument, type InstrumentError, type LinearModel } from './instrument-fit.ts';
import { cleanedResidual, type FoundBand, noiseOfFit } from './noise-of-fit.ts';
import { nonNegativeLeastSquares } from './non-negative.ts';
import { pointCovariance } from './point-covariance.ts';
import { shiftSlope, standardsVariance } from './standards-on-points.ts';
import { modelled, type WeightedFit, weightedFit } from './weighted-fit.ts';

export interface UnmixInput {
  readonly crude: Spectrum;
  /** The standards with this fraction of stray light taken out of them. */
  readonly standardsAt: (strayLight: number) => readonly SpeciesStandard[];
  /** Noise that other measurements of the sheet show. */
  readonly noiseSamples: readonly SampledNoise[];
  readonly pathLengthCm: number;
  readonly settings: FitSettings;
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
  /** Factor on the point variance for lack of fit (and for the scale of an estimated noise). */
  readonly excess: number;
  /** The same factor without lack of fit. */
  readonly instrumentLevel: number;
  /** Degrees of freedom behind `excess` and the correlation; Infinity where the noise is known and nothing lacks. */
  readonly df: number;
  /** What stands out most from the residual; null where there are too few points to look. */
  readonly band: FoundBand | null;
  /** Null where the noise is known from this residual only. */
  readonly reducedChiSquare: number | null;
  /** Covariance of all parameters of `fit` from noise, lack of fit and priors. */
  readonly covariance: readonly Float64Array[];
  readonly fit: WeightedFit;
}

/** Smallest number of degrees of freedom from which a noise of its own is taken. */
const fewestForNoise = 1;
/** and from which its two parts are told apart. */
const fewestForTwoParts = 30;
/** A shift beyond this is not an instrument's wavelength error but another spectrum. nm */
const largestShiftNm = 2;
/** Stray light beyond this is a fault of the instrument, not an error to fit. */
const largestStrayLight = 0.05;
/** Step of the slope with stray light. */
const strayLightStep = 1e-5;

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
  const { noise, known } = noiseModelOf(input, at, first);
  const solved = settings.noise ? first : solveWith(input, at, noise);
  const { fit, sizes, molarAbsorptivity, design } = solved;
  const nm = Float64Array.from(at, (i) => crude.wavelengthNm[i]!);
  const beside =
    settings.shift === 'none' && known
      ? [shiftSlope(molarAbsorptivity, at, pathLengthCm, fit.parameters)]
      : [];
  const ofFit = noiseOfFit({ at, nm, fit, beside }, input.noiseSamples, settings.noiseFrom);
  const size = standards.length;
  const drawn = drawnParameters(fit, solved.measured, design, size);
  const covariance = pointCovariance({ at, fit, ...ofFit });
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
    correlation: ofFit.correlation,
    excess: ofFit.excess,
    instrumentLevel: ofFit.instrumentLevel,
    df: ofFit.df,
    band: known ? ofFit.band : null,
    reducedChiSquare: known ? fit.reducedChiSquare : null,
    covariance,
    fit,
  };
}

interface Solution {
  readonly standards: readonly SpeciesStandard[];
  /** Absorbance of the crude at the fitted points, stray light taken out. */
  readonly measured: Float64Array;
  readonly fit: WeightedFit;
  readonly sizes: { readonly shiftNm: number; readonly strayLight: number };
  readonly molarAbsorptivity: readonly MolarAbsorptivity[];
  readonly design: Design;
}

interface State extends LinearModel {
  readonly standards: readonly SpeciesStandard[];
  readonly moved: readonly MolarAbsorptivity[];
  readonly design: Design;
}

function solveWith(input: UnmixInput, at: Int32Array, noise: NoiseModel): Solution {
  const { crude, settings, pathLengthCm } = input;
  const states = new Map<string, State>();
  const stateAt = (shiftNm: number, strayLight: number): State => {
    const key = `${shiftNm} ${strayLight}`;
    const state = states.get(key) ?? freshState(shiftNm, strayLight);
    states.set(key, state);
    return state;
  };
  const freshState = (shiftNm: number, strayLight: number): State => {
    const standards = input.standardsAt(strayLight);
    const moved = standardsAt(standards, crude.wavelengthNm, shiftNm);
    const design = designOf(moved, crude.wavelengthNm, at, pathLengthCm, settings.baseline);
    const columns = [...design.species, ...design.baseline.map(({ column }) => column)];
    const measured = Float64Array.from(at, (i) => withoutStrayLight(crude.values[i]!, strayLight));
    return { standards, moved, design, columns, measured };
  };
  const weighing = (moved: readonly MolarAbsorptivity[]) => (parameters: Float64Array) =>
    standardsVariance(moved, at, pathLengthCm, parameters);
  const asSolution = (
    sizes: Solution['sizes'],
    { standards, measured, moved, design }: State,
    fit: WeightedFit,
  ): Solution => ({ standards, measured, fit, sizes, molarAbsorptivity: moved, design });
  const stated = { shiftNm: 0, strayLight: statedStrayLight(settings) };
  const start = stateAt(stated.shiftNm, stated.strayLight);
  if (settings.shift === 'none' && settings.strayLight !== 'fit') {
    const fit = weightedFit(start.columns, start.measured, noise, weighing(start.moved));
    return asSolution(stated, start, fit);
  }
  const sizesOf = (sizes: Float64Array): Solution['sizes'] => ({
    shiftNm: settings.shift === 'common' ? sizes[0]! : 0,
    strayLight: settings.strayLight === 'fit' ? sizes.at(-1)! : stated.strayLight,
  });
  const stateOf = (sizes: Float64Array) => {
    const { shiftNm, strayLight } = sizesOf(sizes);
    return stateAt(shiftNm, strayLight);
  };
  const found = fitInstrument({
    errors: instrumentErrors(settings, start.measured),
    modelAt: stateOf,
    slopesAt: (sizes, parameters) => {
      const { shiftNm, strayLight } = sizesOf(sizes);
      const here = stateAt(shiftNm, strayLight);
      const shift =
        settings.shift === 'common' ? [shiftSlope(here.moved, at, pathLengthCm, parameters)] : [];
      if (settings.strayLight !== 'fit') return shift;
      const more = stateAt(shiftNm, strayLight + strayLightStep);
      return [...shift, strayLightSlope(here, more, parameters)];
    },
    fit: ({ columns, measured }, priors) =>
      weightedFit(columns, measured, noise, weighing(start.moved), priors),
  });
  return asSolution(sizesOf(found.sizes), stateOf(found.sizes), found.fit);
}

function statedStrayLight({ strayLight }: FitSettings): number {
  return strayLight === 'fit' ? 0 : strayLight;
}

function instrumentErrors(settings: FitSettings, measured: Float64Array): InstrumentError[] {
  const shift: InstrumentError = {
    range: [-largestShiftNm, largestShiftNm],
    step: 0.5,
    settled: 1e-7,
    priorSd: settings.shiftPriorNm,
  };
  // a reading needs less stray light than reaches the detector with it
  const transmitted = 10 ** -measured.reduce((most, value) => Math.max(most, value), 0);
  const ceiling = Math.min(largestStrayLight, (0.9 * transmitted) / (1 - 0.9 * transmitted));
  const stray: InstrumentError = {
    range: [-0.1 * ceiling, ceiling],
    step: 0.2 * ceiling,
    settled: 1e-9,
    priorSd: null,
  };
  return [
    ...(settings.shift === 'common' ? [shift] : []),
    ...(settings.strayLight === 'fit' ? [stray] : []),
  ];
}

/** ∂(model - measured)/∂(stray light) by a forward difference. */
function strayLightSlope(here: LinearModel, more: LinearModel, parameters: Float64Array) {
  const departure = ({ columns, measured }: LinearModel): Float64Array => {
    const fitted = modelled(columns, parameters);
    return fitted.map((value, i) => value - measured[i]!);
  };
  const [before, after] = [departure(here), departure(more)];
  return before.map((value, i) => (after[i]! - value) / strayLightStep);
}

function standardsAt(
  standards: readonly SpeciesStandard[],
  wavelengthNm: Float64Array,
  shiftNm: number,
): MolarAbsorptivity[] {
  const target = shiftNm === 0 ? wavelengthNm : wavelengthNm.map((nm) => nm - shiftNm);
  return standards.map((standard) => molarAbsorptivityAt(standard, target));
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

function firstNoise({ crude, settings }: UnmixInput): NoiseModel {
  return (
    settings.noise ??
    estimateNoise(crude.wavelengthNm, crude.values) ?? { constant: 1e-3, transmittance: 0 }
  );
}

function noiseModelOf(
  input: UnmixInput,
  at: Int32Array,
  solution: Solution,
): { noise: NoiseModel; known: boolean } {
  const { crude, settings, what } = input;
  if (settings.noise) return { noise: settings.noise, known: true };
  const { fit } = solution;
  if (fit.df >= fewestForTwoParts)
    return { noise: noiseOfSquares(input, at, solution), known: true };
  const nm = Float64Array.from(at, (i) => crude.wavelengthNm[i]!);
  const estimate = estimateNoise(nm, fit.residual, fit.fitted, roundingSd(crude.values));
  if (estimate) return { noise: estimate, known: true };
  if (fit.df < fewestForNoise) {
    throw new Refusal({
      code: 'noise-unknown',
      message: `There are as many unknowns as points (${at.length}), so the noise cannot be told from the spectrum and no interval can be given.`,
      where: { what },
      mend: 'Give the noise of the instrument in the fit section ("noise"), widen the window, or use more points.',
    });
  }
  const rms = Math.sqrt(fit.residual.reduce((sum, value) => sum + value * value, 0) / fit.df);
  return { noise: { constant: rms, transmittance: 0 }, known: false };
}

/**
 * Both parts of the noise from the squares of the residual (what a wavelength offset or a band
 * without a standard may have put there taken out, spikes cut) together with what the standards of
 * the sheet show between them; the standards' own part is taken off.
 */
function noiseOfSquares(input: UnmixInput, at: Int32Array, { fit, molarAbsorptivity }: Solution) {
  const { crude, pathLengthCm, noiseSamples } = input;
  const nm = Float64Array.from(at, (i) => crude.wavelengthNm[i]!);
  const slope = shiftSlope(molarAbsorptivity, at, pathLengthCm, fit.parameters);
  const { residual, directions } = cleanedResidual({ nm, fit, beside: [slope] });
  const ofStandards = standardsVariance(molarAbsorptivity, at, pathLengthCm, fit.parameters);
  const expected = {
    flat: new Float64Array(at.length).fill(1),
    rise: fit.fitted.map((absorbance) => 100 ** Math.min(absorbance, 6)),
  };
  const kept = 1 - directions / at.length;
  const own = levelsOfSquares(residual, expected, kept, ofStandards);
  const others = noiseSamples.flatMap(({ levels }) => levels);
  return twoParts([...own, ...others], roundingSd(crude.values));
}

function drawnParameters(
  fit: WeightedFit,
  measured: Float64Array,
  design: Design,
  size: number,
): Float64Array {
  const negative = fit.parameters.slice(0, size).some((amount) => amount < 0);
  if (!negative && fit.unseen.length === 0) return fit.parameters;
  const sd = fit.variance.map(Math.sqrt);
  const columns = fit.whitened.slice(0, size + design.baseline.length);
  return nonNegativeLeastSquares(
    columns,
    measured.map((value, i) => value / sd[i]!),
    columns.map((_, k) => k >= size),
  ).x;
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
