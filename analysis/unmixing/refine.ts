import type { Matrix } from 'ml-matrix';
import { Accumulator, type DoubleDoubleVector } from './double-double.ts';
import type { HouseholderFactors } from './householder.ts';

const mostRounds = 30;

/**
 * Least squares refined on the augmented system r + A x = b, Aᵀ r = 0: residual *and* solution are
 * corrected, both residuals in double-double, until the solution stands in its last digit
 * (Björck, BIT 7 (1967) 257; Golub and Van Loan, 5.3.8). Exact to double as long as the condition
 * times the unit roundoff stays below 1.
 *
 * @param columns scaled columns of A, full rank; `low` their low halves or undefined
 */
export function refined(
  factors: HouseholderFactors,
  columns: readonly Float64Array[],
  low: readonly Float64Array[] | undefined,
  rhs: Float64Array,
): Float64Array {
  const inverse = factors.upperInverse();
  const x = zeros(columns.length);
  const r = zeros(rhs.length);
  let before = Number.POSITIVE_INFINITY;
  for (let round = 0; round < mostRounds; round++) {
    const f = outerResidual(columns, low, rhs, x, r);
    const g = innerResidual(columns, low, r);
    const { dx, dr } = corrections(factors, inverse, f, g);
    const change = relativeChange(x, dx);
    // it converges by a factor a round; where it no longer does, more rounds only stir the last digit
    if (round > 1 && change >= before / 2) break;
    addTo(x, dx);
    addTo(r, dr);
    if (change < Number.EPSILON / 8) break;
    before = change;
  }
  return x.high;
}

function zeros(length: number): DoubleDoubleVector {
  return { high: new Float64Array(length), low: new Float64Array(length) };
}

/** b - r - A x. */
function outerResidual(
  columns: readonly Float64Array[],
  low: readonly Float64Array[] | undefined,
  rhs: Float64Array,
  x: DoubleDoubleVector,
  r: DoubleDoubleVector,
): Float64Array {
  return rhs.map((value, i) => {
    const sum = new Accumulator();
    sum.add(value, 0);
    sum.add(-r.high[i]!, -r.low[i]!);
    for (const [k, column] of columns.entries()) {
      sum.addProduct(-column[i]!, -(low?.[k]?.[i] ?? 0), x.high[k]!, x.low[k]!);
    }
    return sum.high;
  });
}

/** -Aᵀ r. */
function innerResidual(
  columns: readonly Float64Array[],
  low: readonly Float64Array[] | undefined,
  r: DoubleDoubleVector,
): Float64Array {
  return Float64Array.from(columns, (column, k) => {
    const sum = new Accumulator();
    for (const [i, value] of column.entries()) {
      sum.addProduct(-value, -(low?.[k]?.[i] ?? 0), r.high[i]!, r.low[i]!);
    }
    return sum.high;
  });
}

/** Solves [I A; Aᵀ 0] [dr; dx] = [f; g] with the factors at hand. */
function corrections(
  factors: HouseholderFactors,
  inverse: Matrix,
  f: Float64Array,
  g: Float64Array,
): { dx: Float64Array; dr: Float64Array } {
  const size = g.length;
  const d = factors.rotated(f);
  const h = new Float64Array(size);
  for (let k = 0; k < size; k++) {
    for (let l = 0; l <= k; l++) h[k]! += inverse.get(l, k) * g[l]!;
  }
  const dx = new Float64Array(size);
  for (let k = 0; k < size; k++) {
    for (let l = k; l < size; l++) dx[k]! += inverse.get(k, l) * (d[l]! - h[l]!);
  }
  d.set(h);
  return { dx, dr: factors.rotatedBack(d) };
}

function addTo(vector: DoubleDoubleVector, change: Float64Array): void {
  for (let k = 0; k < change.length; k++) {
    const sum = new Accumulator();
    sum.add(vector.high[k]!, vector.low[k]!);
    sum.add(change[k]!, 0);
    vector.high[k] = sum.high;
    vector.low[k] = sum.low;
  }
}

function relativeChange(x: DoubleDoubleVector, dx: Float64Array): number {
  let largest = 0;
  for (const [k, change] of dx.entries()) {
    if (change === 0) continue;
    largest = Math.max(largest, Math.abs(change) / (Math.abs(x.high[k]!) || Math.abs(change)));
  }
  return largest;
}
