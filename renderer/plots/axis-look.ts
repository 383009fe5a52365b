import type { Layout, LayoutAxis } from 'plotly.js-dist-min';
import type { PlotTheme } from './theme.ts';

/** What every axis here looks like. */
export function axisLook(theme: PlotTheme, title: string): Partial<LayoutAxis> {
  return {
    color: theme.soft,
    gridcolor: theme.rule,
    zeroline: false,
    linecolor: theme.rule,
    ticks: 'outside',
    ticklen: 4,
    tickcolor: theme.rule,
    title: { font: { size: 12 }, standoff: 6, text: title },
  };
}

/** The axis of wavelengths, the same on every plot. */
export function wavelengthAxis(
  theme: PlotTheme,
  rangeNm: readonly [number, number],
): Partial<LayoutAxis> {
  return {
    ...axisLook(theme, 'wavelength, nm'),
    range: [...rangeNm],
    showgrid: false,
    hoverformat: '.1f',
    unifiedhovertitle: { text: '%{x} nm' },
    spikecolor: theme.soft,
    spikethickness: 1,
    spikedash: 'dot',
  };
}

/** What every plot here looks like beside its axes. */
export function plotLook(theme: PlotTheme): Partial<Layout> {
  return {
    paper_bgcolor: 'rgba(0,0,0,0)',
    plot_bgcolor: 'rgba(0,0,0,0)',
    font: { family: theme.font, size: 12, color: theme.soft },
    // a thin space between thousands, as everywhere on the sheet
    separators: '.\u2009',
    showlegend: false,
    hovermode: 'x unified',
    hoverlabel: {
      bgcolor: theme.paper,
      bordercolor: theme.rule,
      font: { color: theme.ink, size: 12 },
    },
    dragmode: 'zoom',
  };
}
