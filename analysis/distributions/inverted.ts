/**
 * The x at which an increasing function reaches `target`, by bisection on a bracket that is first
 * widened. Slow and sure: quantiles are asked for rarely.
 */
export function inverted(
  rising: (x: number) => number,
  target: number,
  bracket: readonly [number, number],
): number {
  let [low, high] = bracket;
  for (let k = 0; k < 1100 && rising(high) < target; k++) high = high > 0 ? high * 2 : high / 2 + 1;
  for (let k = 0; k < 1100 && rising(low) > target; k++) low = low < 0 ? low * 2 : low / 2;
  for (let k = 0; k < 200; k++) {
    const middle = (low + high) / 2;
    if (middle === low || middle === high) break;
    if (rising(middle) < target) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}
