/** Some doublings above the least positive double, so that half of it is not 0. */
const smallest = 2 ** -1070;

/**
 * The positive double at which `isBelow` turns from true (the root lies above x) to false: bisection
 * over all positive doubles, geometric while the bracket spans orders of magnitude, so that a root of
 * 1e-200 is found as well as one of 1e200, in some 70 steps. 0 or Infinity where it lies outside.
 */
export function positiveRoot(isBelow: (x: number) => boolean): number {
  let low = smallest;
  let high = Number.MAX_VALUE;
  if (!isBelow(low)) return 0;
  if (isBelow(high)) return Number.POSITIVE_INFINITY;
  for (;;) {
    const middle = high > 4 * low ? Math.sqrt(low) * Math.sqrt(high) : low + (high - low) / 2;
    if (!(middle > low && middle < high)) return middle;
    if (isBelow(middle)) low = middle;
    else high = middle;
  }
}
