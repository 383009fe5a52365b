import { type AliquotCurves, leftOut } from '../../split/results.ts';
import { type Panel, xAt } from './axes.ts';
import { hatchedPath } from './hatched.ts';

const hatched: readonly number[] = [
  leftOut.excluded,
  leftOut.missing,
  leftOut.aboveUpperAbsorbance,
  leftOut.noStandard,
];

/** Hatching over the wavelengths that were left out of the window, and a line at each end of what was fitted. */
export function leftOutSvg(curves: AliquotCurves, upper: Panel, lower: Panel): string {
  const { wavelengthNm, use } = curves;
  const [top, bottom] = [upper.top, lower.top + lower.height];
  const areas = leftOutRanges(curves).map(([low, high]) => {
    const left = Math.max(xAt(upper, low), upper.left);
    const width = Math.min(xAt(upper, high), upper.left + upper.width) - left;
    const area = { left, top, width, height: bottom - top };
    return `<rect class="out" x="${left.toFixed(1)}" y="${top}" width="${width.toFixed(1)}" height="${bottom - top}"/><path class="hatch" d="${hatchedPath(area)}"/>`;
  });
  const used = Array.from(wavelengthNm).filter((_, i) => use[i] === leftOut.used);
  const ends = use.includes(leftOut.outsideWindow) ? [used[0], used.at(-1)] : [];
  const edges = ends.map((nm) => {
    if (nm === undefined) return '';
    const x = xAt(upper, nm).toFixed(1);
    return `<line class="window-edge" x1="${x}" x2="${x}" y1="${top}" y2="${bottom}"/>`;
  });
  return areas.join('') + edges.join('');
}

/** [low, high] in nm, half a step beyond the first and last point of each stretch. */
function leftOutRanges({ wavelengthNm, use }: AliquotCurves): [number, number][] {
  const ranges: [number, number][] = [];
  let isInside = false;
  for (const [i, nm] of wavelengthNm.entries()) {
    const here = hatched.includes(use[i] ?? leftOut.used);
    const before = (nm - (wavelengthNm[i - 1] ?? nm - 1)) / 2;
    const after = ((wavelengthNm[i + 1] ?? nm + 1) - nm) / 2;
    const last = ranges.at(-1);
    if (here && isInside && last) last[1] = nm + after;
    else if (here) ranges.push([nm - before, nm + after]);
    isInside = here;
  }
  return ranges;
}
