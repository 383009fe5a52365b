import { shiftSlope, standardsVariance } from '../unmixing/standards-on-points.ts';
import { weightedFit } from '../unmixing/weighted-fit.ts';
import type { DoubtTest, Evidence } from './evidence.ts';
import { strongestBand } from './unexplained-band.ts';
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
  const band = strongestBand(evidence);
  if (band && Math.abs(band.againstNoise) > Math.abs(z)) return [];
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
  /** With lack of fit. */
  readonly sd: number;
  /** Against the noise alone, as a band's z is. */
  readonly z: number;
}

function scoreOf({ crude, unmixing }: Evidence): Score {
  const { fit, at, pathLengthCm, molarAbsorptivity, noise, excess } = unmixing;
  const sd = fit.variance.map(Math.sqrt);
  const columns = fit.whitened.map((column) => column.map((value, i) => value * sd[i]!));
  const slope = shiftSlope(molarAbsorptivity, at, pathLengthCm, fit.parameters);
  const measured = Float64Array.from(at, (i) => crude.values[i]!);
  const free = weightedFit([...columns, slope], measured, noise, (parameters) =>
    standardsVariance(molarAbsorptivity, at, pathLengthCm, parameters),
  );
  const gain = free.gain.at(-1) ?? new Float64Array();
  const shiftNm = free.parameters.at(-1) ?? 0;
  const variance = gain.reduce((sum, value, i) => sum + value * value * free.variance[i]!, 0);
  const lack =
    unmixing.df === Number.POSITIVE_INFINITY ? 1 : Math.min(excess, free.reducedChiSquare);
  return { shiftNm, sd: Math.sqrt(variance * Math.max(lack, 1)), z: shiftNm / Math.sqrt(variance) };
}
