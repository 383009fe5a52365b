/**
 * Condition number of a small square matrix in the 2-norm, its columns brought to norm 1, by
 * one-sided Jacobi rotations (Hestenes 1958; Golub and Van Loan, Matrix Computations, 8.6.3): no
 * allocation to speak of, where a general decomposition takes longer than the fit it belongs to.
 * Infinity for a column of zeros or a matrix that is singular to rounding.
 *
 * @param matrix by rows
 */
export function conditionOf(matrix: readonly Float64Array[]): number {
  const size = matrix.length;
  const work = new Float64Array(size * size);
  for (let k = 0; k < size; k++) {
    let sum = 0;
    for (let i = 0; i < size; i++) sum += matrix[i]![k]! ** 2;
    const norm = Math.sqrt(sum);
    if (!(norm > 0)) return Number.POSITIVE_INFINITY;
    for (let i = 0; i < size; i++) work[k * size + i] = matrix[i]![k]! / norm;
  }
  for (let sweep = 0; sweep < mostSweeps; sweep++) {
    if (!rotatedOnce(work, size)) break;
  }
  let [smallest, largest] = [Number.POSITIVE_INFINITY, 0];
  for (let k = 0; k < size; k++) {
    let sum = 0;
    for (let i = 0; i < size; i++) sum += work[k * size + i]! ** 2;
    smallest = Math.min(smallest, sum);
    largest = Math.max(largest, sum);
  }
  const condition = Math.sqrt(largest / smallest);
  return condition < 1 / Number.EPSILON ? condition : Number.POSITIVE_INFINITY;
}

/** Convergence is quadratic; a handful do. */
const mostSweeps = 30;

/** One sweep over all pairs of columns; false when all were orthogonal already. */
function rotatedOnce(work: Float64Array, size: number): boolean {
  let turned = false;
  for (let p = 0; p < size - 1; p++) {
    for (let q = p + 1; q < size; q++) {
      let [pp, qq, pq] = [0, 0, 0];
      for (let i = 0; i < size; i++) {
        const a = work[p * size + i]!;
        const b = work[q * size + i]!;
        pp += a * a;
        qq += b * b;
        pq += a * b;
      }
      if (Math.abs(pq) <= 1e-15 * Math.sqrt(pp * qq)) continue;
      turned = true;
      const zeta = (qq - pp) / (2 * pq);
      const t = (zeta < 0 ? -1 : 1) / (Math.abs(zeta) + Math.sqrt(1 + zeta * zeta));
      const c = 1 / Math.sqrt(1 + t * t);
      for (let i = 0; i < size; i++) {
        const a = work[p * size + i]!;
        const b = work[q * size + i]!;
        work[p * size + i] = c * (a - t * b);
        work[q * size + i] = c * (t * a + b);
      }
    }
  }
  return turned;
}
