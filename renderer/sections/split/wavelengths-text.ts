import { numberText } from '../../../analysis/index.ts';

const most = 4;

/** Ranges laid end to end as people write them: "298–330 nm", "300, 310–312 nm"; many are counted. */
export function wavelengthsText(atNm: readonly number[]): string {
  const ranges: string[] = [];
  for (let i = 0; i + 1 < atNm.length; i += 2) {
    const [low, high] = [figure(atNm[i]), figure(atNm[i + 1])];
    ranges.push(low === high ? low : `${low}–${high}`);
  }
  const shown = ranges.slice(0, most).join(', ');
  const rest = ranges.length - most;
  return rest > 0 ? `${shown} nm and ${rest} more` : `${shown} nm`;
}

/** Instruments step by tenths at the finest. */
function figure(nm = Number.NaN): string {
  return numberText(nm, Number.isInteger(nm) ? 0 : 1);
}
