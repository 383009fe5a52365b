import type { Data, Layout } from 'plotly.js-dist-min';
import type { ComponentChildren } from 'preact';
import { useEffect, useRef, useState } from 'preact/hooks';
import { tellFault } from '../state/notices.ts';
import { clear, draw, imageOf } from './plotly.ts';

interface PlotFrameProps {
  /** What a screen reader says of it. */
  readonly label: string;
  /** For the file of an exported picture. */
  readonly name: string;
  readonly height: number;
  readonly data: Data[];
  readonly layout: Partial<Layout>;
  /** The same numbers as a table. */
  readonly table: () => ComponentChildren;
  /** Lies over the plot; told the plot's width in px. */
  readonly overlay?: (width: number) => ComponentChildren;
  /** The range of the abscissa that was zoomed to; null for all. */
  readonly onZoom?: (range: readonly [number, number] | null) => void;
  readonly controls?: ComponentChildren;
}

/** A plot with its few controls: as a table, as SVG or PNG, and whatever its owner adds. */
export function PlotFrame(props: PlotFrameProps) {
  const { label, name, height, data, layout, table, overlay, onZoom, controls } = props;
  const place = useRef<HTMLDivElement>(null);
  const zoom = useRef(onZoom);
  zoom.current = onZoom;
  const width = useWidth(place);
  const [isTable, setIsTable] = useState(false);
  useEffect(() => {
    const element = place.current;
    if (!element || width === 0) return;
    draw(element, data, { ...layout, width, height }).then((plot) => {
      if (element.dataset.listens) return;
      element.dataset.listens = 'yes';
      plot.on('plotly_relayout', (event) => {
        const low = event['xaxis.range[0]'];
        const high = event['xaxis.range[1]'];
        if (typeof low === 'number' && typeof high === 'number') zoom.current?.([low, high]);
      });
      plot.on('plotly_doubleclick', () => zoom.current?.(null));
    }, tellFault);
  }, [data, layout, width, height]);
  useEffect(() => {
    const element = place.current;
    return () => {
      if (element) void clear(element);
    };
  }, []);
  const save = (format: 'svg' | 'png') => async () => {
    if (!place.current) return;
    const link = document.createElement('a');
    link.href = await imageOf(place.current, format);
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
        <button type="button" class="quiet" onClick={() => void save('svg')().catch(tellFault)}>
          Picture as SVG
        </button>
        <button type="button" class="quiet" onClick={() => void save('png')().catch(tellFault)}>
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
      {isTable && <div class="plot-table">{table()}</div>}
    </figure>
  );
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
