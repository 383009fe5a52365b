import { type AliquotCurves, leftOut } from '../../analysis/index.ts';
import type { RangeNm } from './zoom-range.ts';

/** A reading above this is a spike or light that does not get through: it sets no axis. */
const highestReading = 4;

/** Of the upper panel: all that is seen of the curves, from a little under 0. */
export function absorbanceRange(curves: AliquotCurves, rangeNm: RangeNm): [number, number] {
  const { measured, fitted, use } = curves;
  let top = 0;
  let bottom = 0;
  for (const i of shownPoints(curves, rangeNm)) {
    const values = use[i] === leftOut.used ? [measured[i], fitted[i]] : [measured[i]];
    for (const value of values) {
      if (value === undefined || Number.isNaN(value) || value > highestReading) continue;
      top = Math.max(top, value);
      bottom = Math.min(bottom, value);
    }
  }
  const height = Math.max(top - bottom, 0.005);
  return [bottom - 0.03 * height, bottom + 1.08 * height];
}

/** The part of the points whose residual and band decide the strip: a steep edge may lie beyond it. */
const heard = 0.94;
const smallestReachMau = 0.5;

/** Of the residual strip, mAU, alike to both sides. */
export function residualRange(curves: AliquotCurves, rangeNm: RangeNm): [number, number] {
  const { residual, expectedSd, use } = curves;
  const sizes = shownPoints(curves, rangeNm)
    .filter((i) => use[i] === leftOut.used)
    .map((i) => 1000 * Math.max(Math.abs(residual[i] ?? 0), 2 * (expectedSd[i] ?? 0)))
    .filter(Number.isFinite)
    .sort((a, b) => a - b);
  const typical = sizes[Math.floor(heard * (sizes.length - 1))] ?? 0;
  const reach = 1.25 * Math.max(typical, smallestReachMau);
  return [-reach, reach];
}

/** A round number that fits into the strip twice, for its ticks: 1, 2 or 5 times a power of ten. */
export function residualTick(reach: number): number {
  const power = 10 ** Math.floor(Math.log10(reach));
  const step = [5, 2, 1].find((each) => each * power <= reach) ?? 1;
  // digits as written: 2 × 0.1 is 0.2
  return Number((step * power).toPrecision(1));
}

function shownPoints({ wavelengthNm }: AliquotCurves, [low, high]: RangeNm): number[] {
  return Array.from(wavelengthNm.keys()).filter((i) => {
    const nm = wavelengthNm[i] ?? Number.NaN;
    return nm >= low && nm <= high;
  });
}
