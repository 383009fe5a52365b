import { useState } from 'preact/hooks';
import { movedBy, type RangeNm, within, zoomedBy } from './zoom-range.ts';

interface ZoomProps {
  readonly range: RangeNm;
  readonly all: RangeNm;
  /** Null shows all. */
  readonly onZoom: (range: RangeNm | null) => void;
}

/** The wavelengths that a plot shows, and the way to change them. */
export function useZoom(all: RangeNm): ZoomProps {
  const [zoomed, setZoomed] = useState<RangeNm | null>(null);
  // another spectrum may end elsewhere
  const range = (zoomed && within(zoomed, all)) ?? all;
  return { range, all, onZoom: setZoomed };
}

const closer = 2;
const part = 0.4;

/** What dragging across the plot does with the pointer, for the keyboard. */
export function ZoomControls({ range, all, onZoom }: ZoomProps) {
  const isWhole = range[0] <= all[0] && range[1] >= all[1];
  return (
    <div class="zoom-controls">
      <Control
        text="Zoom in"
        title="Or drag across the plot"
        act={() => onZoom(zoomedBy(range, all, closer))}
      />
      {!isWhole && (
        <>
          <Control text="Zoom out" act={() => onZoom(zoomedBy(range, all, 1 / closer))} />
          <Control
            text="←"
            label="Shorter wavelengths"
            isOff={range[0] <= all[0]}
            act={() => onZoom(movedBy(range, all, -part))}
          />
          <Control
            text="→"
            label="Longer wavelengths"
            isOff={range[1] >= all[1]}
            act={() => onZoom(movedBy(range, all, part))}
          />
          <Control
            text="Show all wavelengths"
            title="Or double-click the plot"
            act={() => onZoom(null)}
          />
        </>
      )}
    </div>
  );
}

interface ControlProps {
  readonly text: string;
  readonly label?: string;
  readonly title?: string;
  readonly isOff?: boolean;
  readonly act: () => void;
}

function Control({ text, label, title, isOff = false, act }: ControlProps) {
  return (
    <button
      type="button"
      class="quiet"
      aria-label={label}
      title={title}
      disabled={isOff}
      onClick={act}
    >
      {text}
    </button>
  );
}
