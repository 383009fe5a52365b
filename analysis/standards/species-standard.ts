import { inverse, Matrix } from 'ml-matrix';
import { type Agreement, agreementOf } from './agreement.ts';
import { type Offsets, offsetsOf } from './offsets.ts';
import { absorbanceScale, overlaid } from './overlaid.ts';
import type { Solution } from './solution.ts';
import { type StraightLine, straightLine } from './straight-line.ts';

/** An independent error of relative size 1 σ, and how far it moves the whole ε of the species. */
export interface ScaleSensitivity {
  readonly source: string;
  /** Relative change of ε per standard deviation of the source. */
  readonly relative: number;
}

/** All solutions of one species together. */
export interface SpeciesStandard {
  readonly species: string;
  /** As measured, but each with the offset of its own taken out of `epsilon`. */
  readonly solutions: readonly Solution[];
  /** What was taken out, in absorbance as that solution was recorded; 0 for a single solution. */
  readonly offsets: readonly number[];
  /**
   * Standard uncertainty of a constant in the whole ε, L mol⁻¹ cm⁻¹, as far as the solutions show it
   * (0 for a single one). A fitted baseline takes it up; with baseline "none" it moves the amounts.
   */
  readonly constantUncertainty: number;
  /** Factor that brings each solution onto the combined spectrum; 1 is perfect agreement. */
  readonly factors: readonly number[];
  readonly scaleErrors: readonly ScaleSensitivity[];
  /** Relative standard uncertainty of the scale of ε: the root of the sum of squares of the above. */
  readonly relativeScaleUncertainty: number;
  /** Agreement of the scales beyond what their uncertainties allow; null for a single solution. */
  readonly agreement: Agreement | null;
}

interface CombineOptions {
  /** How much more variance a smooth sum over points has than if their noise were independent (Σ of its autocorrelation). */
  readonly noiseInflation?: number;
}

/** Smallest relative uncertainty of a scale: keeps exact copies apart from singular. */
const factorFloor = 1e-6;
/** A scale is not believed to be known better than this beforehand: solutions are made by hand. */
const smallestPrior = 0.02;
/**
 * Combines the solutions of one species. Each is held against the one of widest range by a straight
 * line, slope and constant, noise in both. The constants are the offsets of the solutions' own
 * baselines and are taken out (`offsetsOf`): left in, they bend the slopes, and where the solutions
 * reach differently far they become steps in ε. The slopes are the scales: they are combined by generalised least squares on
 * their logarithms; the covariance holds each solution's own error, the stocks they share and noise
 * (errors of 1 % and less, so the logarithm is as good as linear). Where the scales scatter more
 * than that, the scatter is added to the uncertainty (Birge ratio).
 *
 * The constant is free from two solutions on: measured on two, it costs less than 1 % in precision. A
 * single solution is taken as it is, its offset unseen.
 *
 * @param recorded one or more solutions of one species whose spectra overlap
 */
export function combineSolutions(
  recorded: readonly Solution[],
  { noiseInflation = 1 }: CombineOptions = {},
): SpeciesStandard {
  const [first] = recorded;
  if (!first) throw new Error('a species without solutions cannot be combined');
  const reference = widest(recorded);
  const lines = recorded.map((solution) => lineAgainst(reference, solution, noiseInflation));
  const offsets = offsetsAgainst(recorded, lines);
  const solutions = recorded.map((solution, s) => withoutOffset(solution, offsets.epsilon[s]!));
  const logScales = lines.map(({ slope }) => Math.log(slope));
  const noise = scaleNoises(recorded, reference, lines).map((value) => noiseInflation * value);
  const covariance = scaleCovariance(recorded, noise);
  const weights = gaussMarkovWeights(covariance);
  const mean = logScales.reduce((sum, value, s) => sum + weights[s]! * value, 0);
  const agreement = agreementOf(recorded, logScales, covariance);
  const scaleErrors = sensitivities(recorded, weights);
  scaleErrors.push(...noiseOfScales(first.species, weights, noise));
  if (agreement && agreement.chiSquare > agreement.limit) {
    const excess = agreement.chiSquare / agreement.df - 1;
    scaleErrors.push({
      source: `scatter between standards of ${first.species}`,
      relative: Math.sqrt(excess * meanVariance(weights, covariance)),
    });
  }
  const factors = logScales.map((value) => Math.exp(mean - value));
  return {
    species: first.species,
    solutions,
    offsets: recorded.map((solution, s) => absorbanceScale(solution) * offsets.epsilon[s]!),
    constantUncertainty: offsets.uncertainty * (factors[recorded.indexOf(reference)] ?? 1),
    factors,
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

const same: StraightLine = { slope: 1, intercept: 0, slopeVariance: 0, interceptVariance: 0 };

/**
 * One solution's ε on the reference's. Where they overlap in a stretch that hardly says how steep it
 * is (the tails of bands), the slope is drawn to 1 by what is known beforehand of the scales.
 */
function lineAgainst(
  reference: Solution,
  solution: Solution,
  noiseInflation: number,
): StraightLine {
  if (solution === reference) return same;
  const points = overlaid(reference, solution);
  const free = straightLine(points);
  if (!free) return same;
  const variance = (noiseInflation * free.slopeVariance) / free.slope ** 2;
  const before =
    priorVariance([...reference.scaleErrors, ...solution.scaleErrors]) + smallestPrior ** 2;
  const drawn = Math.exp((Math.log(free.slope) * before) / (before + variance));
  return straightLine(points, drawn) ?? free;
}

function priorVariance(errors: Solution['scaleErrors']): number {
  return errors.reduce((sum, { relative }) => sum + relative * relative, 0);
}

function offsetsAgainst(recorded: readonly Solution[], lines: readonly StraightLine[]): Offsets {
  return offsetsOf(
    recorded.map((solution, s) => ({
      slope: lines[s]!.slope,
      intercept: lines[s]!.intercept,
      interceptVariance: lines[s]!.interceptVariance,
      absorbancePerEpsilon: absorbanceScale(solution),
    })),
  );
}

function withoutOffset(solution: Solution, offset: number): Solution {
  if (offset === 0) return solution;
  return { ...solution, epsilon: solution.epsilon.map((value) => value - offset) };
}

/**
 * Relative variance of each scale by noise. Where a solution overlaps the reference in a part only,
 * that part sets how well the two are compared.
 */
function scaleNoises(
  recorded: readonly Solution[],
  reference: Solution,
  lines: readonly StraightLine[],
): number[] {
  const ofReference = scaleNoise(reference);
  return recorded.map((solution, s) => {
    const { slope, slopeVariance } = lines[s]!;
    return Math.max(scaleNoise(solution), slopeVariance / slope ** 2 - ofReference);
  });
}

/** Relative variance of the scale that the solution's own point noise gives, with a free constant. */
function scaleNoise({ epsilon, sd, usable }: Solution): number {
  let [total, sum, squares] = [0, 0, 0];
  for (const [i, one] of usable.entries()) {
    if (one === 0) continue;
    const weight = 1 / sd[i]! ** 2;
    total += weight;
    sum += weight * epsilon[i]!;
    squares += weight * epsilon[i]! ** 2;
  }
  const information = squares - (sum * sum) / total;
  return information > 0 ? Math.min(1 / information, 1) : 1;
}

/**
 * The mean takes the scales by their weights, the joined spectrum its points by their noise: what the
 * noise adds to the scale because the two differ (where they agree, the point noise says it all).
 */
function noiseOfScales(
  species: string,
  weights: readonly number[],
  noise: readonly number[],
): ScaleSensitivity[] {
  const total = noise.reduce((sum, variance) => sum + 1 / variance, 0);
  const relative = Math.hypot(
    ...weights.map((weight, s) => (weight - 1 / noise[s]! / total) * Math.sqrt(noise[s]!)),
  );
  return relative > factorFloor
    ? [{ source: `factors between standards of ${species}`, relative }]
    : [];
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
