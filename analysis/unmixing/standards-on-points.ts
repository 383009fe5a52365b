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
    if (amount === 0) continue;
    for (let j = 0; j < at.length; j++) variance[j]! += (amount * sd[at[j]!]!) ** 2;
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
    const amount = pathLengthCm * parameters[k]!;
    for (let j = 0; j < at.length; j++) column[j]! -= amount * slope[at[j]!]!;
  }
  return column;
}
