import type { Panel } from './axes.ts';

const spacing = 7;

/** Slanting lines over a rectangle, as the "d" of a path: no pattern by reference, so that each figure stands alone. */
export function hatchedPath({
  left,
  top,
  width,
  height,
}: Pick<Panel, 'left' | 'top' | 'width' | 'height'>): string {
  const [right, bottom] = [left + width, top + height];
  let path = '';
  // lines x + y = sum, on a raster of the whole figure, so that neighbours continue one another
  const first = Math.ceil((left + top) / spacing) * spacing;
  for (let sum = first; sum <= right + bottom; sum += spacing) {
    const [x1, x2] = [Math.max(left, sum - bottom), Math.min(right, sum - top)];
    if (x2 <= x1) continue;
    path += `M${x1.toFixed(1)} ${(sum - x1).toFixed(1)}L${x2.toFixed(1)} ${(sum - x2).toFixed(1)}`;
  }
  return path;
}
