import { normalQuantile } from '../../distributions/normal.ts';
import { type NoiseModel, noiseFloor } from '../../spectrum/noise.ts';
import { checkShape } from '../check-shape.ts';
import { innerProducts, type PackedColumns, packedColumns } from './packed-columns.ts';
import { choleskyInPlace, invertCholesky, solveCholesky } from './small-cholesky.ts';
import { modelInto, weightedGram } from './weighted-gram.ts';

/**
 * Smallest share of a column that those before it may leave: about a condition of 1e4. Normal
 * equations lose twice the digits of the condition, and one correction brings them back.
 */
export const leastPivot = 1e-8;

/** Fits of many spectra, one after the other. */
export interface OwnWeights {
  /** Spectra × columns. */
  readonly parameters: Float64Array;
  /** Σ residual²/variance of each spectrum. */
  readonly chiSquare: Float64Array;
  /** Covariance of each spectrum's parameters from the noise, spectra × columns × columns. */
  readonly covariance: Float64Array;
  /** Ends of the 95 % intervals, spectra × columns × 2. */
  readonly interval95: Float64Array;
}

const halfWidth = normalQuantile(0.975);

/**
 * Weighted least squares of many spectra on one design, each with weights from its own fitted
 * absorbance: an unweighted start, then `reweightings` rounds by normal equations on the triangle
 * of the columns' inner products, the last one corrected once by its residual (corrected
 * seminormal equations; Björck, Linear Algebra Appl. 88/89 (1987) 31). Null where the columns depend
 * on each other too much for that, at the weights of any spectrum.
 *
 * @param columns model columns, all of one length
 * @param spectra absorbance, spectra × points, one after the other
 */
export function ownWeights(
  columns: readonly Float64Array[],
  spectra: Float64Array,
  noise: NoiseModel,
  reweightings = 1,
): OwnWeights | null {
  const [size, points] = [columns.length, columns[0]?.length ?? 0];
  checkShape(columns, points);
  if (size === 0 || points === 0 || spectra.length % points !== 0 || reweightings < 1) {
    throw new RangeError('a batch needs columns, and spectra of the same number of points');
  }
  const packed = packedColumns(columns);
  const work = workspace(packed);
  const start = startOf(packed, work);
  if (!start) return null;
  const count = spectra.length / points;
  const parameters = new Float64Array(count * size);
  const chiSquare = new Float64Array(count);
  const covariance = new Float64Array(count * size * size);
  const interval95 = new Float64Array(2 * count * size);
  for (let s = 0; s < count; s++) {
    const from = s * points;
    const x = parameters.subarray(s * size, (s + 1) * size);
    start(spectra, from, x);
    for (let round = 0; round < reweightings; round++) {
      modelInto(packed, x, work.fitted);
      weigh(work.fitted, noise, work.weights);
      weightedGram(packed, work.weights, spectra, from, { gram: work.gram, right: x });
      if (!choleskyInPlace(work.gram, size, leastPivot)) return null;
      solveCholesky(work.gram, size, x);
    }
    chiSquare[s] = correct(packed, work, spectra, from, x);
    invertCholesky(work.gram, size, covariance, s * size * size);
    for (let k = 0; k < size; k++) {
      const half = halfWidth * Math.sqrt(covariance[(s * size + k) * size + k]!);
      interval95[2 * (s * size + k)] = x[k]! - half;
      interval95[2 * (s * size + k) + 1] = x[k]! + half;
    }
  }
  return { parameters, chiSquare, covariance, interval95 };
}

interface Workspace {
  readonly fitted: Float64Array;
  readonly weights: Float64Array;
  readonly residual: Float64Array;
  readonly gram: Float64Array;
  readonly along: Float64Array;
}

function workspace({ points, columns }: PackedColumns): Workspace {
  return {
    fitted: new Float64Array(points),
    weights: new Float64Array(points),
    residual: new Float64Array(points),
    gram: new Float64Array(columns * columns),
    along: new Float64Array(2 * columns),
  };
}

/** The unweighted fit: its triangle is the same for all spectra. */
function startOf(packed: PackedColumns, work: Workspace) {
  const size = packed.columns;
  const factor = new Float64Array(size * size);
  const ones = new Float64Array(packed.points).fill(1);
  weightedGram(packed, ones, ones, 0, { gram: factor, right: work.along });
  if (!choleskyInPlace(factor, size, leastPivot)) return null;
  return (spectra: Float64Array, from: number, x: Float64Array): void => {
    innerProducts(packed, spectra, from, from, work.along);
    for (let k = 0; k < size; k++) x[k] = work.along[k]!;
    solveCholesky(factor, size, x);
  };
}

/** 1/σ² at each fitted absorbance (`absorbanceVariance`), with what else adds to the variance. */
export function weigh(
  fitted: Float64Array,
  noise: NoiseModel,
  weights: Float64Array,
  extra: Float64Array | null = null,
): void {
  const flat = noise.constant * noise.constant;
  const rise = noise.transmittance * noise.transmittance;
  const floor = noiseFloor * noiseFloor;
  for (let i = 0; i < fitted.length; i++) {
    const variance = flat + rise * Math.exp(2 * Math.LN10 * Math.min(fitted[i]!, 6));
    const more = extra === null ? 0 : extra[i]!;
    weights[i] = 1 / (Math.max(variance, floor) + more);
  }
}

/** One correction of x by its weighted residual; returns Σ residual²/variance. */
function correct(
  packed: PackedColumns,
  { fitted, weights, residual, gram, along }: Workspace,
  spectra: Float64Array,
  from: number,
  x: Float64Array,
): number {
  const size = packed.columns;
  modelInto(packed, x, fitted);
  let chiSquare = 0;
  for (let i = 0; i < residual.length; i++) {
    const rest = spectra[from + i]! - fitted[i]!;
    residual[i] = weights[i]! * rest;
    chiSquare += weights[i]! * rest * rest;
  }
  innerProducts(packed, residual, 0, 0, along);
  const change = along.subarray(0, size);
  solveCholesky(gram, size, change);
  for (let k = 0; k < size; k++) x[k]! += change[k]!;
  return chiSquare;
}
