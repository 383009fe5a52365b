import type { Annotation, Shape } from 'plotly.js-dist-min';
import type { Doubt } from '../../analysis/index.ts';
import type { PlotTheme } from './theme.ts';
import type { RangeNm } from './zoom-range.ts';

/** Where a doubt lies, with its number in the list of doubts; lane 0 is next to the plot. */
interface Bracket {
  readonly number: number;
  readonly low: number;
  readonly high: number;
  readonly lane: number;
}

/** Height of a lane above the plot, px; the first one fits into the plot's usual margin. */
export const laneHeight = 19;
/** Brackets nearer than this part of the plot's width would run their numbers together. */
const gap = 0.02;

/** The places of the doubts within the range shown; those that would overlap lie above each other. */
export function doubtBrackets(doubts: readonly Doubt[], [from, to]: RangeNm): Bracket[] {
  const apart = gap * (to - from);
  const ends: number[] = [];
  return doubts
    .flatMap(({ atNm = [] }, index) =>
      pairs(atNm).map(([low, high]) => ({ number: index + 1, low, high })),
    )
    .filter(({ low, high }) => high >= from && low <= to)
    .map(({ number, low, high }) => ({
      number,
      low: Math.max(low, from),
      high: Math.min(Math.max(high, low + 1), to),
    }))
    .sort((a, b) => a.low - b.low)
    .map((bracket) => {
      const free = ends.findIndex((end) => end + apart < bracket.low);
      const lane = free === -1 ? ends.length : free;
      ends[lane] = bracket.high;
      return { ...bracket, lane };
    });
}

/** How many lanes the brackets need; at least the one that is always there. */
export function laneCount(brackets: readonly Bracket[]): number {
  return Math.max(1, ...brackets.map(({ lane }) => lane + 1));
}

function pairs(flat: readonly number[]): [number, number][] {
  const found: [number, number][] = [];
  for (let i = 0; i + 1 < flat.length; i += 2) {
    const [low, high] = [flat[i], flat[i + 1]];
    if (low !== undefined && high !== undefined) found.push([low, high]);
  }
  return found;
}

/** A line over the wavelengths of each doubt. @param heightPx of both panels together */
export function bracketShapes(
  brackets: readonly Bracket[],
  theme: PlotTheme,
  heightPx: number,
): Partial<Shape>[] {
  return brackets.map(({ low, high, lane }) => ({
    type: 'line',
    xref: 'x',
    yref: 'paper',
    x0: low,
    x1: high,
    y0: heightOf(lane, heightPx),
    y1: heightOf(lane, heightPx),
    line: { color: theme.doubt, width: 3 },
  }));
}

/** The number of each doubt on its line. @param heightPx of both panels together */
export function bracketNumbers(
  brackets: readonly Bracket[],
  theme: PlotTheme,
  heightPx: number,
): Partial<Annotation>[] {
  return brackets.map(({ number, low, high, lane }) => ({
    x: (low + high) / 2,
    xref: 'x',
    y: heightOf(lane, heightPx),
    yref: 'paper',
    yanchor: 'bottom',
    text: String(number),
    showarrow: false,
    font: { color: theme.doubt, size: 12, weight: 600 },
  }));
}

function heightOf(lane: number, heightPx: number): number {
  return 1 + (6 + lane * laneHeight) / heightPx;
}
