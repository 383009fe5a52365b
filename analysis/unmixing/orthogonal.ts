import { Matrix, SingularValueDecomposition } from 'ml-matrix';
import { checkShape } from './check-shape.ts';
import { type HouseholderFactors, householder } from './householder.ts';
import { powerOfTwoNear, scaledBy } from './power-of-two.ts';
import { refined } from './refine.ts';
import { conditionOf } from './small-singular-values.ts';

/** The least-squares solution of a matrix A, made ready for any right-hand side. */
export interface OrthogonalFactors {
  readonly rows: number;
  readonly columns: number;
  /** Numerical rank of the column-scaled matrix. */
  readonly rank: number;
  /** 2-norm condition number of the column-scaled matrix; Infinity where rank-deficient. */
  readonly condition: number;
  /** Least-squares solution, length `columns`; of least norm (in the scaled columns) where rank-deficient. */
  solve(rhs: Float64Array): Float64Array;
  /** The same without refinement: good where the condition is small, and several times as fast. */
  solvePlain(rhs: Float64Array): Float64Array;
  /** Pseudo-inverse P, `columns` rows of length `rows`: x = P b, (AᵀA)⁻¹ = P Pᵀ. */
  pseudoInverse(): Float64Array[];
  /** Basis of the null space in unscaled coordinates, each of length `columns`; [] for full rank. */
  nullSpace(): Float64Array[];
}

/**
 * Householder QR of A with its columns scaled by powers of two, so exactly. Rank and condition are
 * those of the columns scaled to norm 1, by the singular values of R (whatever unit a column is in,
 * they are the same). Answers of full-rank systems are refined with double-double residuals
 * (`refine.ts`). RangeError for no columns, unequal lengths, or an entry that is not finite.
 *
 * @param columns the columns of A, one Float64Array each, all of one length
 * @param smallest singular values below this share of the largest count as nothing, beside those that rounding makes
 * @param lowParts low halves of a double-double matrix (powers of x formed in double-double), same shape
 */
export function factorise(
  columns: readonly Float64Array[],
  lowParts?: readonly Float64Array[],
  smallest = 0,
): OrthogonalFactors {
  const rows = columns[0]?.length ?? 0;
  const size = columns.length;
  if (size === 0) throw new RangeError('least squares needs at least one column');
  checkShape(columns, rows);
  if (lowParts) checkShape(lowParts, rows);
  const scales = columns.map(powerOfTwoNear);
  const scaled = columns.map((column, k) => scaledBy(column, scales[k]!));
  const factors = householder(scaled);
  const { rank, condition, inverse, nullSpace } = decomposed(factors, smallest);
  const ofZeros = new Float64Array(rows);
  const halves = scaled.map((high, k) => {
    const low = lowParts?.[k];
    return { high, low: low ? scaledBy(low, scales[k]!) : ofZeros };
  });
  return {
    rows,
    columns: size,
    rank,
    condition,
    solve(rhs) {
      checkShape([rhs], rows);
      const scale = powerOfTwoNear(rhs);
      const right = scaledBy(rhs, scale);
      const answer =
        rank === size
          ? refined(factors, inverse, halves, right)
          : product(inverse, factors.rotated(right));
      return answer.map((value, k) => value * (scale / scales[k]!));
    },
    solvePlain(rhs) {
      checkShape([rhs], rows);
      return product(inverse, factors.rotated(rhs)).map((value, k) => value / scales[k]!);
    },
    pseudoInverse: () => scaledRows(inverse, factors, scales),
    nullSpace: () => nullSpace.map((vector) => vector.map((value, k) => value / scales[k]!)),
  };
}

/** Below it no singular value is near what rounding makes of nothing. */
const clearCondition = 1e7;

interface Decomposed {
  readonly rank: number;
  readonly condition: number;
  /** R⁻¹, or R⁺ of least norm in the columns of norm 1; by rows. */
  readonly inverse: readonly Float64Array[];
  /** In the coordinates of the factorised columns. */
  readonly nullSpace: readonly Float64Array[];
}

/** Rank, condition and inverse of R by the singular values of R with its columns at norm 1. */
function decomposed(factors: HouseholderFactors, smallest: number): Decomposed {
  const upper = factors.upper();
  const size = factors.columns;
  const norms = upper.map((_, k) => {
    const norm = Math.hypot(...upper.map((row) => row[k]!));
    // they are about 1 but for columns of zeros and those below 1e-301, which count as zeros
    return norm > 0.5 ? norm : 1;
  });
  const condition = conditionOf(upper);
  if (factors.rows >= size && condition < clearCondition) {
    return {
      rank: size,
      condition,
      inverse: factors.upperInverse(),
      nullSpace: [],
    };
  }
  const svd = new SingularValueDecomposition(
    new Matrix(upper.map((row) => row.map((value, k) => value / norms[k]!))),
  );
  const values = svd.diagonal;
  const largest = values[0] ?? 0;
  const tolerance = Math.max(Math.max(factors.rows, size) * Number.EPSILON, smallest) * largest;
  const rank = values.filter((value) => value > tolerance).length;
  return {
    rank,
    condition: rank < size ? Number.POSITIVE_INFINITY : largest / values[size - 1]!,
    inverse: rank < size ? truncatedInverse(svd, rank, norms) : factors.upperInverse(),
    nullSpace: Array.from({ length: size - rank }, (_, m) =>
      Float64Array.from(norms, (norm, k) => svd.rightSingularVectors.get(k, rank + m) / norm),
    ),
  };
}

/** D⁻¹ V S⁺ Uᵀ with only the first `rank` singular values, D the norms of the columns. */
function truncatedInverse(
  svd: SingularValueDecomposition,
  rank: number,
  norms: readonly number[],
): Float64Array[] {
  const { leftSingularVectors: u, rightSingularVectors: v, diagonal } = svd;
  return norms.map((norm, k) =>
    Float64Array.from(norms, (_, l) => {
      let sum = 0;
      for (let m = 0; m < rank; m++) sum += (v.get(k, m) * u.get(l, m)) / diagonal[m]!;
      return sum / norm;
    }),
  );
}

/** matrix · (first entries of vector). */
function product(matrix: readonly Float64Array[], vector: Float64Array): Float64Array {
  return Float64Array.from(matrix, (row) =>
    row.reduce((sum, value, l) => sum + value * vector[l]!, 0),
  );
}

function scaledRows(
  inverse: readonly Float64Array[],
  factors: HouseholderFactors,
  scales: readonly number[],
): Float64Array[] {
  const basis = factors.basis();
  return scales.map((scale, k) => {
    const row = new Float64Array(factors.rows);
    for (const [m, direction] of basis.entries()) {
      const weight = inverse[k]![m]! / scale;
      if (weight === 0) continue;
      for (let i = 0; i < row.length; i++) row[i]! += weight * direction[i]!;
    }
    return row;
  });
}
