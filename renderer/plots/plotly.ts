import type { Config, Data, Layout, PlotlyHTMLElement } from 'plotly.js-dist-min';

/**
 * The one place where plots are made. Plotly is large: it is loaded after first paint. By default it
 * offers to send a chart to its makers' server; nothing here may (a test holds it to that).
 */
export const plotConfig: Partial<Config> = {
  displayModeBar: false,
  showSendToCloud: false,
  plotlyServerURL: '',
  displaylogo: false,
  showTips: false,
  responsive: false,
  doubleClick: 'reset',
};

type Plotly = typeof import('plotly.js-dist-min').default;

let loading: Promise<Plotly> | null = null;

function plotly(): Promise<Plotly> {
  loading ??= import('plotly.js-dist-min').then((module) => module.default);
  return loading;
}

/** Draws, or draws anew; arrays must be new ones where they changed. */
export async function draw(
  element: HTMLElement,
  data: Data[],
  layout: Partial<Layout>,
): Promise<PlotlyHTMLElement> {
  return (await plotly()).react(element, data, layout, plotConfig);
}

export async function clear(element: HTMLElement): Promise<void> {
  if (loading) (await loading).purge(element);
}

/** A plot of so many px as the address of a picture. */
export async function imageOf(
  data: Data[],
  layout: Partial<Layout>,
  picture: { readonly format: 'svg' | 'png'; readonly width: number; readonly height: number },
): Promise<string> {
  const { width, height, format } = picture;
  return (await plotly()).toImage(
    { data, layout: { ...layout, width, height }, config: plotConfig },
    // without a size here it would take one of its own, whatever the layout says
    { ...picture, scale: format === 'png' ? 2 : 1 },
  );
}
