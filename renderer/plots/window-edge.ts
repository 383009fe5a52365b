import type { RangeNm } from './zoom-range.ts';

/** 0 is the lower edge of a window, 1 the upper one. */
export type Side = 0 | 1;

/** The window with one edge elsewhere. */
export function movedEdge(windowNm: RangeNm, side: Side, nm: number): RangeNm {
  return side === 0 ? [nm, windowNm[1]] : [windowNm[0], nm];
}

/** Where an edge may go: within the spectrum, and at least 1 nm from the other edge. */
export function edgeLimits(windowNm: RangeNm, limitsNm: RangeNm, side: Side): RangeNm {
  if (side === 0)
    return [limitsNm[0], Math.max(Math.min(windowNm[1], limitsNm[1]) - 1, limitsNm[0])];
  return [Math.min(Math.max(windowNm[0], limitsNm[0]) + 1, limitsNm[1]), limitsNm[1]];
}

const steps: Readonly<Record<string, number>> = {
  ArrowLeft: -1,
  ArrowDown: -1,
  ArrowRight: 1,
  ArrowUp: 1,
  PageDown: -10,
  PageUp: 10,
};

/** Where a key takes an edge, nm; null where the key is not for it. Arrows step 1 nm, with shift 10. */
export function keyTarget(
  key: string,
  isShifted: boolean,
  nm: number,
  [least, most]: RangeNm,
): number | null {
  if (key === 'Home') return least;
  if (key === 'End') return most;
  const step = steps[key];
  if (step === undefined) return null;
  return nm + step * (isShifted && Math.abs(step) === 1 ? 10 : 1);
}
