import type { PhotometricNoise } from './noise.ts';

/** Everything that is stated, not drawn. Relative uncertainties are standard uncertainties. */

/** The seed of the committed files. */
export const committedSeed = 20261201;

/** k₂/k₁ of the two substitutions. */
export const kappa = 0.35;

export const photometricNoise: PhotometricNoise = { constant: 3e-4, transmittance: 2e-4 };

/** Standard deviation of the blank's level between aliquots; standards were blanked freshly. */
export const aliquotOffsetDeviation = 4e-4;

export const stockRelativeUncertainty = 0.006;
export const standardDilutionRelativeUncertainty = 0.004;
export const aliquotDilutionRelativeUncertainty = 0.005;

/** Where the layout that marks over-range readings stops to print numbers. */
export const overRange = { above: 2.1, mark: 'OVER' };

/**
 * A species without a standard in one aliquot: a Gaussian in wavelength. It moves mono : bis of
 * that aliquot by some 6 %, several times its standard uncertainty, and is plain in the residual.
 */
export const hiddenBand = {
  aliquot: 'r2-a3',
  centreNm: 315,
  standardDeviationNm: 8,
  /** Height, as a share of the largest absorbance of the long-wave band of that aliquot. */
  shareOfLargest: 0.03,
};

export const fitWindowNm: readonly [number, number] = [240, 460];

/** Stands in the head of every file. */
export const inventedNote = 'Invented data: these are not the spectra of the real compounds';
