import { type AliquotCurves, leftOut, type Sheet } from '../../../analysis/index.ts';

/**
 * What was measured, where nothing can be fitted to it: no contributions, and nothing fitted. Null
 * where the sheet does not hold the spectrum.
 */
export function measuredCurves(sheet: Sheet, aliquot: string | null): AliquotCurves | null {
  const embedded = sheet.aliquots?.find(({ id }) => id === aliquot)?.spectrum.embedded;
  if (aliquot === null || !embedded?.absorbance || embedded.wavelengthNm.length === 0) return null;
  const { absorbance } = embedded;
  const points = embedded.wavelengthNm
    .map((nm, i) => ({ nm, value: absorbance[i] ?? Number.NaN }))
    .sort((a, b) => a.nm - b.nm);
  const nothing = new Float64Array(points.length).fill(Number.NaN);
  return {
    aliquot,
    wavelengthNm: Float64Array.from(points, ({ nm }) => nm),
    measured: Float64Array.from(points, ({ value }) => value),
    use: Uint8Array.from(points, ({ value }) =>
      Number.isNaN(value) ? leftOut.missing : leftOut.used,
    ),
    fitted: nothing,
    contributions: [],
    baseline: nothing,
    residual: nothing,
    expectedSd: nothing,
  };
}
