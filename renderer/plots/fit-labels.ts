import type { Annotation } from 'plotly.js-dist-min';
import { labelSpot } from '../../analysis/index.ts';
import type { FitFigureInput } from './figure.ts';
import { absorbanceRange } from './fit-ranges.ts';
import { type Box, boxAround, firstClear, type Point } from './label-boxes.ts';
import { speciesColour } from './species-line.ts';

interface Panel {
  readonly width: number;
  readonly height: number;
}

/** A layer at least so thick has room for its name, px. */
const thickEnough = 22;
const sideways = [0, 34, -34, 68, -68] as const;
const upwards = [20, 36, 52, 68, 84, 100] as const;

/**
 * The name of each species on its own layer where that is thick enough, else above all curves with a
 * line down to the layer: never over what was measured.
 */
export function contributionLabels(input: FitFigureInput, panel: Panel): Partial<Annotation>[] {
  const { curves, rangeNm, labels, theme } = input;
  const [bottom, top] = absorbanceRange(curves, rangeNm);
  const pixels = pixelsOf(panel, rangeNm, [bottom, top]);
  const measured = Array.from(curves.wavelengthNm, (nm, i) =>
    pixels(nm, curves.measured[i] ?? Number.NaN),
  ).filter(({ y }) => !Number.isNaN(y));
  const spots: { x: number; y: number }[] = [];
  const taken: Box[] = [];
  return curves.contributions.flatMap(({ species, absorbance }, k) => {
    const spot = labelSpot(curves, k, rangeNm, top, spots);
    if (!spot) return [];
    spots.push(spot);
    const text = labels.get(species) ?? species;
    const at = pixels(spot.x, spot.y);
    const thickness = ((absorbance[spot.index] ?? 0) / (top - bottom)) * panel.height;
    const inside = thickness >= thickEnough ? [at] : [];
    const place = firstClear(text, [...inside, ...placesAbove(at, measured)], panel, taken, [
      measured,
    ]);
    if (!place) return [];
    taken.push(boxAround(text, place));
    const isOnLayer = place.x === at.x && place.y === at.y;
    const colour = speciesColour(k, theme);
    return [
      {
        x: spot.x,
        y: spot.y,
        xref: 'x' as const,
        yref: 'y' as const,
        text,
        showarrow: !isOnLayer,
        arrowhead: 0,
        arrowwidth: 1,
        arrowcolor: colour,
        ax: place.x - at.x,
        ay: place.y - at.y,
        bgcolor: `${theme.paper}d9`,
        borderpad: 1,
        font: { color: colour, size: 12, weight: 600 },
      },
    ];
  });
}

/** Places over the measured curve near a point, nearest first. */
function placesAbove(at: Point, measured: readonly Point[]): Point[] {
  return upwards.flatMap((up) =>
    sideways.map((side) => {
      const x = at.x + side;
      const near = measured.filter((point) => Math.abs(point.x - x) < 34);
      const highest = Math.min(at.y, ...near.map(({ y }) => y));
      return { x, y: highest - up };
    }),
  );
}

function pixelsOf(
  { width, height }: Panel,
  [left, right]: readonly [number, number],
  [bottom, top]: readonly [number, number],
): (nm: number, absorbance: number) => Point {
  return (nm, absorbance) => ({
    x: ((nm - left) / (right - left)) * width,
    y: ((top - absorbance) / (top - bottom)) * height,
  });
}
