/**
 * Orthonormal basis of the columns' span by Gram-Schmidt, done twice (enough for these few).
 *
 * @param start directions that are orthonormal already and come first
 */
export function orthonormal(
  columns: readonly Float64Array[],
  start: readonly Float64Array[] = [],
): Float64Array[] {
  const basis = [...start];
  for (const column of columns) {
    const whole = Math.sqrt(dot(column, column));
    const rest = column.slice();
    takeOut(basis, rest);
    takeOut(basis, rest);
    const length = Math.sqrt(dot(rest, rest));
    if (!(length > 1e-10 * whole)) continue;
    for (let i = 0; i < rest.length; i++) rest[i]! /= length;
    basis.push(rest);
  }
  return basis;
}

/** What of the vector no direction of the orthonormal basis can make. */
export function projectedOut(basis: readonly Float64Array[], vector: Float64Array): Float64Array {
  const out = vector.slice();
  takeOut(basis, out);
  return out;
}

function takeOut(basis: readonly Float64Array[], vector: Float64Array): void {
  for (const direction of basis) {
    const along = dot(direction, vector);
    for (let i = 0; i < vector.length; i++) vector[i]! -= along * direction[i]!;
  }
}

/** The entries at these places. */
export function taken(vector: Float64Array, at: Int32Array): Float64Array {
  const out = new Float64Array(at.length);
  for (let j = 0; j < at.length; j++) out[j] = vector[at[j]!]!;
  return out;
}

/** Entry by entry. Loops, as a call for each entry takes longer than the division. */
export function divided(vector: Float64Array, by: Float64Array): Float64Array {
  const out = new Float64Array(vector.length);
  for (let i = 0; i < out.length; i++) out[i] = vector[i]! / by[i]!;
  return out;
}

/** Entry by entry. */
export function rooted(vector: Float64Array): Float64Array {
  const out = new Float64Array(vector.length);
  for (let i = 0; i < out.length; i++) out[i] = Math.sqrt(vector[i]!);
  return out;
}

export function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i]! * b[i]!;
  return sum;
}

/** aᵀ M b for a symmetric matrix. */
export function quadratic(
  a: Float64Array,
  matrix: readonly Float64Array[],
  b: Float64Array = a,
): number {
  let sum = 0;
  for (let k = 0; k < matrix.length; k++) {
    const weight = a[k]!;
    if (weight === 0) continue;
    const row = matrix[k]!;
    for (let l = 0; l < row.length; l++) sum += weight * b[l]! * row[l]!;
  }
  return sum;
}
