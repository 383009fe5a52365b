import type { DoubtTest } from './evidence.ts';
import { twoFigures } from './wording.ts';

/** Two-sided; far out, because the noise of the standards leans on the slope too. */
const limit = 4;
/** An offset smaller than this does no harm that matters. nm */
const smallestOfNote = 0.02;

/**
 * Score test of a wavelength offset between crude and standards: how far the slope of the model
 * wants to come in, where the sheet holds the offset at none.
 */
export const wavelengthOffset: DoubtTest = ({ unmixing: { shiftHint, strayLightHint, band } }) => {
  if (!shiftHint) return [];
  const { value, sd, z } = shiftHint;
  if (!(Math.abs(value) > Math.max(limit * sd, smallestOfNote))) return [];
  // a missing species or stray light leans on the slope too: where one explains more, it is that
  if (band && Math.abs(band.z) > Math.abs(z)) return [];
  if (strayLightHint && Math.abs(strayLightHint.z) > Math.abs(z)) return [];
  return [
    {
      code: 'wavelength-offset',
      message:
        `Crude and standards disagree in wavelength by about ${twoFigures(value)} nm (standard uncertainty ${twoFigures(sd)} nm). ` +
        'An offset of 0.3 nm can move a ratio by several percent. ' +
        'Let the fit find the offset (wavelength offset: common), and check the wavelength scale with a line source or a holmium standard.',
    },
  ];
};
