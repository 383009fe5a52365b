import { xMedian } from 'ml-spectra-processing';
import { type NoiseModel, noiseFloor } from './noise.ts';

/** Neighbours on each side from which a point is predicted; more see through sharper bands. */
const reaches = [1, 2, 3, 4] as const;
const smallestSample = 12;
const mostBins = 6;
/** Scale of a normal sample from its median absolute value: 1 / Φ⁻¹(3/4). */
const medianToSd = 1.482602218505602;

/**
 * Noise of one spectrum from itself: each point against its prediction from its neighbours
 * (Lagrange on 2, 4, 6 or 8 of them: the normalised differences of even order, on any grid).
 * A band leaves less in the higher orders, noise the same; the lowest order at which the scale has
 * settled is used. The scale is a median, so that spikes do not count, taken in bins of
 * absorbance to part the constant noise from that of transmittance.
 *
 * Null where there are too few points to tell. Noise that is correlated from point to point
 * (smoothing, oversampling) shows too little in differences: the proportions of the two parts are
 * right, their level is set by who knows a residual (`levelOf` in correlated-noise.ts).
 *
 * @param values absorbance, or the residual of a fit; NaN where missing; same length as `wavelengthNm`
 * @param level absorbance at which each point was read; the values themselves unless given
 * @param rounding standard deviation of rounding to the printed digits, below which no noise is believed
 * @param known variance at each point that is not this spectrum's noise (the standards' part of a residual)
 */
export function estimateNoise(
  wavelengthNm: Float64Array,
  values: Float64Array,
  level: Float64Array = values,
  rounding: number = roundingSd(values),
  known?: Float64Array,
): NoiseModel | null {
  const floor = Math.max(noiseFloor, rounding);
  let settled: Prediction | null = null;
  for (const reach of reaches) {
    const next = predictionErrors({ wavelengthNm, values, level, known }, reach, floor);
    if (next.errors.length < smallestSample) break;
    if (settled && next.scale > 0.9 * settled.scale) break;
    settled = next;
  }
  return settled && twoParts(levelsInBins(settled, floor), floor);
}

interface Prediction {
  /** Error of each predicted point, scaled to the standard deviation of one point. */
  readonly errors: Float64Array;
  /** Absorbance of the same points. */
  readonly at: Float64Array;
  /** Known variance at the same points. */
  readonly known: Float64Array;
  readonly scale: number;
}

interface Readings {
  readonly wavelengthNm: Float64Array;
  readonly values: Float64Array;
  readonly level: Float64Array;
  readonly known: Float64Array | undefined;
}

/**
 * Standard deviation of rounding to the printed digits: the smallest step between two values over
 * √12. Where an instrument prints three decimals, a flat stretch shows no other noise.
 */
export function roundingSd(values: Float64Array): number {
  const known = knownRounding.get(values);
  if (known !== undefined) return known;
  const found = smallestStep(values) / Math.sqrt(12);
  knownRounding.set(values, found);
  return found;
}

/** One spectrum is asked for its rounding several times on its way. */
const knownRounding = new WeakMap<Float64Array, number>();

/** 0 where no two values differ. */
function smallestStep(values: Float64Array): number {
  const sorted = values.slice().sort();
  let step = Number.POSITIVE_INFINITY;
  for (let i = 1; i < sorted.length; i++) {
    const gap = sorted[i]! - sorted[i - 1]!;
    // differences of decimals in doubles: what is this small is rounding of the same number; NaN (sorted last) is none
    if (gap > 1e-9 && gap < step) step = gap;
  }
  return Number.isFinite(step) ? step : 0;
}

function predictionErrors(
  { wavelengthNm, values, level, known }: Readings,
  reach: number,
  floor: number,
): Prediction {
  const errors: number[] = [];
  const at: number[] = [];
  const knownThere: number[] = [];
  for (let i = reach; i < wavelengthNm.length - reach; i++) {
    const error = predictionError(wavelengthNm, values, i, reach);
    if (Number.isNaN(error)) continue;
    errors.push(error);
    at.push(level[i]!);
    knownThere.push(known?.[i] ?? 0);
  }
  const sizes = Float64Array.from(errors, Math.abs);
  return {
    errors: Float64Array.from(errors),
    at: Float64Array.from(at),
    known: Float64Array.from(knownThere),
    scale: sizes.length > 0 ? Math.max(medianToSd * xMedian(sizes), floor) : floor,
  };
}

function predictionError(x: Float64Array, y: Float64Array, i: number, reach: number): number {
  let predicted = 0;
  let sumOfSquares = 1;
  for (let j = i - reach; j <= i + reach; j++) {
    if (j === i) continue;
    let weight = 1;
    for (let m = i - reach; m <= i + reach; m++) {
      if (m !== j && m !== i) weight *= (x[i]! - x[m]!) / (x[j]! - x[m]!);
    }
    predicted += weight * y[j]!;
    sumOfSquares += weight * weight;
  }
  return (y[i]! - predicted) / Math.sqrt(sumOfSquares);
}

/** Variance found in one stretch: what is expected there is constant²·flat + transmittance²·rise. */
export interface NoiseLevelAt {
  readonly variance: number;
  /** 1 for one reading. */
  readonly flat: number;
  /** Mean of 10^2A for one reading. */
  readonly rise: number;
  readonly points: number;
}

/** Medians of the prediction errors in bins of absorbance, what is known to be another's taken off. */
function levelsInBins({ errors, at, known }: Prediction, floor: number): NoiseLevelAt[] {
  return binsByRank(at, Math.min(mostBins, Math.floor(at.length / smallestSample))).map(
    (members) => {
      const sd = medianToSd * xMedian(Float64Array.from(members, (i) => Math.abs(errors[i]!)));
      const rise = xMedian(Float64Array.from(members, (i) => 100 ** at[i]!));
      const total = Math.max(sd, floor) ** 2;
      const elsewhere = members.reduce((sum, i) => sum + known[i]!, 0) / members.length;
      // what is not noise of this spectrum may be mistaken too: a tenth of it all is left to noise
      const variance = Math.max(total - elsewhere, 0.1 * total);
      return { variance, flat: 1, rise, points: members.length };
    },
  );
}

/** Places of the values in bins of equal count from the lowest up; of equal values the first come first. */
function binsByRank(values: Float64Array, bins: number): number[][] {
  const sorted = values.slice().sort();
  const seen = new Map<number, number>();
  const members = Array.from({ length: bins }, (): number[] => []);
  const ends = members.map((_, bin) => Math.floor(((bin + 1) * values.length) / bins));
  for (let i = 0; i < values.length && bins > 0; i++) {
    const value = values[i]!;
    const before = seen.get(value) ?? 0;
    seen.set(value, before + 1);
    const rank = placeIn(sorted, value) + before;
    let bin = 0;
    while (rank >= ends[bin]!) bin++;
    members[bin]!.push(i);
  }
  return members;
}

/** How many entries of an ascending vector are below the value. */
function placeIn(sorted: Float64Array, value: number): number {
  let [low, high] = [0, sorted.length];
  while (low < high) {
    const middle = (low + high) >> 1;
    if (sorted[middle]! < value) low = middle + 1;
    else high = middle;
  }
  return low;
}

/**
 * σ² = constant² + transmittance²·10^2A through the levels found, both parts non-negative. A variance
 * is known in proportion to itself, and to what is fitted rather than to what was found (a stretch
 * that happens to be quiet would count too much): a few rounds of weights.
 */
export function twoParts(levels: readonly NoiseLevelAt[], floor: number): NoiseModel {
  const least = Math.max(floor, noiseFloor) ** 2;
  let weights = levels.map(({ variance, points }) => points / Math.max(variance, least) ** 2);
  let parts = nonNegativeLine(levels, weights);
  for (let round = 0; round < 5; round++) {
    weights = levels.map(
      ({ flat, rise, points }) =>
        points / Math.max(parts.constant * flat + parts.transmittance * rise, least * flat) ** 2,
    );
    parts = nonNegativeLine(levels, weights);
  }
  return { constant: Math.sqrt(parts.constant), transmittance: Math.sqrt(parts.transmittance) };
}

/** Weighted least squares of variance on flat and rise with neither coefficient negative. */
function nonNegativeLine(
  levels: readonly NoiseLevelAt[],
  weights: readonly number[],
): { constant: number; transmittance: number } {
  let [s11, s12, s22, s1y, s2y] = [0, 0, 0, 0, 0];
  for (const [index, { variance, flat, rise }] of levels.entries()) {
    const weight = weights[index]!;
    s11 += weight * flat * flat;
    s12 += weight * flat * rise;
    s22 += weight * rise * rise;
    s1y += weight * flat * variance;
    s2y += weight * rise * variance;
  }
  const determinant = s11 * s22 - s12 * s12;
  const constantAlone = { constant: Math.max(s1y / s11, 0), transmittance: 0 };
  if (!(determinant > 1e-9 * s11 * s22)) return constantAlone;
  const constant = (s1y * s22 - s2y * s12) / determinant;
  const transmittance = (s11 * s2y - s12 * s1y) / determinant;
  if (transmittance < 0) return constantAlone;
  if (constant < 0) return { constant: 0, transmittance: Math.max(s2y / s22, 0) };
  return { constant, transmittance };
}

/** Points that are taken together where a level is read from squares. */
const stretch = 8;

/**
 * Levels from a residual: mean squares over short stretches. Unlike differences they see all of a
 * noise that is correlated from point to point.
 *
 * @param residual absorbance (or any unit; then flat and rise in its square); NaN where there is none
 * @param expected what one unit of constant² and of transmittance² gives at each point
 * @param kept share of the noise that the fit has left in the residual
 * @param known variance at each point that is not this noise
 */
export function levelsOfSquares(
  residual: Float64Array,
  expected: { readonly flat: Float64Array; readonly rise: Float64Array },
  kept: number,
  known?: Float64Array,
): NoiseLevelAt[] {
  const found: NoiseLevelAt[] = [];
  let [squares, flat, rise, elsewhere, points] = [0, 0, 0, 0, 0];
  for (const [i, value] of residual.entries()) {
    if (Number.isNaN(value)) continue;
    squares += (value * value) / kept;
    flat += expected.flat[i]!;
    rise += expected.rise[i]!;
    elsewhere += known?.[i] ?? 0;
    points++;
    if (points < stretch) continue;
    found.push({
      variance: (squares - elsewhere) / points,
      flat: flat / points,
      rise: rise / points,
      points,
    });
    [squares, flat, rise, elsewhere, points] = [0, 0, 0, 0, 0];
  }
  return found;
}
