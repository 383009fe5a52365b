import type { Annotation, Dash, Data, Layout, Shape } from 'plotly.js-dist-min';
import {
  type AliquotCurves,
  type Doubt,
  labelSpot,
  leftOut,
  type Sheet,
  speciesLabel,
  speciesLook,
} from '../../analysis/index.ts';
import type { PlotTheme } from './theme.ts';

export interface FitFigure {
  readonly data: Data[];
  readonly layout: Partial<Layout>;
}

export interface FitFigureInput {
  readonly sheet: Sheet;
  readonly curves: AliquotCurves;
  readonly doubts: readonly Doubt[];
  readonly theme: PlotTheme;
  readonly rangeNm: readonly [number, number];
}

/** Room around the panels, px: the window's handles are placed by it. */
export const margin = { l: 56, r: 18, t: 26, b: 44 } as const;
const upper: [number, number] = [0.27, 1];
const lower: [number, number] = [0, 0.2];

/** The measured curve on the stacked contributions, and the residual with its noise band below. */
export function fitFigure(input: FitFigureInput): FitFigure {
  return {
    data: [...stack(input), ...curvesOf(input), ...residualStrip(input)],
    layout: layoutOf(input),
  };
}

/** Cumulative sums of the contributions, from the baseline up. */
function stack({ sheet, curves, theme }: FitFigureInput): Data[] {
  const x = curves.wavelengthNm;
  let below = curves.baseline;
  const floor: Data = {
    type: 'scatter',
    mode: 'lines',
    x,
    y: below,
    line: { width: 0.8, color: theme.faint },
    name: 'baseline',
    hoverinfo: 'skip',
  };
  const layers = curves.contributions.map(({ species, absorbance }, k): Data => {
    const look = speciesLook(k);
    const colour = theme.isDark ? look.darkColour : look.colour;
    const top = below.map((value, i) => value + (absorbance[i] ?? Number.NaN));
    below = top;
    return {
      type: 'scatter',
      mode: 'lines',
      x,
      y: top,
      fill: 'tonexty',
      fillcolor: `${colour}2e`,
      line: { width: 1.4, color: colour, dash: dashOf(k) },
      name: speciesLabel(sheet, species),
      customdata: absorbance,
      hovertemplate: '%{customdata:.4f}',
    };
  });
  return [floor, ...layers];
}

function curvesOf({ curves, theme }: FitFigureInput): Data[] {
  const { wavelengthNm: x, measured, fitted, use } = curves;
  const where = (holds: (reason: number) => boolean): Float64Array =>
    measured.map((value, i) => (holds(use[i] ?? 0) ? value : Number.NaN));
  return [
    {
      type: 'scatter',
      mode: 'lines',
      x,
      y: fitted.map((value, i) => (use[i] === leftOut.used ? value : Number.NaN)),
      line: { width: 1.2, color: theme.ink },
      name: 'fitted',
      hovertemplate: '%{y:.4f}',
    },
    {
      type: 'scatter',
      mode: 'markers',
      x,
      y: where((reason) => reason !== leftOut.used),
      marker: { size: 4, symbol: 'circle-open', color: theme.faint, line: { width: 1 } },
      name: 'left out',
      hovertemplate: '%{y:.4f}',
    },
    {
      type: 'scatter',
      mode: 'markers',
      x,
      y: where((reason) => reason === leftOut.used),
      marker: { size: 4, color: theme.paper, line: { width: 1.1, color: theme.ink } },
      name: 'measured',
      hovertemplate: '%{y:.4f}',
    },
  ];
}

function residualStrip({ curves, theme }: FitFigureInput): Data[] {
  const { wavelengthNm: x, residual, expectedSd, use } = curves;
  const used = (value: (i: number) => number): Float64Array =>
    residual.map((_, i) => (use[i] === leftOut.used ? 1000 * value(i) : Number.NaN));
  const band = (sign: number) => used((i) => sign * 2 * (expectedSd[i] ?? Number.NaN));
  const edge = { width: 0, color: theme.faint };
  const shared = { type: 'scatter' as const, mode: 'lines' as const, x, yaxis: 'y2' as const };
  return [
    { ...shared, y: band(-1), line: edge, hoverinfo: 'skip', name: '−2σ' },
    {
      ...shared,
      y: band(1),
      line: edge,
      fill: 'tonexty',
      fillcolor: `${theme.faint}33`,
      hoverinfo: 'skip',
      name: '+2σ',
    },
    {
      ...shared,
      y: used((i) => residual[i] ?? Number.NaN),
      line: { width: 1.1, color: theme.ink },
      name: 'residual, mAU',
      hovertemplate: '%{y:.2f}',
    },
  ];
}

function layoutOf(input: FitFigureInput): Partial<Layout> {
  const { theme, rangeNm, curves } = input;
  const axis = {
    color: theme.soft,
    gridcolor: theme.rule,
    zeroline: false,
    linecolor: theme.rule,
    ticks: 'outside' as const,
    ticklen: 4,
    tickcolor: theme.rule,
    title: { font: { size: 12 }, standoff: 6 },
  };
  return {
    margin: { ...margin },
    paper_bgcolor: 'rgba(0,0,0,0)',
    plot_bgcolor: 'rgba(0,0,0,0)',
    font: { family: theme.font, size: 12, color: theme.soft },
    showlegend: false,
    hovermode: 'x unified',
    hoverlabel: {
      bgcolor: theme.paper,
      bordercolor: theme.rule,
      font: { color: theme.ink, size: 12 },
    },
    dragmode: 'zoom',
    xaxis: {
      ...axis,
      range: [...rangeNm],
      anchor: 'y2',
      showgrid: false,
      title: { ...axis.title, text: 'wavelength, nm' },
      hoverformat: '.1f',
      unifiedhovertitle: { text: '%{x} nm' },
    },
    yaxis: {
      ...axis,
      domain: upper,
      range: absorbanceRange(curves),
      title: { ...axis.title, text: 'absorbance' },
    },
    yaxis2: {
      ...axis,
      domain: lower,
      range: residualRange(curves),
      zeroline: true,
      zerolinecolor: theme.rule,
      nticks: 3,
      title: { ...axis.title, text: 'residual, mAU' },
    },
    shapes: [...excludedShapes(input), ...doubtBrackets(input)],
    annotations: [...directLabels(input), ...doubtNumbers(input)],
  };
}

/** From a little under 0 to over the largest absorbance that is seen; a stray spike does not set it. */
function absorbanceRange({ measured, fitted, use }: AliquotCurves): [number, number] {
  let top = 0.05;
  let bottom = 0;
  for (const [i, reason] of use.entries()) {
    const values = reason === leftOut.used ? [measured[i], fitted[i]] : [measured[i]];
    for (const value of values) {
      if (value === undefined || Number.isNaN(value) || value > 4) continue;
      top = Math.max(top, value);
      bottom = Math.min(bottom, value);
    }
  }
  return [bottom - 0.03 * top, 1.08 * top];
}

function residualRange({ residual, expectedSd, use }: AliquotCurves): [number, number] {
  let reach = 0.5;
  for (const [i, reason] of use.entries()) {
    if (reason !== leftOut.used) continue;
    // the band may flare where little light passes; it need not be seen to its end
    reach = Math.max(
      reach,
      1000 * Math.abs(residual[i] ?? 0),
      1000 * Math.min(2.2 * (expectedSd[i] ?? 0), 0.004),
    );
  }
  return [-1.1 * reach, 1.1 * reach];
}

function excludedShapes({ sheet, curves, theme }: FitFigureInput): Partial<Shape>[] {
  const excluded = (sheet.fit?.excludeNm ?? []).map(([from, to]) => [from, to] as const);
  const lost = runsOf(
    curves,
    (reason) => reason === leftOut.missing || reason === leftOut.aboveUpperAbsorbance,
  );
  return [...excluded, ...lost].map(([x0, x1]) => ({
    type: 'rect',
    xref: 'x',
    yref: 'paper',
    x0: x0 - 0.5,
    x1: x1 + 0.5,
    y0: 0,
    y1: 1,
    fillcolor: `${theme.faint}22`,
    line: { width: 1, color: theme.rule, dash: 'dot' },
    layer: 'below',
  }));
}

function runsOf(
  { wavelengthNm, use }: AliquotCurves,
  holds: (reason: number) => boolean,
): (readonly [number, number])[] {
  const runs: [number, number][] = [];
  let isInside = false;
  for (const [i, nm] of wavelengthNm.entries()) {
    const here = holds(use[i] ?? 0);
    const last = runs.at(-1);
    if (here && isInside && last) last[1] = nm;
    else if (here) runs.push([nm, nm]);
    isInside = here;
  }
  return runs;
}

function rangesOf(doubts: readonly Doubt[]): { number: number; low: number; high: number }[] {
  return doubts.flatMap(({ atNm = [] }, index) => {
    const found: { number: number; low: number; high: number }[] = [];
    for (let i = 0; i + 1 < atNm.length; i += 2) {
      const [low, high] = [atNm[i], atNm[i + 1]];
      if (low !== undefined && high !== undefined) found.push({ number: index + 1, low, high });
    }
    return found;
  });
}

function doubtBrackets({ doubts, theme }: FitFigureInput): Partial<Shape>[] {
  return rangesOf(doubts).map(({ low, high }) => ({
    type: 'line',
    xref: 'x',
    yref: 'paper',
    x0: low,
    x1: high === low ? high + 1 : high,
    y0: 1.015,
    y1: 1.015,
    line: { color: theme.doubt, width: 3 },
  }));
}

function doubtNumbers({ doubts, theme }: FitFigureInput): Partial<Annotation>[] {
  return rangesOf(doubts).map(({ number, low, high }) => ({
    x: (low + high) / 2,
    xref: 'x',
    y: 1.02,
    yref: 'paper',
    yanchor: 'bottom',
    text: String(number),
    showarrow: false,
    font: { color: theme.doubt, size: 12, weight: 600 },
  }));
}

/** The name of each species on its own layer, where it is thickest for what lies around it. */
function directLabels({ sheet, curves, theme, rangeNm }: FitFigureInput): Partial<Annotation>[] {
  const [, top] = absorbanceRange(curves);
  const placed: { x: number; y: number }[] = [];
  return curves.contributions.flatMap(({ species, absorbance }, k) => {
    const spot = labelSpot(curves, k, rangeNm, top, placed);
    if (!spot) return [];
    placed.push(spot);
    const look = speciesLook(k);
    const isThin = (absorbance[spot.index] ?? 0) < 0.055 * top;
    return [
      {
        x: spot.x,
        y: spot.y,
        xref: 'x' as const,
        yref: 'y' as const,
        text: speciesLabel(sheet, species),
        showarrow: isThin,
        arrowhead: 0,
        arrowwidth: 1,
        arrowcolor: theme.isDark ? look.darkColour : look.colour,
        ax: 26,
        ay: -30,
        bgcolor: `${theme.paper}d9`,
        borderpad: 1,
        font: { color: theme.isDark ? look.darkColour : look.colour, size: 12, weight: 600 },
      },
    ];
  });
}

const dashes: readonly Dash[] = ['solid', 'dash', 'dot', 'dashdot', 'longdash', 'longdashdot'];

/** The line pattern that goes with a species' place, as plotly names patterns. */
export function dashOf(index: number): Dash {
  return dashes[index % dashes.length] ?? 'solid';
}
