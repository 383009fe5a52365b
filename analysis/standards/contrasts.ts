import { levelOf, type NoiseCorrelation, type NoiseSample } from '../spectrum/correlated-noise.ts';
import { levelsOfSquares, type NoiseLevelAt, twoParts } from '../spectrum/estimate-noise.ts';
import { medianStep } from '../spectrum/interpolate.ts';
import type { NoiseModel } from '../spectrum/noise.ts';
import { type KnownNoise, levelToUse } from '../spectrum/noise-level.ts';
import { orthonormal, projectedOut } from '../spectrum/vectors.ts';
import type { Solution } from './solution.ts';

/** Noise seen where two measurements of one thing are held against each other. */
export interface SampledNoise {
  readonly stepNm: number;
  readonly sample: NoiseSample;
  /** Levels of the noise there, as the constant and the transmittance part would make them; [] if they cannot be told. */
  readonly levels: readonly NoiseLevelAt[];
}

const fewestPoints = 24;
const fewestDegrees = 24;
const fewestForTwoParts = 60;

/**
 * What is left between the solutions of one species once scale and offset are taken out: noise, and
 * nothing of the bands. Each solution after the first is held against the weighted mean of those
 * before it, so that the contrasts are independent. Only for solutions on one grid; else [].
 */
export function contrastsOf(solutions: readonly Solution[]): SampledNoise[] {
  // by name, so that the order in the sheet does not matter
  const [first, ...rest] = [...solutions].sort((a, b) => (a.standard < b.standard ? -1 : 1));
  if (!first) return [];
  const found: SampledNoise[] = [];
  let mean = asMean(first);
  for (const next of rest) {
    if (!sameGrid(first.wavelengthNm, next.wavelengthNm)) continue;
    const used = mean.usable.map((one, i) => (one === 1 && next.usable[i] === 1 ? 1 : 0));
    if (used.reduce((sum, one) => sum + one, 0) < fewestPoints) continue;
    const line = scaleAndOffset(mean.epsilon, next.epsilon, used);
    if (!(line.scale > 0)) continue;
    const scaled = asMean(next, line);
    found.push(contrastBetween(mean, scaled, used, medianStep(first.wavelengthNm)));
    mean = joined(mean, scaled, used);
  }
  return found;
}

/** ε on the scale of the first solution, with what noise of each kind makes of it. Variances per (L mol⁻¹ cm⁻¹)². */
interface Mean {
  readonly epsilon: Float64Array;
  readonly usable: Uint8Array;
  readonly variance: Float64Array;
  /** Variance per unit of constant², and of transmittance²; NaN where the absorbance is not known. */
  readonly flat: Float64Array;
  readonly rise: Float64Array;
}

function asMean(
  { epsilon, sd, usable, absorbancePerEpsilon }: Solution,
  { scale, offset } = { scale: 1, offset: 0 },
): Mean {
  const unit = absorbancePerEpsilon ?? Number.NaN;
  return {
    epsilon: epsilon.map((value) => (value - offset) / scale),
    usable,
    variance: sd.map((value) => (value / scale) ** 2),
    flat: epsilon.map(() => (unit * scale) ** -2),
    rise: epsilon.map((value) => 100 ** (value * unit) * (unit * scale) ** -2),
  };
}

function joined(a: Mean, b: Mean, usable: Uint8Array): Mean {
  const share = a.variance.map((value, i) => b.variance[i]! / (value + b.variance[i]!));
  const mixed = (x: Float64Array, y: Float64Array): Float64Array =>
    x.map((value, i) => share[i]! ** 2 * value + (1 - share[i]!) ** 2 * y[i]!);
  return {
    epsilon: a.epsilon.map((value, i) => share[i]! * value + (1 - share[i]!) * b.epsilon[i]!),
    usable,
    variance: mixed(a.variance, b.variance),
    flat: mixed(a.flat, b.flat),
    rise: mixed(a.rise, b.rise),
  };
}

function contrastBetween(a: Mean, b: Mean, used: Uint8Array, stepNm: number): SampledNoise {
  const sum = (x: Float64Array, y: Float64Array): Float64Array =>
    x.map((value, i) => value + y[i]!);
  const sd = sum(a.variance, b.variance).map(Math.sqrt);
  const whitened = (value: (i: number) => number): Float64Array =>
    Float64Array.from(used, (one, i) => (one === 1 ? value(i) / sd[i]! : 0));
  const basis = orthonormal([whitened(() => 1), whitened((i) => a.epsilon[i]!)]);
  const values = projectedOut(
    basis,
    whitened((i) => b.epsilon[i]! - a.epsilon[i]!),
  );
  const points = used.reduce((count, one) => count + one, 0);
  const expected = { flat: sum(a.flat, b.flat), rise: sum(a.rise, b.rise) };
  const residual = values.map((value, i) => (used[i] === 1 ? value * sd[i]! : Number.NaN));
  const known = !Number.isNaN(expected.flat[0] ?? Number.NaN);
  return {
    stepNm,
    sample: { values, used, basis },
    levels: known ? levelsOfSquares(residual, expected, 1 - basis.length / points) : [],
  };
}

function scaleAndOffset(
  x: Float64Array,
  y: Float64Array,
  used: Uint8Array,
): { scale: number; offset: number } {
  let [n, sx, sy, sxx, sxy] = [0, 0, 0, 0, 0];
  for (const [i, one] of used.entries()) {
    if (one === 0) continue;
    n++;
    sx += x[i]!;
    sy += y[i]!;
    sxx += x[i]! * x[i]!;
    sxy += x[i]! * y[i]!;
  }
  const scale = (n * sxy - sx * sy) / (n * sxx - sx * sx);
  return { scale, offset: (sy - scale * sx) / n };
}

function sameGrid(a: Float64Array, b: Float64Array): boolean {
  return a.length === b.length && a.every((nm, i) => Math.abs(nm - b[i]!) <= 1e-6 * nm);
}

/** The two parts of the instrument's noise as the contrasts show them; null where they are too few. */
export function noiseOfContrasts(contrasts: readonly SampledNoise[]): NoiseModel | null {
  const levels = contrasts.flatMap(({ levels: each }) => each);
  const points = levels.reduce((sum, level) => sum + level.points, 0);
  return points < fewestForTwoParts ? null : twoParts(levels, 0);
}

/**
 * Factor on the variance of the standards' noise that their contrasts call for; null where there are
 * too few of them to say.
 */
export function levelOfContrasts(
  contrasts: readonly SampledNoise[],
  { rho }: NoiseCorrelation,
  from: KnownNoise['from'],
): number | null {
  let [sum, freedom] = [0, 0];
  for (const { sample } of contrasts) {
    const { variance, df } = levelOf(sample, rho);
    sum += variance * df;
    freedom += df;
  }
  if (freedom < fewestDegrees) return null;
  return levelToUse(sum / freedom, freedom, from).level;
}

/** The same with the noise taken to be `level` times as large (in variance). */
export function withNoiseLevel(solution: Solution, level: number): Solution {
  const factor = Math.sqrt(level);
  return { ...solution, sd: solution.sd.map((sd) => sd * factor) };
}
