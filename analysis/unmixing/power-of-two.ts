/** The power of two nearest to the norm of a vector; 1 for a vector of zeros. Dividing by it is exact. */
export function powerOfTwoNear(vector: Float64Array): number {
  let largest = 0;
  for (let i = 0; i < vector.length; i++) largest = Math.max(largest, Math.abs(vector[i]!));
  if (largest === 0) return 1;
  let sum = 0;
  for (let i = 0; i < vector.length; i++) sum += (vector[i]! / largest) ** 2;
  const exponent = Math.round(Math.log2(largest) + Math.log2(sum) / 2);
  // neither the scale nor its inverse may overflow
  return 2 ** Math.min(Math.max(exponent, -1000), 1000);
}

export function scaledBy(vector: Float64Array, scale: number): Float64Array {
  const scaled = new Float64Array(vector.length);
  for (let i = 0; i < scaled.length; i++) scaled[i] = vector[i]! / scale;
  return scaled;
}
