/** Orthonormal basis of the columns' span by Gram-Schmidt, done twice (enough for these few). */
export function orthonormal(columns: readonly Float64Array[]): Float64Array[] {
  const basis: Float64Array[] = [];
  for (const column of columns) {
    const start = Math.sqrt(dot(column, column));
    const rest = projectedOut(basis, projectedOut(basis, column));
    const length = Math.sqrt(dot(rest, rest));
    if (length > 1e-10 * start) basis.push(rest.map((value) => value / length));
  }
  return basis;
}

/** What of the vector no direction of the orthonormal basis can make. */
export function projectedOut(basis: readonly Float64Array[], vector: Float64Array): Float64Array {
  const out = vector.slice();
  for (const direction of basis) {
    const along = dot(direction, vector);
    for (let i = 0; i < out.length; i++) out[i]! -= along * direction[i]!;
  }
  return out;
}

export function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i]! * b[i]!;
  return sum;
}
