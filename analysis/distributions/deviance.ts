/** Within this of 1 the logarithm would cancel most of the ratio's digits. */
const near = 0.5;

/**
 * u - 1 - ln u for u > 0, without cancellation near u = 1 (the deviance of C. Loader, 2000; series
 * of the inverse hyperbolic tangent).
 *
 * @param gap u - 1, given apart so that it is not lost to rounding near u = 1
 */
export function deviance(u: number, gap: number): number {
  if (!(Math.abs(gap) <= near)) return u - 1 - Math.log(u);
  const r = gap / (2 + gap);
  const square = r * r;
  let sum = r * gap;
  let power = 2 * r;
  for (let k = 3; ; k += 2) {
    power *= square;
    const next = sum - power / k;
    if (next === sum) return sum;
    sum = next;
  }
}
