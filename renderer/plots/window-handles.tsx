import { useRef, useState } from 'preact/hooks';
import { edgeLimits, keyTarget, movedEdge, type Side } from './window-edge.ts';
import type { RangeNm } from './zoom-range.ts';

interface WindowHandlesProps {
  readonly windowNm: RangeNm;
  /** What may be chosen. */
  readonly limitsNm: RangeNm;
  /** What the plot shows. */
  readonly rangeNm: RangeNm;
  /** Room at the left and right of the panel and its width, px. */
  readonly left: number;
  readonly width: number;
  readonly top: number;
  readonly height: number;
  readonly onMove: (windowNm: RangeNm, gesture: string) => void;
}

interface Drag {
  readonly side: Side;
  readonly nm: number;
}

let gestures = 0;
/** Nearer than this the numbers of the two edges do not fit between them. */
const roomForLabelsPx = 76;

/** The two edges of the fit window, over the plot: dragged, or moved by the arrow keys. */
export function WindowHandles(props: WindowHandlesProps) {
  const [drag, setDrag] = useState<Drag | null>(null);
  const shown = drag ? movedEdge(props.windowNm, drag.side, drag.nm) : props.windowNm;
  const { left, width, top, height, rangeNm, limitsNm } = props;
  const at = (nm: number): number => ((nm - rangeNm[0]) / (rangeNm[1] - rangeNm[0])) * width;
  const within = (px: number): number => Math.min(Math.max(px, 0), width);
  // an edge beyond the spectrum is shown at the spectrum's end, where it can be taken hold of
  const held = (nm: number): number => Math.min(Math.max(nm, limitsNm[0]), limitsNm[1]);
  const [from, to] = [within(at(shown[0])), within(at(shown[1]))];
  const panel = { top: `${top}px`, height: `${height}px` };
  return (
    <>
      <div class="window-outside" style={{ ...panel, left: `${left}px`, width: `${from}px` }} />
      <div
        class="window-outside"
        style={{ ...panel, left: `${left + to}px`, width: `${width - to}px` }}
      />
      {([0, 1] as const).map((side) => (
        <Edge
          {...props}
          key={side}
          side={side}
          nm={shown[side]}
          at={at(held(shown[side]))}
          setDrag={setDrag}
          isDragged={drag?.side === side}
          labelsTo={to - from < roomForLabelsPx ? 'outside' : 'inside'}
        />
      ))}
    </>
  );
}

interface EdgeProps extends WindowHandlesProps {
  readonly side: Side;
  readonly nm: number;
  /** From the panel's left, px. */
  readonly at: number;
  readonly isDragged: boolean;
  readonly labelsTo: 'inside' | 'outside';
  readonly setDrag: (drag: Drag | null) => void;
}

function Edge(props: EdgeProps) {
  const { windowNm, limitsNm, rangeNm, left, width, top, height, side, nm, at } = props;
  const gesture = useRef('');
  const frame = useRef(0);
  const begin = (): void => {
    gestures++;
    gesture.current = `window-${gestures}`;
  };
  const [least, most] = edgeLimits(windowNm, limitsNm, side);
  const allowed = (wanted: number): number => Math.min(Math.max(Math.round(wanted), least), most);
  const move = (next: number): void =>
    props.onMove(movedEdge(windowNm, side, next), gesture.current);
  const end = (): void => props.setDrag(null);
  if (at < -1 || at > width + 1) return null;
  return (
    <div
      class={`window-edge window-edge-${side === 0 ? 'low' : 'high'}`}
      data-labels={props.labelsTo}
      role="slider"
      tabIndex={0}
      aria-label={side === 0 ? 'Lower end of the fit window' : 'Upper end of the fit window'}
      aria-valuemin={Math.min(least, nm)}
      aria-valuemax={Math.max(most, nm)}
      aria-valuenow={nm}
      aria-valuetext={`${nm} nm`}
      style={{ left: `${left + at}px`, top: `${top}px`, height: `${height}px` }}
      onPointerDown={(event) => {
        event.currentTarget.setPointerCapture(event.pointerId);
        begin();
        props.setDrag({ side, nm });
      }}
      onPointerMove={(event) => {
        const box = event.currentTarget.parentElement?.getBoundingClientRect();
        if (!props.isDragged || !box) return;
        const part = (event.clientX - box.left - left) / width;
        const next = allowed(rangeNm[0] + part * (rangeNm[1] - rangeNm[0]));
        if (next === nm) return;
        props.setDrag({ side, nm: next });
        cancelAnimationFrame(frame.current);
        frame.current = requestAnimationFrame(() => move(next));
      }}
      onPointerUp={end}
      onPointerCancel={end}
      onKeyDown={(event) => {
        const wanted = keyTarget(event.key, event.shiftKey, nm, [least, most]);
        if (wanted === null) return;
        event.preventDefault();
        // a key held down is one change, as a drag is
        if (!event.repeat) begin();
        move(allowed(wanted));
      }}
    >
      <span class="window-edge-label">{nm}</span>
    </div>
  );
}
