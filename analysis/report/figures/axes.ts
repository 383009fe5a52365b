import { escaped } from '../html.ts';
import { givenText } from '../numbers.ts';

/** A rectangle on the page and what it shows, for figures as vectors. */
export interface Panel {
  readonly left: number;
  readonly top: number;
  readonly width: number;
  readonly height: number;
  readonly x: readonly [number, number];
  readonly y: readonly [number, number];
}

export function xAt({ left, width, x: [low, high] }: Panel, value: number): number {
  return left + ((value - low) / (high - low)) * width;
}

export function yAt({ top, height, y: [low, high] }: Panel, value: number): number {
  return top + height - ((value - low) / (high - low)) * height;
}

/** Round numbers within a range, about `wanted` of them. */
export function ticks([low, high]: readonly [number, number], wanted: number): number[] {
  const rough = (high - low) / wanted;
  const unit = 10 ** Math.floor(Math.log10(rough));
  const step = [1, 2, 5, 10].map((factor) => factor * unit).find((each) => each >= rough) ?? rough;
  const found: number[] = [];
  for (let k = Math.ceil(low / step); k * step <= high + 1e-9 * step; k++) {
    found.push(Number((k * step).toPrecision(12)));
  }
  return found;
}

/** Frame, grid, ticks and titles of a panel. `xTitle` null leaves the abscissa bare. */
export function axes(panel: Panel, xTitle: string | null, yTitle: string, yTicks = 5): string {
  const { left, top, width, height } = panel;
  const bottom = top + height;
  const horizontal = ticks(panel.y, yTicks).map((value) => {
    const y = yAt(panel, value).toFixed(1);
    return `<line class="grid" x1="${left}" x2="${left + width}" y1="${y}" y2="${y}"/><text class="tick" x="${left - 6}" y="${y}" text-anchor="end" dy="0.32em">${givenText(value)}</text>`;
  });
  const vertical = ticks(panel.x, 6).map((value) => {
    const x = xAt(panel, value).toFixed(1);
    return `<line class="axis" x1="${x}" x2="${x}" y1="${bottom}" y2="${bottom + 4}"/><text class="tick" x="${x}" y="${bottom + 15}" text-anchor="middle">${givenText(value)}</text>`;
  });
  const middle = top + height / 2;
  return [
    ...horizontal,
    `<line class="axis" x1="${left}" x2="${left + width}" y1="${bottom}" y2="${bottom}"/>`,
    ...(xTitle === null ? [] : vertical),
    xTitle === null
      ? ''
      : `<text class="title" x="${left + width / 2}" y="${bottom + 30}" text-anchor="middle">${escaped(xTitle)}</text>`,
    `<text class="title" transform="translate(12 ${middle.toFixed(1)}) rotate(-90)" text-anchor="middle">${escaped(yTitle)}</text>`,
  ].join('');
}

/** Points as the "d" of a path, broken where a value is missing; clipped to the panel's ordinate. */
export function pathOf(panel: Panel, x: Float64Array, y: Float64Array): string {
  let path = '';
  let isDrawing = false;
  for (const [i, nm] of x.entries()) {
    const value = y[i] ?? Number.NaN;
    if (!Number.isFinite(value) || nm < panel.x[0] || nm > panel.x[1]) {
      isDrawing = false;
      continue;
    }
    const clipped = Math.min(Math.max(value, panel.y[0]), panel.y[1]);
    path += `${isDrawing ? 'L' : 'M'}${xAt(panel, nm).toFixed(1)} ${yAt(panel, clipped).toFixed(1)}`;
    isDrawing = true;
  }
  return path;
}

/** The area between two curves, as a closed path over the points where both are there. */
export function areaOf(
  panel: Panel,
  x: Float64Array,
  low: Float64Array,
  high: Float64Array,
): string {
  const there: number[] = [];
  for (const [i, nm] of x.entries()) {
    const isIn = nm >= panel.x[0] && nm <= panel.x[1];
    if (isIn && Number.isFinite(low[i]) && Number.isFinite(high[i])) there.push(i);
  }
  const point =
    (values: Float64Array) =>
    (i: number): string => {
      const value = Math.min(Math.max(values[i] ?? 0, panel.y[0]), panel.y[1]);
      return `${xAt(panel, x[i] ?? 0).toFixed(1)} ${yAt(panel, value).toFixed(1)}`;
    };
  if (there.length < 2) return '';
  return `M${there.map(point(high)).join('L')}L${there.reverse().map(point(low)).join('L')}Z`;
}
