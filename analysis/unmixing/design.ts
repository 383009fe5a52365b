import type { FitSettings } from '../sheet/defaults.ts';
import { taken } from '../spectrum/vectors.ts';
import type { MolarAbsorptivity } from '../standards/molar-absorptivity.ts';

export type BaselineName = 'offset' | 'slope' | 'scatter';

/** Columns of the linear model on the points that are fitted, one entry a point. */
export interface Design {
  /** b·ε of each species, absorbance per mol/L. */
  readonly species: readonly Float64Array[];
  readonly baseline: readonly { readonly term: BaselineName; readonly column: Float64Array }[];
}

/**
 * @param at positions of the fitted points in the crude
 * @param wavelengthNm of the crude
 */
export function designOf(
  standards: readonly MolarAbsorptivity[],
  wavelengthNm: Float64Array,
  at: Int32Array,
  pathLengthCm: number,
  baseline: FitSettings['baseline'],
): Design {
  return {
    species: standards.map(({ epsilon }) => {
      const column = taken(epsilon, at);
      for (let j = 0; j < column.length; j++) column[j]! *= pathLengthCm;
      return column;
    }),
    baseline: baselineColumns(taken(wavelengthNm, at), baseline),
  };
}

/**
 * Baseline terms on the given wavelengths. The slope runs from -1/2 to 1/2 across the window, so
 * that its coefficient is the rise across it; scatter is (λ/λ_mid)⁻⁴, 1 at the middle.
 *
 * @param fittedNm the points that are fitted, which set the middle and the width
 */
export function baselineColumns(
  wavelengthNm: Float64Array,
  baseline: FitSettings['baseline'],
  fittedNm: Float64Array = wavelengthNm,
): Design['baseline'] {
  if (baseline === 'none') return [];
  const low = fittedNm[0] ?? 0;
  const high = fittedNm.at(-1) ?? 0;
  const middle = (low + high) / 2;
  const offset = { term: 'offset' as const, column: new Float64Array(wavelengthNm.length).fill(1) };
  if (baseline === 'offset') return [offset];
  if (baseline === 'line') {
    const column = wavelengthNm.map((nm) => (nm - middle) / (high - low || 1));
    return [offset, { term: 'slope', column }];
  }
  const column = wavelengthNm.map((nm) => (middle / nm) ** 4);
  return [offset, { term: 'scatter', column }];
}
