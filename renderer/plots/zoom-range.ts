export type RangeNm = readonly [number, number];

/** Closer than this there is nothing more to see. */
const smallestSpanNm = 2;

/** The range seen after zooming by a factor (above 1 is closer) about the middle; null for all of it. */
export function zoomedBy(range: RangeNm, all: RangeNm, factor: number): RangeNm | null {
  const middle = (range[0] + range[1]) / 2;
  const span = Math.max((range[1] - range[0]) / factor, smallestSpanNm);
  return within([middle - span / 2, middle + span / 2], all);
}

/** The range seen after moving by a part of its own width; below 0 to shorter wavelengths. */
export function movedBy(range: RangeNm, all: RangeNm, part: number): RangeNm | null {
  const step = part * (range[1] - range[0]);
  return within([range[0] + step, range[1] + step], all);
}

/** Moved so that it shows nothing beyond the whole; null where that is all of it. */
export function within([low, high]: RangeNm, all: RangeNm): RangeNm | null {
  const span = high - low;
  if (!(span < all[1] - all[0])) return null;
  const from = Math.min(Math.max(low, all[0]), all[1] - span);
  return [from, from + span];
}
