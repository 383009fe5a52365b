import type { Data } from 'plotly.js-dist-min';

interface Band {
  readonly x: Float64Array;
  readonly low: Float64Array;
  readonly high: Float64Array;
}

/**
 * The area between two curves, an outline of its own for each stretch without a gap. Plotly's fill
 * from one trace to the next runs across gaps and shows an area that is not there.
 */
export function bandOutlines({ x, low, high }: Band): { x: number[]; y: number[] } {
  const outline: { x: number[]; y: number[] } = { x: [], y: [] };
  let stretch: number[] = [];
  const close = (): void => {
    if (stretch.length > 1) {
      const back = [...stretch].reverse();
      const first = stretch[0] ?? 0;
      const ys = [...stretch.map((i) => high[i]), ...back.map((i) => low[i]), high[first]];
      const xs = [...stretch, ...back, first].map((i) => x[i]);
      // a gap parts one outline from the next
      outline.x.push(...xs.map((value = Number.NaN) => value), Number.NaN);
      outline.y.push(...ys.map((value = Number.NaN) => value), Number.NaN);
    }
    stretch = [];
  };
  for (const i of x.keys()) {
    if (Number.isNaN(low[i]) || Number.isNaN(high[i])) close();
    else stretch.push(i);
  }
  close();
  return outline;
}

interface BandLook {
  readonly name: string;
  readonly fillcolor: string;
  /** The panel's ordinate, where it is not the first. */
  readonly yaxis?: 'y2';
}

export function bandTrace(band: Band, look: BandLook): Data {
  const { x, y } = bandOutlines(band);
  return {
    ...look,
    type: 'scatter',
    mode: 'lines',
    x: Float64Array.from(x),
    y: Float64Array.from(y),
    fill: 'toself',
    line: { width: 0 },
    hoverinfo: 'skip',
  };
}
