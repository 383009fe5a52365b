import { useRef, useState } from 'preact/hooks';

interface WindowHandlesProps {
  readonly windowNm: readonly [number, number];
  /** What may be chosen. */
  readonly limitsNm: readonly [number, number];
  /** What the plot shows. */
  readonly rangeNm: readonly [number, number];
  /** Room at the left and right of the panel and its width, px. */
  readonly left: number;
  readonly width: number;
  readonly top: number;
  readonly height: number;
  readonly onMove: (windowNm: readonly [number, number], gesture: string) => void;
}

let gestures = 0;

/** The two edges of the fit window, over the plot: dragged, or moved by the arrow keys. */
export function WindowHandles(props: WindowHandlesProps) {
  return (
    <>
      <Edge {...props} side={0} />
      <Edge {...props} side={1} />
    </>
  );
}

function Edge({
  windowNm,
  limitsNm,
  rangeNm,
  left,
  width,
  top,
  height,
  onMove,
  side,
}: WindowHandlesProps & { readonly side: 0 | 1 }) {
  const [dragged, setDragged] = useState<number | null>(null);
  const gesture = useRef('');
  const frame = useRef(0);
  const nm = dragged ?? windowNm[side];
  const [low, high] = rangeNm;
  const at = left + ((nm - low) / (high - low)) * width;
  if (at < left - 1 || at > left + width + 1) return null;
  const allowed = (wanted: number): number => {
    const [least, most] =
      side === 0 ? [limitsNm[0], windowNm[1] - 1] : [windowNm[0] + 1, limitsNm[1]];
    return Math.min(Math.max(Math.round(wanted), least), most);
  };
  const move = (wanted: number): void => {
    const next = allowed(wanted);
    onMove(side === 0 ? [next, windowNm[1]] : [windowNm[0], next], gesture.current);
  };
  const begin = (): void => {
    gestures++;
    gesture.current = `window-${gestures}`;
  };
  const keys: Record<string, number> = { ArrowLeft: -1, ArrowRight: 1, ArrowDown: -1, ArrowUp: 1 };
  return (
    <div
      class={`window-edge window-edge-${side === 0 ? 'low' : 'high'}`}
      role="slider"
      tabIndex={0}
      aria-label={side === 0 ? 'Lower end of the fit window' : 'Upper end of the fit window'}
      aria-valuemin={limitsNm[0]}
      aria-valuemax={limitsNm[1]}
      aria-valuenow={nm}
      aria-valuetext={`${nm} nm`}
      style={{ left: `${at}px`, top: `${top}px`, height: `${height}px` }}
      onPointerDown={(event) => {
        event.currentTarget.setPointerCapture(event.pointerId);
        begin();
        setDragged(windowNm[side]);
      }}
      onPointerMove={(event) => {
        if (dragged === null) return;
        const box = event.currentTarget.parentElement?.getBoundingClientRect();
        if (!box) return;
        const wanted = low + ((event.clientX - box.left - left) / width) * (high - low);
        setDragged(allowed(wanted));
        cancelAnimationFrame(frame.current);
        frame.current = requestAnimationFrame(() => move(wanted));
      }}
      onPointerUp={() => setDragged(null)}
      onPointerCancel={() => setDragged(null)}
      onKeyDown={(event) => {
        const step = keys[event.key];
        const ends = side === 0 ? [limitsNm[0], windowNm[1] - 1] : [windowNm[0] + 1, limitsNm[1]];
        if (step !== undefined) {
          begin();
          move(windowNm[side] + step * (event.shiftKey ? 10 : 1));
        } else if (event.key === 'Home' || event.key === 'End') {
          begin();
          move(ends[event.key === 'Home' ? 0 : 1] ?? windowNm[side]);
        } else return;
        event.preventDefault();
      }}
    >
      <span class="window-edge-label">{nm}</span>
    </div>
  );
}
