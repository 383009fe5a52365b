import type { Data } from 'plotly.js-dist-min';
import { leftOut } from '../../analysis/index.ts';
import { bandTrace } from './band.ts';
import type { FitFigureInput } from './figure.ts';
import { residualRange } from './fit-ranges.ts';
import { leftOutLooks } from './left-out.ts';
import { speciesColour, speciesDash } from './species-line.ts';

/** Each contribution on those before it, from the baseline up. */
export function stackTraces({ labels, curves, theme }: FitFigureInput): Data[] {
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
  const layers = curves.contributions.map(({ species, absorbance }, k): [Data, Data] => {
    const colour = speciesColour(k, theme);
    const name = labels.get(species) ?? species;
    const low = below;
    const high = low.map((value, i) => value + (absorbance[i] ?? Number.NaN));
    below = high;
    const line: Data = {
      type: 'scatter',
      mode: 'lines',
      x,
      y: high,
      line: { width: 1.4, color: colour, dash: speciesDash(k) },
      name,
      customdata: absorbance,
      hovertemplate: '%{customdata:.4f}',
    };
    return [bandTrace({ x, low, high }, { name: `${name}, area`, fillcolor: `${colour}2e` }), line];
  });
  return [floor, ...layers.map(([area]) => area), ...layers.map(([, line]) => line)];
}

/** The fitted line, the points it is fitted to, and those that are left out, by reason. */
export function curveTraces({ curves, theme }: FitFigureInput): Data[] {
  const { wavelengthNm: x, measured, fitted, use } = curves;
  const where = (reason: number, of = measured): Float64Array =>
    of.map((value, i) => (use[i] === reason ? value : Number.NaN));
  const leftOutTraces = [...leftOutLooks].flatMap(([reason, { text, symbol }]): Data[] =>
    symbol === null || !use.includes(reason)
      ? []
      : [
          {
            type: 'scatter',
            mode: 'markers',
            x,
            y: where(reason),
            marker: { size: 5, symbol, color: theme.faint, line: { width: 1, color: theme.faint } },
            name: text,
            hovertemplate: '%{y:.4f}',
          },
        ],
  );
  return [
    {
      type: 'scatter',
      mode: 'lines',
      x,
      y: where(leftOut.used, fitted),
      line: { width: 1.2, color: theme.ink },
      name: 'fitted',
      hovertemplate: '%{y:.4f}',
    },
    ...leftOutTraces,
    {
      type: 'scatter',
      mode: 'markers',
      x,
      y: where(leftOut.used),
      marker: { size: 4, color: theme.paper, line: { width: 1.1, color: theme.ink } },
      name: 'measured',
      hovertemplate: '%{y:.4f}',
    },
  ];
}

/** The residual on its ±2σ band, mAU; what lies beyond the strip is marked at its edge. */
export function residualTraces({ curves, theme, rangeNm }: FitFigureInput): Data[] {
  const { wavelengthNm: x, residual, expectedSd, use } = curves;
  const used = (value: (i: number) => number): Float64Array =>
    residual.map((_, i) => (use[i] === leftOut.used ? 1000 * value(i) : Number.NaN));
  const band = (sign: number) => used((i) => sign * 2 * (expectedSd[i] ?? Number.NaN));
  const values = used((i) => residual[i] ?? Number.NaN);
  const shared = { type: 'scatter' as const, x, yaxis: 'y2' as const };
  const [, reach] = residualRange(curves, rangeNm);
  const beyond = (symbol: 'triangle-up' | 'triangle-down', side: 1 | -1): Data[] => {
    const y = values.map((value) => (side * value > reach ? side * 0.93 * reach : Number.NaN));
    const marker = { size: 6, symbol, color: theme.ink };
    return y.every(Number.isNaN)
      ? []
      : [{ ...shared, mode: 'markers', y, marker, hoverinfo: 'skip', name: 'beyond the strip' }];
  };
  return [
    bandTrace(
      { x, low: band(-1), high: band(1) },
      { name: '±2σ', fillcolor: `${theme.faint}40`, yaxis: 'y2' },
    ),
    {
      ...shared,
      mode: 'lines',
      y: values,
      line: { width: 1.1, color: theme.ink },
      name: 'residual, mAU',
      hovertemplate: '%{y:.2f}',
    },
    ...beyond('triangle-up', 1),
    ...beyond('triangle-down', -1),
  ];
}
