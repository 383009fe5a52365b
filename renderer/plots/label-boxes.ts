/** A label's place on a panel, px from its top left. */
export interface Box {
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
}

export interface Point {
  readonly x: number;
  readonly y: number;
}

const heightPx = 16;
/** A semi-bold letter at 12 px, generously. */
const letterPx = 7.4;

/** The box of a label around its middle. */
export function boxAround(text: string, { x, y }: Point): Box {
  const half = (text.length * letterPx) / 2 + 2;
  return { left: x - half, right: x + half, top: y - heightPx / 2, bottom: y + heightPx / 2 };
}

export function overlap(a: Box, b: Box): boolean {
  return a.left < b.right && b.left < a.right && a.top < b.bottom && b.top < a.bottom;
}

/** True if a curve, given by its points from left to right, runs through the box. */
export function isCrossed(box: Box, curve: readonly Point[]): boolean {
  return curve.some((point, i) => {
    const next = curve[i + 1] ?? point;
    if (next.x < box.left || point.x > box.right) return false;
    const [high, low] = [Math.min(point.y, next.y), Math.max(point.y, next.y)];
    return low > box.top && high < box.bottom;
  });
}

/** The first of the places that lies within the panel and clear of labels and curves; else the first. */
export function firstClear(
  text: string,
  places: readonly Point[],
  panel: { readonly width: number; readonly height: number },
  taken: readonly Box[],
  curves: readonly (readonly Point[])[],
): Point | undefined {
  const clear = places.find((place) => {
    const box = boxAround(text, place);
    const isInside =
      box.left >= 0 && box.right <= panel.width && box.top >= 0 && box.bottom <= panel.height;
    return (
      isInside &&
      !taken.some((other) => overlap(box, other)) &&
      !curves.some((curve) => isCrossed(box, curve))
    );
  });
  return clear ?? places[0];
}
