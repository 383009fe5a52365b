import type { MolarAbsorptivity } from '../standards/molar-absorptivity.ts';

/** b² Σ c² u²(ε): what the standards' noise adds to the variance of each point. */
export function standardsVariance(
  standards: readonly MolarAbsorptivity[],
  at: Int32Array,
  pathLengthCm: number,
  parameters: Float64Array,
): Float64Array {
  const variance = new Float64Array(at.length);
  for (const [k, { sd }] of standards.entries()) {
    const amount = pathLengthCm * Math.max(parameters[k]!, 0);
    for (const [j, i] of at.entries()) variance[j]! += (amount * sd[i]!) ** 2;
  }
  return variance;
}

/** ∂A/∂δ = -b Σ c dε/dλ on the fitted points, absorbance per nm. */
export function shiftSlope(
  standards: readonly MolarAbsorptivity[],
  at: Int32Array,
  pathLengthCm: number,
  parameters: Float64Array,
): Float64Array {
  const column = new Float64Array(at.length);
  for (const [k, { slope }] of standards.entries()) {
    for (const [j, i] of at.entries()) column[j]! -= pathLengthCm * parameters[k]! * slope[i]!;
  }
  return column;
}
