import { describe, expect, it } from 'vitest';
import { bandOutlines } from '../../../renderer/plots/band.ts';

describe('a band between two curves', () => {
  it('goes round once and closes', () => {
    const x = Float64Array.of(1, 2, 3);
    const outline = bandOutlines({ x, low: x.map((v) => -v), high: x });
    expect(outline.x).toEqual([1, 2, 3, 3, 2, 1, 1, Number.NaN]);
    expect(outline.y).toEqual([1, 2, 3, -3, -2, -1, 1, Number.NaN]);
  });

  it('does not cross a gap in either curve, and drops a point alone', () => {
    const x = Float64Array.of(1, 2, 3, 4, 5, 6, 7);
    const low = Float64Array.of(0, 0, Number.NaN, 0, Number.NaN, 0, 0);
    const high = Float64Array.of(1, 1, 1, 1, 1, 1, 1);
    expect(bandOutlines({ x, low, high }).x).toEqual([
      ...[1, 2, 2, 1, 1, Number.NaN],
      ...[6, 7, 7, 6, 6, Number.NaN],
    ]);
  });

  it('is nothing where there are no curves', () => {
    const none = Float64Array.of(Number.NaN, Number.NaN);
    expect(bandOutlines({ x: Float64Array.of(1, 2), low: none, high: none })).toEqual({
      x: [],
      y: [],
    });
  });
});
