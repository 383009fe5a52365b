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
 * Null where there are too few points to tell. Correlated noise (smoothing instruments) is
 * under-estimated; the fit's own residual is what guards the intervals against that.
 *
 * @param values absorbance, or the residual of a fit; NaN where missing; same length as `wavelengthNm`
 * @param level absorbance at which each point was read; the values themselves unless given
 * @param rounding standard deviation of rounding to the printed digits, below which no noise is believed
 */
export function estimateNoise(
  wavelengthNm: Float64Array,
  values: Float64Array,
  level: Float64Array = values,
  rounding: number = roundingSd(values),
): NoiseModel | null {
  const floor = Math.max(noiseFloor, rounding);
  let settled: Prediction | null = null;
  for (const reach of reaches) {
    const next = predictionErrors({ wavelengthNm, values, level }, reach, floor);
    if (next.errors.length < smallestSample) break;
    if (settled && next.scale > 0.9 * settled.scale) break;
    settled = next;
  }
  return settled && twoParts(settled, floor);
}

interface Prediction {
  /** Error of each predicted point, scaled to the standard deviation of one point. */
  readonly errors: Float64Array;
  /** Absorbance of the same points. */
  readonly at: Float64Array;
  readonly scale: number;
}

interface Readings {
  readonly wavelengthNm: Float64Array;
  readonly values: Float64Array;
  readonly level: Float64Array;
}

/**
 * Standard deviation of rounding to the printed digits: the smallest step between two values over
 * √12. Where an instrument prints three decimals, a flat stretch shows no other noise.
 */
export function roundingSd(values: Float64Array): number {
  const sorted = values.filter((value) => !Number.isNaN(value)).sort();
  let step = Number.POSITIVE_INFINITY;
  for (let i = 1; i < sorted.length; i++) {
    const gap = sorted[i]! - sorted[i - 1]!;
    // differences of decimals in doubles: what is this small is rounding of the same number
    if (gap > 1e-9 && gap < step) step = gap;
  }
  return Number.isFinite(step) ? step / Math.sqrt(12) : 0;
}

function predictionErrors(
  { wavelengthNm, values, level }: Readings,
  reach: number,
  floor: number,
): Prediction {
  const errors: number[] = [];
  const at: number[] = [];
  for (let i = reach; i < wavelengthNm.length - reach; i++) {
    const error = predictionError(wavelengthNm, values, i, reach);
    if (Number.isNaN(error)) continue;
    errors.push(error);
    at.push(level[i]!);
  }
  const sizes = Float64Array.from(errors, Math.abs);
  return {
    errors: Float64Array.from(errors),
    at: Float64Array.from(at),
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

/** σ² = constant² + transmittance²·10^2A through the bins, both parts non-negative. */
function twoParts({ errors, at }: Prediction, floor: number): NoiseModel {
  const order = Array.from(at.keys()).sort((a, b) => at[a]! - at[b]!);
  const bins = Math.min(mostBins, Math.floor(order.length / smallestSample));
  let s11 = 0;
  let s12 = 0;
  let s22 = 0;
  let s1y = 0;
  let s2y = 0;
  for (let bin = 0; bin < bins; bin++) {
    const members = order.slice(
      Math.floor((bin * order.length) / bins),
      Math.floor(((bin + 1) * order.length) / bins),
    );
    const sd = medianToSd * xMedian(Float64Array.from(members, (i) => Math.abs(errors[i]!)));
    const rise = xMedian(Float64Array.from(members, (i) => 100 ** at[i]!));
    const variance = Math.max(sd, floor) ** 2;
    // a variance is known in proportion to itself
    const weight = members.length / variance ** 2;
    s11 += weight;
    s12 += weight * rise;
    s22 += weight * rise * rise;
    s1y += weight * variance;
    s2y += weight * rise * variance;
  }
  const determinant = s11 * s22 - s12 * s12;
  let constant = determinant > 1e-9 * s11 * s22 ? (s1y * s22 - s2y * s12) / determinant : s1y / s11;
  let transmittance = determinant > 1e-9 * s11 * s22 ? (s11 * s2y - s12 * s1y) / determinant : 0;
  if (transmittance < 0) {
    transmittance = 0;
    constant = s1y / s11;
  } else if (constant < 0) {
    constant = 0;
    transmittance = s2y / s22;
  }
  return { constant: Math.sqrt(constant), transmittance: Math.sqrt(transmittance) };
}
