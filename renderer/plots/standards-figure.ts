import type { Annotation, Data } from 'plotly.js-dist-min';
import type { StandardCurves } from '../../analysis/index.ts';
import { axisLook, plotLook, wavelengthAxis } from './axis-look.ts';
import { bandTrace } from './band.ts';
import type { Figure } from './figure.ts';
import { type Box, boxAround, firstClear, type Point } from './label-boxes.ts';
import { speciesColour, speciesDash } from './species-line.ts';
import type { PlotTheme } from './theme.ts';
import type { RangeNm } from './zoom-range.ts';

export interface StandardsFigureInput {
  /** In the order of the absorbing species. */
  readonly standards: readonly StandardCurves[];
  readonly labels: ReadonlyMap<string, string>;
  readonly theme: PlotTheme;
  readonly rangeNm: RangeNm;
  readonly widthPx: number;
  readonly heightPx: number;
}

const margin = { l: 68, r: 18, t: 18, b: 44 } as const;

/** The wavelengths over which there is any standard, with a little room. */
export function standardsRange(standards: readonly StandardCurves[]): RangeNm {
  const ends = standards.flatMap(({ wavelengthNm }) => [
    wavelengthNm[0] ?? Number.NaN,
    wavelengthNm.at(-1) ?? Number.NaN,
  ]);
  const known = ends.filter(Number.isFinite);
  return known.length === 0 ? [0, 1] : [Math.min(...known) - 2, Math.max(...known) + 2];
}

/** Molar absorptivity with its point noise (±2σ) where that can be seen, and each solution by itself. */
export function standardsFigure(input: StandardsFigureInput): Figure {
  const { standards, labels, theme, rangeNm } = input;
  const range = absorptivityRange(standards, rangeNm);
  const data = standards.flatMap((standard, k): Data[] => {
    const colour = speciesColour(k, theme);
    const { species, wavelengthNm, molarAbsorptivity } = standard;
    return [
      ...noiseBand(standard, colour, range[1] - range[0]),
      ...solutionLines(standard, colour),
      {
        type: 'scatter',
        mode: 'lines',
        x: wavelengthNm,
        y: molarAbsorptivity,
        line: { width: 1.8, color: colour, dash: speciesDash(k) },
        name: labels.get(species) ?? species,
        hovertemplate: '%{y:,.0f}',
      },
    ];
  });
  return {
    data,
    layout: {
      ...plotLook(theme),
      margin: { ...margin },
      xaxis: wavelengthAxis(theme, rangeNm),
      yaxis: {
        ...axisLook(theme, 'ε, L mol⁻¹ cm⁻¹'),
        fixedrange: true,
        range,
        tickformat: ',d',
        nticks: 6,
      },
      annotations: peakLabels(input, range),
    },
  };
}

function solutionLines({ solutions }: StandardCurves, colour: string): Data[] {
  return solutions.map(({ standard, wavelengthNm, molarAbsorptivity }) => ({
    type: 'scatter',
    mode: 'lines',
    x: wavelengthNm,
    y: molarAbsorptivity,
    line: { width: 0.7, color: `${colour}59` },
    hoverinfo: 'skip',
    name: standard,
  }));
}

/** A band thinner than this part of the panel hides behind its own line. */
const visiblePart = 0.008;

function noiseBand(
  { wavelengthNm, molarAbsorptivity, noiseSd }: StandardCurves,
  colour: string,
  height: number,
): Data[] {
  const isVisible = noiseSd.some((sd) => 4 * sd > visiblePart * height);
  if (!isVisible) return [];
  const edge = (sign: number): Float64Array =>
    molarAbsorptivity.map((value, i) => value + sign * 2 * (noiseSd[i] ?? Number.NaN));
  return [
    bandTrace(
      { x: wavelengthNm, low: edge(-1), high: edge(1) },
      { name: '±2σ', fillcolor: `${colour}33` },
    ),
  ];
}

function absorptivityRange(
  standards: readonly StandardCurves[],
  [low, high]: RangeNm,
): [number, number] {
  let top = 0;
  let bottom = 0;
  for (const { wavelengthNm, molarAbsorptivity } of standards) {
    for (const [i, nm] of wavelengthNm.entries()) {
      const value = molarAbsorptivity[i] ?? Number.NaN;
      if (nm < low || nm > high || Number.isNaN(value)) continue;
      top = Math.max(top, value);
      bottom = Math.min(bottom, value);
    }
  }
  const height = Math.max(top - bottom, 1);
  return [bottom - 0.03 * height, bottom + 1.09 * height];
}

/** The name of each species at its highest peak, clear of the other curves where there is room. */
function peakLabels(
  { standards, labels, theme, rangeNm, widthPx, heightPx }: StandardsFigureInput,
  [bottom, top]: readonly [number, number],
): Partial<Annotation>[] {
  const panel = {
    width: widthPx - margin.l - margin.r,
    height: heightPx - margin.t - margin.b,
  };
  const curves = standards.map(({ wavelengthNm, molarAbsorptivity }) =>
    Array.from(wavelengthNm, (nm, i) => ({
      x: ((nm - rangeNm[0]) / (rangeNm[1] - rangeNm[0])) * panel.width,
      y: ((top - (molarAbsorptivity[i] ?? Number.NaN)) / (top - bottom)) * panel.height,
    })).filter(({ y }) => !Number.isNaN(y)),
  );
  const taken: Box[] = [];
  return standards.flatMap(({ species }, k) => {
    const text = labels.get(species) ?? species;
    const own = curves[k] ?? [];
    const peak = peakOf(own, panel.width);
    const place = peak && firstClear(text, placesAlong(own, peak), panel, taken, curves);
    if (!place) return [];
    taken.push(boxAround(text, place));
    return [
      {
        x: rangeNm[0] + (place.x / panel.width) * (rangeNm[1] - rangeNm[0]),
        y: top - (place.y / panel.height) * (top - bottom),
        text,
        showarrow: false,
        font: { size: 12, weight: 600, color: speciesColour(k, theme) },
      },
    ];
  });
}

/** The highest top of a curve away from the ends of the panel; where it has none, its highest point. */
function peakOf(curve: readonly Point[], width: number): number | null {
  const inner = Array.from(curve.keys()).filter((i) => {
    const x = curve[i]?.x ?? -1;
    return x > 0.06 * width && x < 0.94 * width;
  });
  const y = (i: number): number => curve[i]?.y ?? Number.POSITIVE_INFINITY;
  const tops = inner.filter((i) => y(i) <= y(i - 1) && y(i) <= y(i + 1));
  const from = tops.length > 0 ? tops : inner;
  return from.length === 0 ? null : from.reduce((best, i) => (y(i) < y(best) ? i : best));
}

const sidewaysPx = [0, 20, -20, 40, -40, 60, -60, 90, -90] as const;
const upPx = [11, 15, 20] as const;

/** Places over a curve, at its peak first and then along it to both sides. */
function placesAlong(curve: readonly Point[], peak: number): Point[] {
  const at = curve[peak];
  if (!at) return [];
  return sidewaysPx.flatMap((side) => {
    const x = at.x + side;
    const near = curve.filter((point) => Math.abs(point.x - x) < 24);
    const highest = Math.min(...near.map(({ y }) => y));
    return Number.isFinite(highest) ? upPx.map((up) => ({ x, y: highest - up })) : [];
  });
}

/** True if two answers hold the same standards, number by number. */
export function sameStandards(a: readonly StandardCurves[], b: readonly StandardCurves[]): boolean {
  if (a === b) return true;
  return (
    a.length === b.length &&
    a.every((one, k) => {
      const other = b[k];
      return (
        other !== undefined &&
        one.species === other.species &&
        sameNumbers(one.wavelengthNm, other.wavelengthNm) &&
        sameNumbers(one.molarAbsorptivity, other.molarAbsorptivity) &&
        sameNumbers(one.noiseSd, other.noiseSd) &&
        one.solutions.length === other.solutions.length &&
        one.solutions.every((solution, s) => {
          const twin = other.solutions[s];
          return (
            twin !== undefined &&
            solution.standard === twin.standard &&
            sameNumbers(solution.wavelengthNm, twin.wavelengthNm) &&
            sameNumbers(solution.molarAbsorptivity, twin.molarAbsorptivity)
          );
        })
      );
    })
  );
}

function sameNumbers(a: Float64Array, b: Float64Array): boolean {
  // a missing value is the same as another missing one
  return a.length === b.length && a.every((value, i) => Object.is(value, b[i]));
}
