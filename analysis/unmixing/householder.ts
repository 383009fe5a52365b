/** A = Q R by Householder reflections (Golub and Van Loan, Matrix Computations, 5.2). */
export interface HouseholderFactors {
  readonly rows: number;
  readonly columns: number;
  /** R by rows, columns × columns. */
  upper(): Float64Array[];
  /** R⁻¹ by rows; only for a matrix of full rank. */
  upperInverse(): Float64Array[];
  /** Qᵀ b, length max(rows, columns). */
  rotated(vector: Float64Array): Float64Array;
  /** Q b, for b as `rotated` gives it; length `rows`. */
  rotatedBack(vector: Float64Array): Float64Array;
  /** The first `columns` columns of Q, each of length `rows`. */
  basis(): Float64Array[];
}

/** @param columns columns of A, all of one length; left untouched */
export function householder(columns: readonly Float64Array[]): HouseholderFactors {
  const size = columns.length;
  const rows = columns[0]?.length ?? 0;
  // rows of zeros make a wide matrix square without changing the problem
  const height = Math.max(rows, size);
  const work = columns.map((column) => padded(column, height));
  const diagonal = new Float64Array(size);
  // work[k] below the diagonal becomes the k-th reflection's vector, above it stays R
  for (let k = 0; k < size; k++) {
    diagonal[k] = reflect(work[k]!, k);
    for (let j = k + 1; j < size; j++) applyReflection(work[k]!, k, work[j]!);
  }
  const forward = (vector: Float64Array): Float64Array => {
    for (let k = 0; k < size; k++) applyReflection(work[k]!, k, vector);
    return vector;
  };
  const backward = (vector: Float64Array): Float64Array => {
    for (let k = size - 1; k >= 0; k--) applyReflection(work[k]!, k, vector);
    return vector.subarray(0, rows);
  };
  const entry = (i: number, j: number): number => {
    if (i > j) return 0;
    return i === j ? diagonal[i]! : work[j]![i]!;
  };
  return {
    rows,
    columns: size,
    upper: () => columns.map((_, i) => Float64Array.from(columns, (__, j) => entry(i, j))),
    upperInverse: () => invertedUpper(size, entry),
    rotated: (vector) => forward(padded(vector, height)),
    rotatedBack: (vector) => backward(padded(vector, height)),
    basis: () =>
      columns.map((_, k) => {
        const unit = new Float64Array(height);
        unit[k] = 1;
        return backward(unit);
      }),
  };
}

function padded(vector: Float64Array, height: number): Float64Array {
  const copy = new Float64Array(height);
  copy.set(vector);
  return copy;
}

/** Turns column[k…] into the reflection's vector v with vᵀv = 2 (or 0), returns R's diagonal entry. */
function reflect(column: Float64Array, k: number): number {
  let sum = 0;
  for (let i = k; i < column.length; i++) sum += column[i]! * column[i]!;
  const norm = Math.sqrt(sum);
  if (norm === 0) return 0;
  const head = column[k]!;
  const entry = head > 0 ? -norm : norm;
  column[k] = head - entry;
  // vᵀv = 2·norm·(norm + |head|)
  const scale = 1 / Math.sqrt(norm * (norm + Math.abs(head)));
  for (let i = k; i < column.length; i++) column[i]! *= scale;
  return entry;
}

/** vector -= v (vᵀ vector), v in column[k…] with vᵀv = 2. */
function applyReflection(column: Float64Array, k: number, vector: Float64Array): void {
  let along = 0;
  for (let i = k; i < vector.length; i++) along += column[i]! * vector[i]!;
  if (along === 0) return;
  for (let i = k; i < vector.length; i++) vector[i]! -= along * column[i]!;
}

function invertedUpper(size: number, entry: (i: number, j: number) => number): Float64Array[] {
  const inverse = Array.from({ length: size }, () => new Float64Array(size));
  for (let column = 0; column < size; column++) {
    for (let i = column; i >= 0; i--) {
      let sum = i === column ? 1 : 0;
      for (let j = i + 1; j <= column; j++) sum -= entry(i, j) * inverse[j]![column]!;
      inverse[i]![column] = sum / entry(i, i);
    }
  }
  return inverse;
}
