import type { Layout, Shape } from 'plotly.js-dist-min';
import { type AliquotCurves, type Doubt, leftOut } from '../../analysis/index.ts';
import { axisLook, plotLook, wavelengthAxis } from './axis-look.ts';
import {
  bracketNumbers,
  bracketShapes,
  doubtBrackets,
  laneCount,
  laneHeight,
} from './doubt-brackets.ts';
import type { Figure, FitFigureInput } from './figure.ts';
import { contributionLabels } from './fit-labels.ts';
import { absorbanceRange, residualRange, residualTick } from './fit-ranges.ts';
import { curveTraces, residualTraces, stackTraces } from './fit-traces.ts';
import type { RangeNm } from './zoom-range.ts';

interface Margin {
  readonly l: number;
  readonly r: number;
  readonly t: number;
  readonly b: number;
}

/** Room around the panels, px: what lies over the plot is placed by it. */
export function fitMargin(doubts: readonly Doubt[], rangeNm: RangeNm): Margin {
  const lanes = laneCount(doubtBrackets(doubts, rangeNm));
  return { l: 60, r: 18, t: 28 + (lanes - 1) * laneHeight, b: 44 };
}

const upper: [number, number] = [0.3, 1];
const lower: [number, number] = [0, 0.23];

/** The measured curve on the stacked contributions, and the residual with its noise band below. */
export function fitFigure(input: FitFigureInput): Figure {
  return {
    data: [...stackTraces(input), ...curveTraces(input), ...residualTraces(input)],
    layout: layoutOf(input),
  };
}

function layoutOf(input: FitFigureInput): Partial<Layout> {
  const { theme, rangeNm, curves, doubts, widthPx, heightPx } = input;
  const margin = fitMargin(doubts, rangeNm);
  const brackets = doubtBrackets(doubts, rangeNm);
  const panels = {
    width: widthPx - margin.l - margin.r,
    height: heightPx - margin.t - margin.b,
  };
  const upperPanel = { width: panels.width, height: panels.height * (upper[1] - upper[0]) };
  const strip = residualRange(curves, rangeNm);
  const tick = residualTick(strip[1]);
  // zooming is along the wavelengths alone; both panels follow what is seen
  const followed = { fixedrange: true } as const;
  return {
    ...plotLook(theme),
    margin: { ...margin },
    hoversubplots: 'axis',
    xaxis: { ...wavelengthAxis(theme, rangeNm), anchor: 'y2' },
    yaxis: {
      ...axisLook(theme, 'absorbance'),
      ...followed,
      domain: upper,
      range: absorbanceRange(curves, rangeNm),
    },
    yaxis2: {
      ...axisLook(theme, 'residual, mAU'),
      // without a fit there is no residual, and no scale for one
      visible: curves.contributions.length > 0,
      ...followed,
      domain: lower,
      range: strip,
      zeroline: true,
      zerolinecolor: theme.rule,
      tickmode: 'array',
      tickvals: [-tick, 0, tick],
      ticktext: [`−${tick}`, '0', `${tick}`],
    },
    shapes: [...leftOutShapes(input), ...bracketShapes(brackets, theme, panels.height)],
    annotations: [
      ...contributionLabels(input, upperPanel),
      ...bracketNumbers(brackets, theme, panels.height),
    ],
  };
}

const shadedReasons: readonly number[] = [
  leftOut.missing,
  leftOut.aboveUpperAbsorbance,
  leftOut.noStandard,
];

/** Shading behind what is excluded and behind runs of points that cannot be used. */
function leftOutShapes({ excludeNm, curves, theme }: FitFigureInput): Partial<Shape>[] {
  return [...excludeNm, ...unusableRanges(curves)].map(([x0, x1]) => ({
    type: 'rect',
    xref: 'x',
    yref: 'paper',
    x0,
    x1,
    y0: 0,
    y1: 1,
    fillcolor: `${theme.faint}22`,
    line: { width: 1, color: theme.faint, dash: 'dot' },
    layer: 'below',
  }));
}

/** Runs of points that cannot be used, to half-way to their neighbours. */
function unusableRanges({ wavelengthNm, use }: AliquotCurves): RangeNm[] {
  const runs: [number, number][] = [];
  let isInside = false;
  for (const [i, nm] of wavelengthNm.entries()) {
    const isHere = shadedReasons.includes(use[i] ?? leftOut.used);
    const from = (nm + (wavelengthNm[i - 1] ?? nm)) / 2;
    const to = (nm + (wavelengthNm[i + 1] ?? nm)) / 2;
    const last = runs.at(-1);
    if (isHere && isInside && last) last[1] = to;
    else if (isHere) runs.push([from, to]);
    isInside = isHere;
  }
  return runs;
}
