/**
 * One recorded spectrum.
 * `wavelengthNm` ascends strictly; `absorbance` has the same length and holds NaN where the
 * instrument marked a point as over range or missing (never zero in its stead).
 */
export interface Spectrum {
  readonly name: string;
  readonly wavelengthNm: Float64Array;
  /** Absorbance, dimensionless; for a molar absorptivity spectrum L mol⁻¹ cm⁻¹. */
  readonly values: Float64Array;
}
