import type { Unmixing } from '../unmixing/unmix.ts';
import type { DoubtTest, Evidence } from './evidence.ts';
import { nmText, percentText, rangesText, rangesWhere } from './wording.ts';

/** One-sided, 0.13 % of spectra without stray light. */
const limit = 3;
/** Less stray light than this is within what any instrument has, and bends nothing that is fitted. */
const smallestOfNote = 5e-5;
/** Readings of at least this share of the largest stand first in what stray light flattens. */
const flattened = 0.8;

/**
 * Score test of stray light where the sheet does not fit it: a plateau below `upperAbsorbance` that no
 * amount of any species makes. Raised as `saturated`: strong absorbance reads too low.
 */
export const strayLight: DoubtTest = (evidence) => {
  const { unmixing } = evidence;
  const { strayLightHint: hint, shiftHint, band } = unmixing;
  if (!hint || !(hint.value > Math.max(limit * hint.sd, smallestOfNote))) return [];
  if (band && Math.abs(band.z) > hint.z) return [];
  if (shiftHint && Math.abs(shiftHint.z) > hint.z) return [];
  const atNm = flattenedAt(evidence, unmixing);
  return [
    {
      code: 'saturated',
      message:
        `Strong absorbance reads too low at ${rangesText(atNm)} (the largest at ${nmText(peakNm(evidence))} nm), as about ${percentText(hint.value)} of stray light would make it. ` +
        'Amounts of what absorbs there come out too small, and leaving these points out does not bring the interval back. ' +
        'State the stray light of the instrument or let the fit find it (stray light: found by the fit), or dilute further and record again.',
      atNm,
    },
  ];
};

function flattenedAt({ crude }: Evidence, { at, measured }: Unmixing): number[] {
  const largest = measured.reduce((most, value) => Math.max(most, value), 0);
  const high = new Set(Array.from(at).filter((_, j) => (measured[j] ?? 0) > flattened * largest));
  return rangesWhere(crude.wavelengthNm, (i) => high.has(i));
}

function peakNm({ crude, unmixing: { at, measured } }: Evidence): number {
  const peak = measured.reduce((best, value, j) => (value > (measured[best] ?? 0) ? j : best), 0);
  return crude.wavelengthNm[at[peak] ?? 0] ?? 0;
}
