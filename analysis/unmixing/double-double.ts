/**
 * Arithmetic on pairs of doubles (high + low, |low| at most half a unit in the last place of high):
 * some 32 digits. Error-free transformations of Dekker (1971) and Knuth; no fused multiply-add is
 * at hand, so products are split. Exact for magnitudes between some 1e-140 and 1e140: scale first.
 */
const splitter = 134217729; // 2^27 + 1

/** A vector of double-doubles as two arrays of one length. */
export interface DoubleDoubleVector {
  readonly high: Float64Array;
  readonly low: Float64Array;
}

/** (a + aLow)·(b + bLow) as [high, low]: for powers that must keep all digits. */
export function product(
  a: number,
  aLow: number,
  b: number,
  bLow: number,
): readonly [number, number] {
  const high = a * b;
  const aTop = topOf(a);
  const bTop = topOf(b);
  const low = productError(high, aTop, a - aTop, bTop, b - bTop) + (a * bLow + aLow * b);
  const sum = high + low;
  return [sum, low - (sum - high)];
}

/** sum -= column · factor, every entry in double-double. */
export function subtractMultiple(
  sum: DoubleDoubleVector,
  column: DoubleDoubleVector,
  factor: number,
  factorLow: number,
): void {
  const { high, low } = sum;
  const factorTop = topOf(factor);
  const factorRest = factor - factorTop;
  for (let i = 0; i < high.length; i++) {
    const value = column.high[i]!;
    const valueTop = topOf(value);
    const minuend = value * factor;
    const error =
      productError(minuend, valueTop, value - valueTop, factorTop, factorRest) +
      (value * factorLow + column.low[i]! * factor);
    const before = high[i]!;
    const rough = before - minuend;
    const part = rough - before;
    const tail = before - (rough - part) - (minuend + part) + (low[i]! - error);
    high[i] = rough + tail;
    low[i] = tail - (high[i]! - rough);
  }
}

/** Σ a·b in double-double, rounded to a double at the end. */
export function dotProduct(a: DoubleDoubleVector, b: DoubleDoubleVector): number {
  let high = 0;
  let low = 0;
  for (let i = 0; i < a.high.length; i++) {
    const x = a.high[i]!;
    const y = b.high[i]!;
    const xTop = topOf(x);
    const yTop = topOf(y);
    const term = x * y;
    const error =
      productError(term, xTop, x - xTop, yTop, y - yTop) + (x * b.low[i]! + a.low[i]! * y);
    const rough = high + term;
    const part = rough - high;
    const tail = high - (rough - part) + (term - part) + (low + error);
    high = rough + tail;
    low = tail - (high - rough);
  }
  return high;
}

/** sum += change, every entry in double-double. */
export function addTo({ high, low }: DoubleDoubleVector, change: Float64Array): void {
  for (let i = 0; i < high.length; i++) {
    const before = high[i]!;
    const rough = before + change[i]!;
    const part = rough - before;
    const tail = before - (rough - part) + (change[i]! - part) + low[i]!;
    high[i] = rough + tail;
    low[i] = tail - (high[i]! - rough);
  }
}

/** The upper 26 bits. */
function topOf(value: number): number {
  const big = splitter * value;
  return big - (big - value);
}

/** What rounding took from the product of two split doubles. */
function productError(
  rounded: number,
  aTop: number,
  aRest: number,
  bTop: number,
  bRest: number,
): number {
  return aTop * bTop - rounded + aTop * bRest + aRest * bTop + aRest * bRest;
}
