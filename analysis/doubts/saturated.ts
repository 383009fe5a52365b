import { pointUse } from '../unmixing/choose-points.ts';
import type { DoubtTest } from './evidence.ts';
import { rangesText, rangesWhere } from './wording.ts';

/** Points of the window that are over range, missing, or above the upper absorbance were left out. */
export const saturated: DoubtTest = ({ crude, unmixing, settings }) => {
  const lost = (i: number): boolean => {
    const reason = unmixing.use[i];
    return reason === pointUse.missing || reason === pointUse.aboveUpperAbsorbance;
  };
  const atNm = rangesWhere(crude.wavelengthNm, lost);
  if (atNm.length === 0) return [];
  const points = unmixing.use.filter((_, i) => lost(i)).length;
  const what = points === 1 ? '1 point' : `${points} points`;
  return [
    {
      code: 'saturated',
      message:
        `${what} at ${rangesText(atNm)} ${points === 1 ? 'is' : 'are'} over range, missing or above an absorbance of ${settings.upperAbsorbance} and left out. ` +
        'The answer rests on the rest of the window; stray light can bend the points next to the gap and move the ratio. ' +
        'Dilute further or take a shorter path length and record again, or narrow the window so that it ends well before them.',
      atNm,
    },
  ];
};
