/**
 * INVENTED bands. They are not the spectra of the real compounds; only the names and molar masses
 * of the scenario are those of ordinary chemicals.
 */

export type AbsorbingSpecies = 'arm' | 'mono' | 'bis' | 'hydrolysis';

export const absorbingSpecies: readonly AbsorbingSpecies[] = ['arm', 'mono', 'bis', 'hydrolysis'];

/** A Gaussian in wavenumber: height in L mol⁻¹ cm⁻¹, centre and standard deviation in cm⁻¹. */
interface Band {
  readonly centrePerCm: number;
  readonly deviationPerCm: number;
  readonly height: number;
}

/** A band given by the wavelength of its centre, as one reads it off a plot. */
function band(centreNm: number, deviationPerCm: number, height: number): Band {
  return { centrePerCm: 1e7 / centreNm, deviationPerCm, height };
}

const bands: Readonly<Record<AbsorbingSpecies, readonly Band[]>> = {
  arm: [band(271, 1900, 9200), band(229, 2300, 8000), band(312, 1700, 1500)],
  mono: [band(357, 1850, 15800), band(304, 2200, 2600), band(230, 2600, 42000)],
  bis: [band(376, 1950, 28500), band(286, 2400, 6200), band(236, 2500, 62000)],
  hydrolysis: [band(303, 1700, 10500), band(236, 2200, 9000), band(348, 1500, 2100)],
};

/** Molar absorptivity (L mol⁻¹ cm⁻¹) of one species at one wavelength; invented. */
export function molarAbsorptivity(species: AbsorbingSpecies, wavelengthNm: number): number {
  let sum = 0;
  for (const { centrePerCm, deviationPerCm, height } of bands[species]) {
    const z = (1e7 / wavelengthNm - centrePerCm) / deviationPerCm;
    sum += height * Math.exp(-0.5 * z * z);
  }
  return sum;
}
