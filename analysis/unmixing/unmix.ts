import { chiSquareQuantile } from '../distributions/chi-square.ts';
import { Refusal } from '../refusal.ts';
import type { FitSettings } from '../sheet/defaults.ts';
import { estimateNoise, roundingSd } from '../spectrum/estimate-noise.ts';
import type { NoiseModel } from '../spectrum/noise.ts';
import type { Spectrum } from '../spectrum/spectrum.ts';
import { type MolarAbsorptivity, molarAbsorptivityAt } from '../standards/molar-absorptivity.ts';
import type { SpeciesStandard } from '../standards/species-standard.ts';
import { choosePoints, pointUse, usedPoints } from './choose-points.ts';
import { type BaselineName, type Design, designOf } from './design.ts';
import { nonNegativeLeastSquares } from './non-negative.ts';
import { fitShift, largestShiftNm } from './shift.ts';
import { shiftSlope, standardsVariance } from './standards-on-points.ts';
import { type WeightedFit, weightedFit } from './weighted-fit.ts';

export interface UnmixInput {
  readonly crude: Spectrum;
  readonly standards: readonly SpeciesStandard[];
  readonly pathLengthCm: number;
  readonly settings: FitSettings;
  /** For the message of a refusal: "aliquot a1". */
  readonly what: string;
}

/** One crude spectrum taken apart. Species are in the order of `input.standards`. */
export interface Unmixing {
  readonly species: readonly string[];
  readonly pathLengthCm: number;
  /** Why each point of the crude is used or not (`pointUse`). */
  readonly use: Uint8Array;
  /** Positions of the fitted points. */
  readonly at: Int32Array;
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
  readonly noise: NoiseModel;
  readonly noiseFrom: 'sheet' | 'spectrum';
  /** Factor on the point variance for lack of fit (and for the scale of an estimated noise). */
  readonly excess: number;
  /** Degrees of freedom behind `excess`; Infinity where the noise is given and nothing lacks. */
  readonly df: number;
  /** Null where the noise is known from this residual only. */
  readonly reducedChiSquare: number | null;
  readonly fit: WeightedFit;
}

/** Smallest number of degrees of freedom from which a noise of its own is taken. */
const fewestForNoise = 1;
const lackOfFitFalseAlarm = 0.01;

/**
 * Weighted least squares of one crude spectrum on the standards and the baseline, on the crude's
 * own points. Throws a `Refusal` where too few points are left or the ranges do not meet.
 */
export function unmix(input: UnmixInput): Unmixing {
  const { crude, standards, settings, pathLengthCm } = input;
  const onCrude = standardsAt(standards, crude.wavelengthNm, 0);
  const use = usableAtEveryShift(input, choosePoints(crude, onCrude, settings));
  const at = usedPoints(use);
  refuseTooFew(input, use, at);
  const measured = Float64Array.from(at, (i) => crude.values[i]!);
  const first = solveWith(input, at, measured, firstNoise(input));
  const { noise, noiseFrom, known } = noiseOf(input, at, first.fit);
  const { fit, shiftNm, molarAbsorptivity, design } = solveWith(input, at, measured, noise);
  const { excess, df } = lackOfFit(fit, noiseFrom);
  const size = standards.length;
  const drawn = drawnParameters(fit, measured, design, size);
  return {
    species: standards.map(({ species }) => species),
    pathLengthCm,
    use,
    at,
    molarAbsorptivity,
    amounts: fit.parameters.slice(0, size),
    drawn: drawn.slice(0, size),
    baseline: design.baseline.map(({ term }, j) => ({
      term,
      value: fit.parameters[size + j]!,
      sd: Math.sqrt(excess * pointVariance(fit, size + j)),
      drawn: drawn[size + j]!,
    })),
    shiftNm: {
      value: shiftNm,
      sd:
        settings.shift === 'common'
          ? Math.sqrt(excess * pointVariance(fit, fit.parameters.length - 1))
          : 0,
    },
    noise,
    noiseFrom,
    excess,
    df,
    reducedChiSquare: known ? fit.reducedChiSquare : null,
    fit,
  };
}

interface Solution {
  readonly fit: WeightedFit;
  readonly shiftNm: number;
  readonly molarAbsorptivity: readonly MolarAbsorptivity[];
  readonly design: Design;
}

function solveWith(
  { crude, standards, settings, pathLengthCm }: UnmixInput,
  at: Int32Array,
  measured: Float64Array,
  noise: NoiseModel,
): Solution {
  const modelAt = (shiftNm: number) => {
    const moved = standardsAt(standards, crude.wavelengthNm, shiftNm);
    return {
      moved,
      design: designOf(moved, crude.wavelengthNm, at, pathLengthCm, settings.baseline),
    };
  };
  const columnsOf = ({ species, baseline }: Design) => [
    ...species,
    ...baseline.map(({ column }) => column),
  ];
  const fitWith = (moved: readonly MolarAbsorptivity[], columns: readonly Float64Array[]) =>
    weightedFit(columns, measured, noise, (parameters) =>
      standardsVariance(moved, at, pathLengthCm, parameters),
    );
  if (settings.shift === 'none') {
    const { moved, design } = modelAt(0);
    return { fit: fitWith(moved, columnsOf(design)), shiftNm: 0, molarAbsorptivity: moved, design };
  }
  const unmoved = modelAt(0).moved;
  const { shiftNm, fit } = fitShift(measured, {
    columnsAt: (shift) => columnsOf(modelAt(shift).design),
    slopeAt: (shift, parameters) => shiftSlope(modelAt(shift).moved, at, pathLengthCm, parameters),
    fit: (columns) => fitWith(unmoved, columns),
  });
  const { moved, design } = modelAt(shiftNm);
  return { fit, shiftNm, molarAbsorptivity: moved, design };
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
  { crude, standards, settings }: UnmixInput,
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

function noiseOf(
  { crude, settings, what }: UnmixInput,
  at: Int32Array,
  fit: WeightedFit,
): { noise: NoiseModel; noiseFrom: 'sheet' | 'spectrum'; known: boolean } {
  if (settings.noise) return { noise: settings.noise, noiseFrom: 'sheet', known: true };
  const nm = Float64Array.from(at, (i) => crude.wavelengthNm[i]!);
  const estimate = estimateNoise(nm, fit.residual, fit.fitted, roundingSd(crude.values));
  if (estimate) return { noise: estimate, noiseFrom: 'spectrum', known: true };
  if (fit.df < fewestForNoise) {
    throw new Refusal({
      code: 'noise-unknown',
      message: `There are as many unknowns as points (${at.length}), so the noise cannot be told from the spectrum and no interval can be given.`,
      where: { what },
      mend: 'Give the noise of the instrument in the fit section ("noise"), widen the window, or use more points.',
    });
  }
  const rms = Math.sqrt(fit.residual.reduce((sum, value) => sum + value * value, 0) / fit.df);
  return { noise: { constant: rms, transmittance: 0 }, noiseFrom: 'spectrum', known: false };
}

function lackOfFit(
  { reducedChiSquare, df }: WeightedFit,
  noiseFrom: 'sheet' | 'spectrum',
): { excess: number; df: number } {
  if (df < 1) return { excess: 1, df: Number.POSITIVE_INFINITY };
  if (noiseFrom === 'spectrum') return { excess: reducedChiSquare, df };
  const limit = chiSquareQuantile(1 - lackOfFitFalseAlarm, df) / df;
  return reducedChiSquare > limit
    ? { excess: reducedChiSquare, df }
    : { excess: 1, df: Number.POSITIVE_INFINITY };
}

/** Variance of one parameter from the points: Σ gain² σ². */
function pointVariance({ gain, variance }: WeightedFit, parameter: number): number {
  const row = gain[parameter];
  if (!row) return 0;
  let sum = 0;
  for (const [i, value] of row.entries()) sum += value * value * variance[i]!;
  return sum;
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
  { standards, settings, what, crude }: UnmixInput,
  use: Uint8Array,
  at: Int32Array,
): void {
  const baseline = { none: 0, offset: 1, line: 2, scatter: 2 }[settings.baseline];
  const unknowns = standards.length + baseline + (settings.shift === 'common' ? 1 : 0);
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
