import { checkShape } from '../check-shape.ts';
import { householder } from '../householder.ts';
import { nonNegativeLeastSquares } from '../non-negative.ts';
import { conditionOf } from '../small-singular-values.ts';
import { innerProducts, packedColumns } from './packed-columns.ts';
import { mostConstrained, smallSubsets, solveOnSubsets } from './small-subsets.ts';

/** Up to this condition (columns at norm 1) the plain orthogonal answer is good to ten digits. */
const plainCondition = 1e6;

/**
 * Non-negative least squares of many spectra on one design with one set of weights: the design is
 * made orthogonal once, and a spectrum costs one inner product with each column (two spectra a pass)
 * and a look through the subsets of a triangle of the design's size. More than three constrained
 * columns, and columns that all but depend on each other, go to `nonNegativeLeastSquares`.
 *
 * @param columns weighted columns, all of one length
 * @param spectra weighted like the columns; spectra × points, one after the other
 * @param free columns that may be negative (baseline terms)
 * @returns spectra × columns, one after the other
 */
export function commonWeights(
  columns: readonly Float64Array[],
  spectra: Float64Array,
  free: readonly boolean[],
): Float64Array {
  const size = columns.length;
  const points = columns[0]?.length ?? 0;
  checkShape(columns, points);
  if (size === 0 || points === 0 || spectra.length % points !== 0) {
    throw new RangeError('a batch needs columns, and spectra of the same number of points');
  }
  // what is free comes first, so that the constrained unknowns are the last of the triangle
  const order = [...columns.keys()].sort(
    (a, b) => Number(free[b] === true) - Number(free[a] === true),
  );
  const norms = order.map((k) => norm(columns[k]!));
  const scaled = order.map((k, m) => columns[k]!.map((value) => value / norms[m]!));
  const isUsable = points >= size && norms.every((value) => value > 0);
  const factors = isUsable ? householder(scaled) : null;
  const upper = factors?.upper() ?? [];
  const constrained = order.filter((k) => free[k] !== true).length;
  if (!factors || constrained > mostConstrained || conditionOf(upper) > plainCondition) {
    return oneByOne(columns, spectra, free);
  }
  const packed = packedColumns(factors.basis());
  const subsets = smallSubsets(upper, constrained);
  const count = spectra.length / points;
  const out = new Float64Array(count * size);
  const turned = new Float64Array(2 * size);
  const halves = [turned.subarray(0, size), turned.subarray(size)];
  const x = new Float64Array(size);
  for (let s = 0; s < count; s += 2) {
    const pair = Math.min(2, count - s);
    innerProducts(packed, spectra, s * points, (s + pair - 1) * points, turned);
    for (let which = 0; which < pair; which++) {
      solveOnSubsets(subsets, upper, constrained, halves[which]!, x);
      for (let m = 0; m < size; m++) out[(s + which) * size + order[m]!] = x[m]! / norms[m]!;
    }
  }
  return out;
}

function oneByOne(
  columns: readonly Float64Array[],
  spectra: Float64Array,
  free: readonly boolean[],
): Float64Array {
  const points = columns[0]!.length;
  const size = columns.length;
  const out = new Float64Array((spectra.length / points) * size);
  for (let at = 0, s = 0; at < spectra.length; at += points, s++) {
    const { x } = nonNegativeLeastSquares(columns, spectra.subarray(at, at + points), free);
    out.set(x, s * size);
  }
  return out;
}

function norm(vector: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < vector.length; i++) sum += vector[i]! * vector[i]!;
  return Math.sqrt(sum);
}
