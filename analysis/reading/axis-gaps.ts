/** Steps wider than this, in median steps, are gaps: rounding of printed wavelengths stays below. */
const WIDE = 1.6;
/** With more of them the steps are uneven by design. */
const MOST_GAPS = 3;
const FEWEST_POINTS = 6;

/**
 * A sentence on gaps in an axis that otherwise runs evenly (lines may have been lost there); null
 * where there are none. `x` in the file's unit and order.
 */
export function gapNote(x: Float64Array, unit: string): string | null {
  if (x.length < FEWEST_POINTS) return null;
  const steps = Float64Array.from(x.subarray(1), (value, i) => Math.abs(value - (x[i] ?? 0)));
  const usual = steps.toSorted()[Math.floor(steps.length / 2)] ?? 0;
  const gaps: number[] = [];
  for (let i = 0; i < steps.length && gaps.length <= MOST_GAPS; i += 1) {
    if ((steps[i] ?? 0) > WIDE * usual) gaps.push(i);
  }
  if (gaps.length === 0 || gaps.length > MOST_GAPS) return null;
  const places = gaps.map((i) => `between ${x[i]} and ${x[i + 1]} ${unit}`);
  const step = Number(usual.toPrecision(4));
  return `The steps are wider ${places.join(', ')} than elsewhere (${step} ${unit}): lines may be missing there.`;
}
