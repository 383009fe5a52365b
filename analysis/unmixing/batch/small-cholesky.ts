/**
 * The upper triangle of a small symmetric matrix to its Cholesky factor G = UᵀU, in place (Golub and
 * Van Loan, Matrix Computations, 4.2.5). False, and the matrix spoilt, where a pivot falls below
 * `least` of its diagonal: the columns behind it depend on each other too much for normal equations.
 *
 * @param matrix size × size, by rows
 */
export function choleskyInPlace(matrix: Float64Array, size: number, least: number): boolean {
  for (let k = 0; k < size; k++) {
    const diagonal = matrix[k * size + k]!;
    let pivot = diagonal;
    for (let m = 0; m < k; m++) pivot -= matrix[m * size + k]! * matrix[m * size + k]!;
    if (!(pivot > least * diagonal)) return false;
    const root = Math.sqrt(pivot);
    matrix[k * size + k] = root;
    for (let l = k + 1; l < size; l++) {
      let sum = matrix[k * size + l]!;
      for (let m = 0; m < k; m++) sum -= matrix[m * size + k]! * matrix[m * size + l]!;
      matrix[k * size + l] = sum / root;
    }
  }
  return true;
}

/** x with UᵀU x = x as it comes in. */
export function solveCholesky(factor: Float64Array, size: number, x: Float64Array): void {
  for (let k = 0; k < size; k++) {
    let sum = x[k]!;
    for (let m = 0; m < k; m++) sum -= factor[m * size + k]! * x[m]!;
    x[k] = sum / factor[k * size + k]!;
  }
  for (let k = size - 1; k >= 0; k--) {
    let sum = x[k]!;
    for (let l = k + 1; l < size; l++) sum -= factor[k * size + l]! * x[l]!;
    x[k] = sum / factor[k * size + k]!;
  }
}

/** (UᵀU)⁻¹ into `out`, size × size by rows from `from` on. */
export function invertCholesky(
  factor: Float64Array,
  size: number,
  out: Float64Array,
  from: number,
): void {
  // U⁻¹ by rows in the upper triangle, then U⁻¹ U⁻ᵀ
  for (let column = 0; column < size; column++) {
    for (let i = column; i >= 0; i--) {
      let sum = i === column ? 1 : 0;
      for (let j = i + 1; j <= column; j++)
        sum -= factor[i * size + j]! * out[from + j * size + column]!;
      out[from + i * size + column] = sum / factor[i * size + i]!;
    }
  }
  for (let k = 0; k < size; k++) {
    for (let l = k; l < size; l++) {
      let sum = 0;
      for (let m = l; m < size; m++) sum += out[from + k * size + m]! * out[from + l * size + m]!;
      out[from + k * size + l] = sum;
    }
  }
  for (let k = 0; k < size; k++) {
    for (let l = 0; l < k; l++) out[from + k * size + l] = out[from + l * size + k]!;
  }
}
