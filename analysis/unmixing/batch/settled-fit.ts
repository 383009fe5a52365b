import type { NoiseModel } from '../../spectrum/noise.ts';
import { leastPivot, weigh } from './own-weights.ts';
import { packedColumns } from './packed-columns.ts';
import { choleskyInPlace, solveCholesky } from './small-cholesky.ts';
import { modelInto, weightedGram } from './weighted-gram.ts';

/** Where the weights of one spectrum stand. */
export interface SettledFit {
  /** Absorbance that the weights are taken from. */
  readonly fitted: Float64Array;
  /** Variance that the standards' own noise adds. */
  readonly extra: Float64Array;
}

const mostRounds = 20;
/** A change of the fitted absorbance that moves a weight by less than a millionth. */
const settledAbsorbance = 1e-7;

/**
 * The quick part of a weighted fit: rounds of weights from the fitted absorbance by normal
 * equations, until it moves no more. The weights need six digits, which normal equations have to
 * spare at the conditions that they are let through with (`leastPivot`); the fit itself is then one
 * orthogonal round. Null where the columns depend on each other too much, or the weights never stand.
 */
export function settledFit(
  columns: readonly Float64Array[],
  measured: Float64Array,
  noise: NoiseModel,
  standardsVariance: (parameters: Float64Array) => Float64Array,
): SettledFit | null {
  const size = columns.length;
  const packed = packedColumns(columns);
  const weights = new Float64Array(measured.length);
  const gram = new Float64Array(size * size);
  const parameters = new Float64Array(size);
  let fitted = measured.slice();
  let before = new Float64Array(measured.length);
  let extra: Float64Array | null = null;
  for (let round = 0; round < mostRounds; round++) {
    weigh(fitted, noise, weights, extra);
    weightedGram(packed, weights, measured, 0, { gram, right: parameters });
    if (!choleskyInPlace(gram, size, leastPivot)) return null;
    solveCholesky(gram, size, parameters);
    [before, fitted] = [fitted, before];
    modelInto(packed, parameters, fitted);
    extra = standardsVariance(parameters);
    if (round > 0 && largestChange(before, fitted) <= settledAbsorbance) return { fitted, extra };
  }
  return null;
}

function largestChange(before: Float64Array, after: Float64Array): number {
  let largest = 0;
  for (let i = 0; i < after.length; i++) {
    largest = Math.max(largest, Math.abs(after[i]! - before[i]!));
  }
  return largest;
}
