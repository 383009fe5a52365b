import { inverse, Matrix } from 'ml-matrix';
import { chiSquareQuantile } from '../distributions/chi-square.ts';
import { interpolated, interpolation } from '../spectrum/interpolate.ts';
import type { Solution } from './solution.ts';

/** An independent error of relative size 1 σ, and how far it moves the whole ε of the species. */
export interface ScaleSensitivity {
  readonly source: string;
  /** Relative change of ε per standard deviation of the source. */
  readonly relative: number;
}

/** All solutions of one species together. */
export interface SpeciesStandard {
  readonly species: string;
  readonly solutions: readonly Solution[];
  /** Factor that brings each solution onto the combined spectrum; 1 is perfect agreement. */
  readonly factors: readonly number[];
  readonly scaleErrors: readonly ScaleSensitivity[];
  /** Relative standard uncertainty of the scale of ε: the root of the sum of squares of the above. */
  readonly relativeScaleUncertainty: number;
  /** Agreement of the solutions beyond what their uncertainties allow; null for a single one. */
  readonly agreement: {
    readonly chiSquare: number;
    readonly df: number;
    readonly limit: number;
  } | null;
}

/** Smallest relative uncertainty of a factor between solutions: keeps exact copies apart from singular. */
const factorFloor = 1e-6;
/** The chance that solutions which do agree are called inconsistent. */
const falseAlarm = 0.01;

/**
 * Combines the solutions of one species by generalised least squares on the logarithm of their
 * scales: the covariance holds each solution's own error, the stocks they share and the noise of
 * the factor between them (errors of 1 % and less, so the logarithm is as good as linear).
 * Where they scatter more than that, the scatter is added to the uncertainty (Birge ratio).
 *
 * @param solutions one or more solutions of one species whose spectra overlap
 */
export function combineSolutions(solutions: readonly Solution[]): SpeciesStandard {
  const first = solutions[0];
  if (!first) throw new Error('a species without solutions cannot be combined');
  const logScales = solutions.map((solution) => logScale(solution, widest(solutions)));
  const covariance = scaleCovariance(
    solutions,
    logScales.map(({ variance }) => variance),
  );
  const weights = gaussMarkovWeights(covariance);
  const mean = logScales.reduce((sum, { value }, s) => sum + weights[s]! * value, 0);
  const agreement = agreementOf(
    logScales.map(({ value }) => value - mean),
    covariance,
  );
  const scaleErrors = sensitivities(solutions, weights);
  const excess = agreement ? agreement.chiSquare / agreement.df - 1 : 0;
  if (agreement && agreement.chiSquare > agreement.limit) {
    scaleErrors.push({
      source: `scatter between standards of ${first.species}`,
      relative: Math.sqrt(excess * meanVariance(weights, covariance)),
    });
  }
  return {
    species: first.species,
    solutions,
    factors: logScales.map(({ value }) => Math.exp(mean - value)),
    scaleErrors,
    relativeScaleUncertainty: Math.hypot(...scaleErrors.map(({ relative }) => relative)),
    agreement,
  };
}

/** The one with the widest range; of equals the first by name, so that the order in the sheet does not matter. */
function widest(solutions: readonly Solution[]): Solution {
  const reach = ({ wavelengthNm }: Solution): number =>
    (wavelengthNm.at(-1) ?? 0) - (wavelengthNm[0] ?? 0);
  return solutions.reduce((best, next) => {
    const wider = reach(next) - reach(best);
    return wider > 0 || (wider === 0 && next.standard < best.standard) ? next : best;
  });
}

/** Weighted least-squares slope of one solution's ε on the reference's, as a logarithm with its variance. */
function logScale(solution: Solution, reference: Solution): { value: number; variance: number } {
  if (solution === reference) return { value: 0, variance: 0 };
  const map = interpolation(solution.wavelengthNm, solution.usable, reference.wavelengthNm);
  const epsilon = interpolated(map, solution.epsilon);
  const sd = interpolated(map, solution.sd);
  let xx = 0;
  let xy = 0;
  for (let i = 0; i < map.points; i++) {
    if (map.covered[i] === 0 || reference.usable[i] === 0) continue;
    const weight = 1 / (sd[i]! ** 2 + reference.sd[i]! ** 2);
    xx += weight * reference.epsilon[i]! ** 2;
    xy += weight * reference.epsilon[i]! * epsilon[i]!;
  }
  const slope = xy / xx;
  return slope > 0
    ? { value: Math.log(slope), variance: 1 / (xx * slope * slope) }
    : { value: 0, variance: 0 };
}

function scaleCovariance(solutions: readonly Solution[], noise: readonly number[]): Matrix {
  const covariance = Matrix.zeros(solutions.length, solutions.length);
  for (const [s, a] of solutions.entries()) {
    for (const [t, b] of solutions.entries()) {
      let shared = s === t ? noise[s]! + factorFloor ** 2 : 0;
      for (const error of a.scaleErrors) {
        const common = b.scaleErrors.some(({ source }) => source === error.source);
        if (common) shared += error.relative ** 2;
      }
      covariance.set(s, t, shared);
    }
  }
  return covariance;
}

/** P⁻¹1 / (1ᵀP⁻¹1): weights of the best linear unbiased mean. */
function gaussMarkovWeights(covariance: Matrix): number[] {
  const rows = inverse(covariance)
    .to2DArray()
    .map((row) => row.reduce((sum, entry) => sum + entry, 0));
  const total = rows.reduce((sum, entry) => sum + entry, 0);
  return rows.map((entry) => entry / total);
}

function meanVariance(weights: readonly number[], covariance: Matrix): number {
  let sum = 0;
  for (const [s, a] of weights.entries()) {
    for (const [t, b] of weights.entries()) sum += a * b * covariance.get(s, t);
  }
  return sum;
}

function agreementOf(
  departures: readonly number[],
  covariance: Matrix,
): SpeciesStandard['agreement'] {
  const df = departures.length - 1;
  if (df < 1) return null;
  const weight = inverse(covariance);
  let chiSquare = 0;
  for (const [s, a] of departures.entries()) {
    for (const [t, b] of departures.entries()) chiSquare += a * b * weight.get(s, t);
  }
  return { chiSquare, df, limit: chiSquareQuantile(1 - falseAlarm, df) };
}

function sensitivities(
  solutions: readonly Solution[],
  weights: readonly number[],
): ScaleSensitivity[] {
  const sum = new Map<string, number>();
  for (const [s, { scaleErrors }] of solutions.entries()) {
    for (const { source, relative } of scaleErrors) {
      sum.set(source, (sum.get(source) ?? 0) + weights[s]! * relative);
    }
  }
  return [...sum]
    .filter(([, relative]) => relative !== 0)
    .map(([source, relative]) => ({ source, relative }));
}
