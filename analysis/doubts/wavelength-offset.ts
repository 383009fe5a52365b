import { correlate } from '../spectrum/correlated-noise.ts';
import { dot, orthonormal, projectedOut } from '../spectrum/vectors.ts';
import { shiftSlope } from '../unmixing/standards-on-points.ts';
import type { DoubtTest, Evidence } from './evidence.ts';
import { twoFigures } from './wording.ts';

/** Two-sided; far out, because the noise of the standards leans on the slope too. */
const limit = 4;
/** An offset smaller than this does no harm that matters. nm */
const smallestOfNote = 0.02;

/**
 * Score test of a wavelength offset between crude and standards: how far the slope of the model
 * wants to come in, where the sheet holds the offset at none; where it is free, whether it is more
 * than its uncertainty and an instrument's tolerance.
 */
export const wavelengthOffset: DoubtTest = (evidence) => {
  const { settings } = evidence;
  if (settings.shift === 'common') return [];
  const { shiftNm, sd, z } = scoreOf(evidence);
  if (!(Math.abs(shiftNm) > Math.max(limit * sd, smallestOfNote))) return [];
  // a missing species leans on the slope too: where a band explains more, it is the band
  const { band } = evidence.unmixing;
  if (band && Math.abs(band.z) > Math.abs(z)) return [];
  return [
    {
      code: 'wavelength-offset',
      message:
        `Crude and standards disagree in wavelength by about ${twoFigures(shiftNm)} nm (standard uncertainty ${twoFigures(sd)} nm). ` +
        'An offset of 0.3 nm can move a ratio by several percent. ' +
        'Let the fit find the offset (wavelength offset: common), and check the wavelength scale with a line source or a holmium standard.',
    },
  ];
};

interface Score {
  readonly shiftNm: number;
  readonly sd: number;
  /** Against independent noise, as a band's z is. */
  readonly z: number;
}

/** One Gauss-Newton step from no offset, with the noise's correlation and level in its uncertainty. */
function scoreOf({ unmixing }: Evidence): Score {
  const { fit, at, pathLengthCm, molarAbsorptivity, correlation, instrumentLevel } = unmixing;
  const sd = fit.variance.map(Math.sqrt);
  const slope = shiftSlope(molarAbsorptivity, at, pathLengthCm, fit.parameters);
  const whitened = slope.map((value, i) => value / sd[i]!);
  const rest = projectedOut(orthonormal(fit.whitened), whitened);
  const squares = dot(rest, rest);
  const shiftNm =
    dot(
      rest,
      fit.residual.map((value, i) => value / sd[i]!),
    ) / squares;
  const variance = (instrumentLevel * dot(rest, correlate(correlation.rho, rest))) / squares ** 2;
  return { shiftNm, sd: Math.sqrt(variance), z: shiftNm * Math.sqrt(squares) };
}
