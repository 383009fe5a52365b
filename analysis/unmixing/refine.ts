import { addTo, type DoubleDoubleVector, dotProduct, subtractMultiple } from './double-double.ts';
import type { HouseholderFactors } from './householder.ts';

const mostRounds = 30;
/** Beside a right-hand side of 1, so that answers 1e8 times smaller still have all their digits. */
const settled = 2 ** -80;

/**
 * Least squares refined on the augmented system r + A x = b, Aᵀ r = 0: residual *and* solution are
 * corrected, both residuals in double-double, until the next correction would be below `settled`
 * (Björck, BIT 7 (1967) 257; Golub and Van Loan, 5.3.8). Exact to double as long as the condition
 * times the unit roundoff stays well below 1; where it does not, the corrections do not shrink and
 * the plain answer of the factors stands.
 *
 * @param inverse R⁻¹ by rows
 * @param columns columns of A, full rank, scaled to norm about 1
 * @param rhs scaled to norm about 1
 */
export function refined(
  factors: HouseholderFactors,
  inverse: readonly Float64Array[],
  columns: readonly DoubleDoubleVector[],
  rhs: Float64Array,
): Float64Array {
  const first = corrections(factors, inverse, rhs, new Float64Array(columns.length));
  const x = { high: first.dx, low: new Float64Array(columns.length) };
  const r = { high: first.dr, low: new Float64Array(rhs.length) };
  let before = 1;
  for (let round = 0; round < mostRounds; round++) {
    const f = outerResidual(columns, rhs, x, r);
    const g = Float64Array.from(columns, (column) => -dotProduct(column, r));
    const { dx, dr } = corrections(factors, inverse, f, g);
    const size = largest(dx);
    // the answer itself may be 0, the right-hand side is about 1
    const change = size / Math.max(largest(x.high), 1);
    // they shrink by one factor each round; once they no longer do, they are noise
    if (size === 0 || !(change < before / 2)) break;
    addTo(x, dx);
    addTo(r, dr);
    if (change * (change / before) < settled) break;
    before = change;
  }
  return x.high;
}

/** b - r - A x, rounded to doubles at the end. */
function outerResidual(
  columns: readonly DoubleDoubleVector[],
  rhs: Float64Array,
  x: DoubleDoubleVector,
  r: DoubleDoubleVector,
): Float64Array {
  const left = { high: r.high.map((value) => -value), low: r.low.map((value) => -value) };
  addTo(left, rhs);
  for (const [k, column] of columns.entries()) {
    subtractMultiple(left, column, x.high[k]!, x.low[k]!);
  }
  return left.high;
}

/** Solves [I A; Aᵀ 0] [dr; dx] = [f; g] with the factors at hand. */
function corrections(
  factors: HouseholderFactors,
  inverse: readonly Float64Array[],
  f: Float64Array,
  g: Float64Array,
): { dx: Float64Array; dr: Float64Array } {
  const size = g.length;
  const d = factors.rotated(f);
  const h = new Float64Array(size);
  for (let k = 0; k < size; k++) {
    for (let l = 0; l <= k; l++) h[k]! += inverse[l]![k]! * g[l]!;
  }
  const dx = new Float64Array(size);
  for (let k = 0; k < size; k++) {
    for (let l = k; l < size; l++) dx[k]! += inverse[k]![l]! * (d[l]! - h[l]!);
  }
  d.set(h);
  return { dx, dr: factors.rotatedBack(d) };
}

function largest(vector: Float64Array): number {
  let most = 0;
  for (const value of vector) most = Math.max(most, Math.abs(value));
  return most;
}
