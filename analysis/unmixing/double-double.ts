/**
 * Arithmetic on pairs of doubles (high + low, |low| at most half a unit in the last place of high):
 * some 32 digits. Error-free transformations of Dekker (1971) and Knuth; no fused multiply-add is
 * at hand, so products are split.
 */
const splitter = 134217729; // 2^27 + 1

/** A vector of double-doubles as two arrays of one length. */
export interface DoubleDoubleVector {
  readonly high: Float64Array;
  readonly low: Float64Array;
}

/** A running sum of products in double-double. */
export class Accumulator {
  high = 0;
  low = 0;

  /** Adds high + low. */
  add(high: number, low: number): void {
    const sum = this.high + high;
    const part = sum - this.high;
    const error = this.high - (sum - part) + (high - part) + (this.low + low);
    this.high = sum + error;
    this.low = error - (this.high - sum);
  }

  /** Adds (a + aLow)·(b + bLow). */
  addProduct(a: number, aLow: number, b: number, bLow: number): void {
    const product = a * b;
    const aBig = splitter * a;
    const aHigh = aBig - (aBig - a);
    const aRest = a - aHigh;
    const bBig = splitter * b;
    const bHigh = bBig - (bBig - b);
    const bRest = b - bHigh;
    const error = aHigh * bHigh - product + aHigh * bRest + aRest * bHigh + aRest * bRest;
    this.add(product, error + (a * bLow + aLow * b));
  }
}

/** (a + aLow)·(b + bLow) as [high, low]: for powers that must keep all digits. */
export function product(
  a: number,
  aLow: number,
  b: number,
  bLow: number,
): readonly [number, number] {
  const sum = new Accumulator();
  sum.addProduct(a, aLow, b, bLow);
  return [sum.high, sum.low];
}
