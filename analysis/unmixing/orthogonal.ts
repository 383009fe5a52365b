import { Matrix, SingularValueDecomposition } from 'ml-matrix';
import { type HouseholderFactors, householder } from './householder.ts';
import { refined } from './refine.ts';

/** The least-squares solution of a tall matrix A, made ready for any right-hand side. */
export interface OrthogonalFactors {
  readonly rows: number;
  readonly columns: number;
  /** Numerical rank of the column-scaled matrix. */
  readonly rank: number;
  /** 2-norm condition number of the column-scaled matrix; Infinity where rank-deficient. */
  readonly condition: number;
  /** Least-squares solution, length `columns`; of least norm (in the scaled columns) where rank-deficient. */
  solve(rhs: Float64Array): Float64Array;
  /** Pseudo-inverse P, `columns` rows of length `rows`: x = P b, (AᵀA)⁻¹ = P Pᵀ. */
  pseudoInverse(): Float64Array[];
  /** Basis of the null space in unscaled coordinates, each of length `columns`; [] for full rank. */
  nullSpace(): Float64Array[];
}

/**
 * Householder QR of A with its columns scaled to norm about 1 (by powers of two, so exactly). Rank
 * by the singular values of R. Answers of full-rank systems are refined with double-double
 * residuals (`refine.ts`).
 *
 * @param columns the columns of A, one Float64Array each, all of one length
 * @param lowParts low halves of a double-double matrix (powers of x formed in double-double), same shape
 */
export function factorise(
  columns: readonly Float64Array[],
  lowParts?: readonly Float64Array[],
): OrthogonalFactors {
  const rows = columns[0]?.length ?? 0;
  const size = columns.length;
  const scales = columns.map(powerOfTwoScale);
  const scaled = columns.map((column, k) => column.map((value) => value / scales[k]!));
  const factors = householder(scaled);
  const svd = new SingularValueDecomposition(factors.upper());
  const values = svd.diagonal;
  const largest = values[0] ?? 0;
  const tolerance = Math.max(rows, size) * Number.EPSILON * largest;
  const rank = values.filter((value) => value > tolerance).length;
  const condition = rank < size ? Number.POSITIVE_INFINITY : largest / values[size - 1]!;
  const inverse = rank < size ? truncatedInverse(svd, rank) : factors.upperInverse();
  const unscaled = (answer: Float64Array): Float64Array =>
    answer.map((value, k) => value / scales[k]!);
  return {
    rows,
    columns: size,
    rank,
    condition,
    solve(rhs) {
      if (rank === size) {
        const low = lowParts?.map((column, k) => column.map((value) => value / scales[k]!));
        return unscaled(refined(factors, scaled, low, rhs));
      }
      return unscaled(product(inverse, factors.rotated(rhs)));
    },
    pseudoInverse: () => scaledRows(inverse, factors, scales),
    nullSpace: () =>
      Array.from({ length: size - rank }, (_, m) =>
        Float64Array.from(
          columns,
          (__, k) => svd.rightSingularVectors.get(k, rank + m) / scales[k]!,
        ),
      ),
  };
}

function powerOfTwoScale(column: Float64Array): number {
  let largest = 0;
  for (const value of column) largest = Math.max(largest, Math.abs(value));
  if (!(largest > 0) || !Number.isFinite(largest)) return 1;
  let sum = 0;
  for (const value of column) sum += (value / largest) ** 2;
  const exponent = Math.round(Math.log2(largest) + Math.log2(sum) / 2);
  // neither the scale nor its inverse may overflow; a column below 1e-301 then counts as empty
  return 2 ** Math.min(Math.max(exponent, -1000), 1000);
}

/** V S⁺ Uᵀ with only the first `rank` singular values. */
function truncatedInverse(svd: SingularValueDecomposition, rank: number): Matrix {
  const { leftSingularVectors: u, rightSingularVectors: v, diagonal } = svd;
  const size = diagonal.length;
  const inverse = Matrix.zeros(size, size);
  for (let m = 0; m < rank; m++) {
    for (let k = 0; k < size; k++) {
      for (let l = 0; l < size; l++) {
        inverse.set(k, l, inverse.get(k, l) + (v.get(k, m) * u.get(l, m)) / diagonal[m]!);
      }
    }
  }
  return inverse;
}

/** matrix · (first entries of vector). */
function product(matrix: Matrix, vector: Float64Array): Float64Array {
  return Float64Array.from({ length: matrix.rows }, (_, k) => {
    let sum = 0;
    for (let l = 0; l < matrix.columns; l++) sum += matrix.get(k, l) * vector[l]!;
    return sum;
  });
}

function scaledRows(
  inverse: Matrix,
  factors: HouseholderFactors,
  scales: readonly number[],
): Float64Array[] {
  const basis = factors.basis();
  return scales.map((scale, k) => {
    const row = new Float64Array(factors.rows);
    for (const [m, direction] of basis.entries()) {
      const weight = inverse.get(k, m) / scale;
      if (weight === 0) continue;
      for (let i = 0; i < row.length; i++) row[i]! += weight * direction[i]!;
    }
    return row;
  });
}
