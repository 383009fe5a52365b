/**
 * Stray light: a fraction s of the light in the reference beam reaches the detector past the
 * sample at every wavelength, A_obs = -log10((10^-A + s)/(1 + s)) (definition, e.g. ASTM E387).
 */

/** What the instrument shows for a true absorbance. */
export function withStrayLight(absorbance: number, strayLight: number): number {
  return -Math.log10((10 ** -absorbance + strayLight) / (1 + strayLight));
}

/** The true absorbance behind a reading; NaN where the reading is at or above the ceiling log10((1 + s)/s). */
export function withoutStrayLight(absorbance: number, strayLight: number): number {
  if (strayLight === 0) return absorbance;
  const transmitted = (1 + strayLight) * 10 ** -absorbance - strayLight;
  return transmitted > 0 ? -Math.log10(transmitted) : Number.NaN;
}
