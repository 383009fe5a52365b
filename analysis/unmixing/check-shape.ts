/** RangeError, a fault of the caller, unless every vector has `rows` entries and all are finite. */
export function checkShape(vectors: readonly Float64Array[], rows: number): void {
  for (const vector of vectors) {
    if (vector.length !== rows) {
      throw new RangeError(`least squares needs columns of ${rows} rows, not ${vector.length}`);
    }
    if (!allFinite(vector)) throw new RangeError('least squares needs finite numbers');
  }
}

function allFinite(vector: Float64Array): boolean {
  // 0 but for NaN and infinities; a call for each entry would add a third to the factorisation's time
  let probe = 0;
  for (let i = 0; i < vector.length; i++) probe += vector[i]! - vector[i]!;
  return probe === 0;
}
