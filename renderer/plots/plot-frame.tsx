import type { Layout, PlotlyHTMLElement, Shape } from 'plotly.js-dist-min';
import type { ComponentChildren } from 'preact';
import { useEffect, useMemo, useRef, useState } from 'preact/hooks';
import { tellFault } from '../state/notices.ts';
import { latestOnly } from '../worker/latest.ts';
import type { Figure } from './figure.ts';
import './plot-frame.css';
import { clear, draw, imageOf } from './plotly.ts';
import { type PlotTheme, paperTheme, plotTheme } from './theme.ts';
import type { RangeNm } from './zoom-range.ts';

interface PlotFrameProps {
  /** What a screen reader says of it. */
  readonly label: string;
  /** For the file of an exported picture. */
  readonly name: string;
  readonly height: number;
  /** Draws itself anew only where this function is a new one. */
  readonly figure: (widthPx: number, theme: PlotTheme) => Figure;
  /** The same numbers as a table. */
  readonly table: () => ComponentChildren;
  /** Lies over the plot; told the plot's width in px. */
  readonly overlay?: (width: number) => ComponentChildren;
  /** What the overlay stands for, in an exported picture. */
  readonly pictureShapes?: (theme: PlotTheme) => readonly Partial<Shape>[];
  /** The range of the abscissa that was zoomed to with the pointer; null for all. */
  readonly onZoom: (range: RangeNm | null) => void;
  readonly controls: ComponentChildren;
}

interface Drawing {
  readonly figure: Figure;
  readonly size: Pick<Layout, 'width' | 'height'>;
}

/** A plot with its few controls: as a table, as SVG or PNG, and whatever its owner adds. */
export function PlotFrame(props: PlotFrameProps) {
  const { label, name, height, figure, table, overlay, pictureShapes, controls } = props;
  const place = useRef<HTMLDivElement>(null);
  const onZoom = useRef(props.onZoom);
  onZoom.current = props.onZoom;
  const width = useWidth(place);
  const [isTable, setIsTable] = useState(false);
  const theme = plotTheme.value;
  const drawn = useMemo(() => (width > 0 ? figure(width, theme) : null), [figure, width, theme]);
  const show = useMemo(() => pacedDraw(place, (range) => onZoom.current(range)), []);
  useEffect(() => {
    if (drawn) show({ figure: drawn, size: { width, height } });
  }, [drawn, width, height, show]);
  useEffect(() => {
    const element = place.current;
    return () => {
      if (element) void clear(element);
    };
  }, []);
  const save = async (format: 'svg' | 'png'): Promise<void> => {
    if (width === 0) return;
    const paper = paperTheme();
    const { data, layout } = figure(width, paper);
    const picture = {
      ...layout,
      paper_bgcolor: paper.paper,
      shapes: [...(layout.shapes ?? []), ...(pictureShapes?.(paper) ?? [])],
    };
    const link = document.createElement('a');
    link.href = await imageOf(data, picture, { format, width, height });
    link.download = `${name}.${format}`;
    link.click();
  };
  return (
    <figure class="plot">
      {/* biome-ignore lint/a11y/useSemanticElements: a fieldset is for form fields */}
      <div class="plot-area" role="group" aria-label={label} style={{ height: `${height}px` }}>
        <div ref={place} class="plot-canvas" />
        {overlay && width > 0 && overlay(width)}
      </div>
      <div class="plot-controls">
        {controls}
        <button type="button" class="quiet" onClick={() => void save('svg').catch(tellFault)}>
          Picture as SVG
        </button>
        <button type="button" class="quiet" onClick={() => void save('png').catch(tellFault)}>
          as PNG
        </button>
        <button
          type="button"
          class="quiet"
          aria-expanded={isTable}
          onClick={() => setIsTable(!isTable)}
        >
          {isTable ? 'Hide the table' : 'Show as a table'}
        </button>
      </div>
      {isTable && (
        // biome-ignore lint/a11y/noNoninteractiveTabindex: what scrolls must scroll from the keyboard
        <section class="plot-table" tabIndex={0} aria-label={`${label}, as a table`}>
          {table()}
        </section>
      )}
    </figure>
  );
}

const longestRestMs = 150;

/**
 * Draws the newest figure and then rests as long as that took, so that a drag, which asks for far
 * more drawings than can be made, leaves time for the pointer.
 */
function pacedDraw(
  place: { readonly current: HTMLDivElement | null },
  onZoom: (range: RangeNm | null) => void,
): (drawing: Drawing) => void {
  return latestOnly(
    async ({ figure, size }: Drawing) => {
      const element = place.current;
      if (!element?.isConnected) return;
      const begun = performance.now();
      listen(element, await draw(element, figure.data, { ...figure.layout, ...size }), onZoom);
      const rest = Math.min(performance.now() - begun, longestRestMs);
      await new Promise((resolve) => setTimeout(resolve, rest));
    },
    () => undefined,
    tellFault,
  );
}

function listen(
  element: HTMLElement,
  plot: PlotlyHTMLElement,
  onZoom: (range: RangeNm | null) => void,
): void {
  if (element.dataset.listens) return;
  element.dataset.listens = 'yes';
  plot.on('plotly_relayout', (event) => {
    const low = event['xaxis.range[0]'];
    const high = event['xaxis.range[1]'];
    if (typeof low === 'number' && typeof high === 'number') onZoom([low, high]);
  });
  plot.on('plotly_doubleclick', () => onZoom(null));
}

function useWidth(place: { readonly current: HTMLDivElement | null }): number {
  const [width, setWidth] = useState(0);
  useEffect(() => {
    const element = place.current?.parentElement;
    if (!element) return;
    const watch = new ResizeObserver(() => setWidth(Math.floor(element.clientWidth)));
    watch.observe(element);
    return () => watch.disconnect();
  }, [place]);
  return width;
}
