import { fQuantile, fUpper } from '../distributions/f.ts';
import {
  correlate,
  independent,
  levelOf,
  type NoiseCorrelation,
  type NoiseSample,
  noiseCorrelation,
} from '../spectrum/correlated-noise.ts';
import { dot, orthonormal, projectedOut } from '../spectrum/vectors.ts';
import { absorbanceScale, type Overlaid, overlaid } from './overlaid.ts';
import type { Solution } from './solution.ts';

/** Whether the absorbance of the solutions of one species grows with concentration at every wavelength. */
export interface Linearity {
  /** Null where it cannot be tested: one solution, or none that differ in concentration. */
  readonly curvature: Curvature | null;
  /** True where the curvature is more than noise (F-test, `linearityFalseAlarm`) and large enough to matter. */
  readonly isBent: boolean;
  /** Absorbance up to which no curvature is seen; null where none is seen at all, 0 where it is everywhere. */
  readonly straightUpTo: number | null;
  /** Largest absorbance that went into the test; 0 where there was none. */
  readonly largestAbsorbance: number;
}

export interface Curvature {
  /** q of "shown = true + q · true²", per absorbance; negative where the strong read too low. */
  readonly perAbsorbance: number;
  readonly standardUncertainty: number;
  /** Departure from a straight line at the largest absorbance, relative to it. */
  readonly relativeDeparture: number;
  readonly f: number;
  readonly limit: number;
  /** Chance of as large an F without a bend. */
  readonly pValue: number;
}

/**
 * The chance that solutions which do follow Beer-Lambert are called bent. There are two such tests of
 * each species (scales, bend): for a sheet of three species 1 % in all.
 */
export const linearityFalseAlarm = 0.01 / 6;
const worthALook = 0.05;
/** A departure smaller than this at the largest absorbance is not worth a word. */
const smallestDeparture = 1e-3;
const fewestPoints = 12;
/** Solutions nearer than this in strength say nothing of a bend. */
const smallestContrast = 0.05;
const noCurvature: Linearity = {
  curvature: null,
  isBent: false,
  straightUpTo: null,
  largestAbsorbance: 0,
};

/**
 * Absorbance against concentration, at all wavelengths together. Were every reading A instead
 * A + q A² (saturation and stray light: q < 0), a solution m times as strong as another would show
 * m A + offset + q m (m - 1) A² where that one shows A. Scale and offset of each solution are left
 * free, so an error in a concentration is no curvature; the one q of all is tested by F against the noise
 * that the residual itself shows, its correlation along the spectrum included.
 *
 * @param solutions of one species, with any offsets of their own
 */
export function linearityOf(solutions: readonly Solution[]): Linearity {
  const before = known.get(solutions);
  if (before) return before;
  const linearity = tested(solutions);
  known.set(solutions, linearity);
  return linearity;
}

/** Asked for every aliquot, the same for all of them. */
const known = new WeakMap<readonly Solution[], Linearity>();

function tested(solutions: readonly Solution[]): Linearity {
  const measured = solutions.filter(({ largestAbsorbance }) => largestAbsorbance !== null);
  const [first] = measured;
  if (!first || measured.length < 2) return noCurvature;
  const strongest = measured.reduce((best, next) => (isStronger(next, best) ? next : best));
  const others = measured.filter((solution) => solution !== strongest);
  const ceiling = strongest.largestAbsorbance ?? 0;
  const pairs = others.map((solution) => ({ solution, points: overlaid(strongest, solution) }));
  const testBelow = (most: number, correlation?: NoiseCorrelation): Test | null =>
    curvatureOf(
      strongest,
      pairs.flatMap(({ solution, points }) => contrast(strongest, solution, points, most) ?? []),
      correlation,
    );
  const test = testBelow(Number.POSITIVE_INFINITY);
  if (!test) return noCurvature;
  const { curvature, correlation } = test;
  const isBent =
    curvature.f > curvature.limit && Math.abs(curvature.relativeDeparture) >= smallestDeparture;
  return {
    curvature,
    isBent,
    straightUpTo: isBent
      ? straightUpTo(ceiling, (most) => testBelow(most, correlation)?.curvature ?? null)
      : null,
    largestAbsorbance: ceiling,
  };
}

function isStronger(a: Solution, b: Solution): boolean {
  const more = (a.largestAbsorbance ?? 0) - (b.largestAbsorbance ?? 0);
  return more > 0 || (more === 0 && a.standard < b.standard);
}

const levels = [0.9, 0.8, 0.7, 0.6, 0.5, 0.4, 0.3, 0.2];

/** The highest absorbance below which the points show no curvature any more. */
function straightUpTo(ceiling: number, testBelow: (most: number) => Curvature | null): number {
  for (const level of levels) {
    const test = testBelow(level * ceiling);
    if (!test) return 0;
    if (test.f <= test.limit) return level * ceiling;
  }
  return 0;
}

/** One solution against the strongest, whitened, on the whole grid of the strongest (0 where not used). */
interface Contrast {
  readonly used: Uint8Array;
  readonly basis: readonly Float64Array[];
  /** y less what a straight line explains. */
  readonly y: Float64Array;
  /** The effect of q = 1, less what a straight line explains. */
  readonly bend: Float64Array;
  /** How the strongest one's own noise enters `y`, per standard deviation of it. */
  readonly ofStrongest: Float64Array;
  readonly ofSolution: Float64Array;
}

function contrast(
  strongest: Solution,
  solution: Solution,
  points: Overlaid,
  most: number,
): Contrast | null {
  const perEpsilon = absorbanceScale(strongest);
  const size = strongest.wavelengthNm.length;
  const kept = Array.from(points.at.keys()).filter((j) => perEpsilon * points.x[j]! <= most);
  if (kept.length < fewestPoints) return null;
  const slope = slopeOf(points, kept);
  const m = (slope * absorbanceScale(solution)) / perEpsilon;
  if (!(m > 0 && Math.abs(m - 1) >= smallestContrast)) return null;
  const used = new Uint8Array(size);
  const sd = points.sdY.map((value, j) => Math.hypot(value, slope * points.sdX[j]!));
  for (const j of kept) used[points.at[j]!] = 1;
  const spread = (value: (j: number) => number): Float64Array => {
    const onGrid = new Float64Array(size);
    for (const j of kept) onGrid[points.at[j]!] = value(j) / sd[j]!;
    return onGrid;
  };
  const y = spread((j) => points.y[j]!);
  const bend = spread((j) => slope * (m - 1) * perEpsilon * points.x[j]! ** 2);
  const basis = orthonormal([spread(() => 1), spread((j) => points.x[j]!)]);
  return {
    used,
    basis,
    y: projectedOut(basis, y),
    bend: projectedOut(basis, bend),
    ofStrongest: spread((j) => -slope * points.sdX[j]!),
    ofSolution: spread((j) => points.sdY[j]!),
  };
}

function slopeOf({ x, y }: Overlaid, kept: readonly number[]): number {
  let [sumX, sumY] = [0, 0];
  for (const j of kept) {
    sumX += x[j]!;
    sumY += y[j]!;
  }
  const [meanX, meanY] = [sumX / kept.length, sumY / kept.length];
  let [xx, xy] = [0, 0];
  for (const j of kept) {
    xx += (x[j]! - meanX) ** 2;
    xy += (x[j]! - meanX) * (y[j]! - meanY);
  }
  return xy / xx;
}

interface Test {
  readonly curvature: Curvature;
  readonly correlation: NoiseCorrelation;
}

/** @param correlation of the noise; looked for where it decides unless given */
function curvatureOf(
  strongest: Solution,
  contrasts: readonly Contrast[],
  correlation: NoiseCorrelation = independent,
): Test | null {
  const information = contrasts.reduce((sum, { bend }) => sum + dot(bend, bend), 0);
  if (!(information > 0)) return null;
  const score = contrasts.reduce((sum, { bend, y }) => sum + dot(bend, y), 0);
  const q = score / information;
  const samples = contrasts.map((each) => sampleOf(each, q));
  let used = correlation;
  let found = judged(contrasts, samples, used);
  // noise that leans on its neighbours only ever makes a curvature less sure: looked for where there may be one
  if (used === independent && fUpper(score ** 2 / found.variance, 1, found.df) < worthALook) {
    used = noiseCorrelation(samples);
    found = judged(contrasts, samples, used);
  }
  return {
    correlation: used,
    curvature: {
      perAbsorbance: q,
      standardUncertainty: Math.sqrt(found.variance) / information,
      relativeDeparture: q * (strongest.largestAbsorbance ?? 0),
      f: score ** 2 / found.variance,
      limit: found.limit,
      pValue: fUpper(score ** 2 / found.variance, 1, found.df),
    },
  };
}

function sampleOf({ used, basis, y, bend }: Contrast, q: number): NoiseSample {
  return {
    used,
    values: y.map((value, i) => value - q * bend[i]!),
    basis: [...basis, ...orthonormal([bend])],
  };
}

/** Variance of the score, from the noise of every solution; that of the strongest is in all contrasts. */
function judged(
  contrasts: readonly Contrast[],
  samples: readonly NoiseSample[],
  { rho, df: correlationDf }: NoiseCorrelation,
): { variance: number; limit: number; df: number } {
  let [squares, freedom] = [0, 0];
  for (const sample of samples) {
    const { variance, df } = levelOf(sample, rho);
    squares += variance * df;
    freedom += df;
  }
  const level = squares / freedom;
  const shared = new Float64Array(contrasts[0]?.bend.length ?? 0);
  let variance = 0;
  for (const { bend, ofStrongest, ofSolution } of contrasts) {
    const own = bend.map((value, i) => value * ofSolution[i]!);
    variance += dot(own, correlate(rho, own));
    for (let i = 0; i < shared.length; i++) shared[i]! += bend[i]! * ofStrongest[i]!;
  }
  variance += dot(shared, correlate(rho, shared));
  // contrasts that share the strongest do not tell the noise independently
  const df = Math.max(Math.min(freedom / contrasts.length, correlationDf), 1);
  return {
    variance: level * variance,
    limit: fQuantile(1 - linearityFalseAlarm, 1, df),
    df,
  };
}
