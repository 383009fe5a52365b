import { expect, it } from 'vitest';
import { nonNegativeLeastSquares } from '../../../analysis/unmixing/non-negative.ts';

const column = Float64Array.of(1, 2, 3);

it('an absorbance that is no number does not come out as no amount', () => {
  for (const value of [Number.NaN, Number.POSITIVE_INFINITY]) {
    const spoilt = Float64Array.of(1, value, 3);
    expect(() => nonNegativeLeastSquares([column], spoilt)).toThrow(RangeError);
    expect(() => nonNegativeLeastSquares([column, spoilt], column)).toThrow(RangeError);
  }
});

it('columns of another length than the right-hand side are a fault', () => {
  expect(() => nonNegativeLeastSquares([column], Float64Array.of(1, 2))).toThrow(RangeError);
  expect(() => nonNegativeLeastSquares([column, Float64Array.of(1)], column)).toThrow(RangeError);
});
