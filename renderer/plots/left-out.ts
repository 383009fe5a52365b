import { leftOut } from '../../analysis/index.ts';

type Mark = 'circle-open' | 'x-thin-open' | 'triangle-up-open' | 'diamond-open';

interface LeftOutLook {
  /** Why a point has no part in the fit, in words. */
  readonly text: string;
  /** Its mark on the plot; null where there is no reading to mark. */
  readonly symbol: Mark | null;
}

/** Each reason has words and a mark of its own, so that none is told by colour alone. */
export const leftOutLooks: ReadonlyMap<number, LeftOutLook> = new Map<number, LeftOutLook>([
  [leftOut.outsideWindow, { text: 'outside the window', symbol: 'circle-open' }],
  [leftOut.excluded, { text: 'excluded', symbol: 'x-thin-open' }],
  [leftOut.missing, { text: 'over range or missing', symbol: null }],
  [
    leftOut.aboveUpperAbsorbance,
    { text: 'above the upper absorbance', symbol: 'triangle-up-open' },
  ],
  [leftOut.noStandard, { text: 'no standard there', symbol: 'diamond-open' }],
]);

/** What became of a point, in words. */
export function pointText(reason: number | undefined): string {
  if (reason === leftOut.used) return 'used';
  return leftOutLooks.get(reason ?? leftOut.missing)?.text ?? 'not used';
}
