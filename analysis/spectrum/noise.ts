/**
 * Photometric noise: a constant part in absorbance and a constant error in transmittance.
 * σ_A² = constant² + (transmittance · 10^A)². The second part is in the units of
 * `NoiseModel.transmittance`, an absorbance at A = 0 (DESIGN.md, "The science").
 */
export interface NoiseModel {
  readonly constant: number;
  readonly transmittance: number;
}

/** Below this no instrument goes: keeps weights finite for spectra without noise. Absorbance. */
export const noiseFloor = 1e-6;

/** Variance of one reading at absorbance `absorbance`, dimensionless. */
export function absorbanceVariance(noise: NoiseModel, absorbance: number): number {
  const transmitted = noise.transmittance * 10 ** Math.min(absorbance, 6);
  return Math.max(
    noise.constant * noise.constant + transmitted * transmitted,
    noiseFloor * noiseFloor,
  );
}
