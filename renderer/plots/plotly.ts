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

/** What is being drawn into each element: drawing and clearing take turns, plotly cannot do both at once. */
const turns = new WeakMap<HTMLElement, Promise<unknown>>();

/** Draws, or draws anew; arrays must be new ones where they changed. */
export function draw(
  element: HTMLElement,
  data: Data[],
  layout: Partial<Layout>,
): Promise<PlotlyHTMLElement> {
  const react = async () => (await plotly()).react(element, data, layout, plotConfig);
  const turn = (turns.get(element) ?? Promise.resolve()).then(react, react);
  turns.set(element, turn);
  return turn;
}

export function clear(element: HTMLElement): Promise<void> {
  const purge = async () => (loading ? (await loading).purge(element) : undefined);
  const turn = (turns.get(element) ?? Promise.resolve()).then(purge, purge);
  turns.set(element, turn);
  return turn;
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
