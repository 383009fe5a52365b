/** Gradient of the fraction of k among `among` by the amounts, at the unconstrained estimate. */
export function fractionGradient(
  amounts: Float64Array,
  k: number,
  among: readonly number[],
): Float64Array {
  const sum = among.reduce((total, l) => total + amounts[l]!, 0);
  const gradient = new Float64Array(amounts.length);
  for (const l of among) gradient[l] = ((l === k ? sum : 0) - amounts[k]!) / (sum * sum);
  return gradient;
}
