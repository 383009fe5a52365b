import { describe, expect, it } from 'vitest';
import { chiSquareQuantile } from '../../../analysis/distributions/chi-square.ts';
import { randomNumbers } from '../../../analysis/split/monte-carlo-generator.ts';

const many = 100_000;

function drawn(draw: () => number): Float64Array {
  return Float64Array.from({ length: many }, draw);
}

function moment(values: Float64Array, power: number): number {
  return values.reduce((sum, value) => sum + value ** power, 0) / values.length;
}

describe('random numbers of a check', () => {
  it('are the same for the same seed and others for another', () => {
    const [one, again, other] = [randomNumbers(7), randomNumbers(7), randomNumbers(8)];
    const draws = Array.from({ length: 50 }, one.normal);
    expect(Array.from({ length: 50 }, again.normal)).toEqual(draws);
    expect(Array.from({ length: 50 }, other.normal)).not.toEqual(draws);
  });

  it('fill 100 equal cells of [0, 1) evenly, and successive pairs 10 × 10', () => {
    const { uniform } = randomNumbers(1);
    const draws = drawn(uniform);
    const single = new Float64Array(100);
    const pairs = new Float64Array(100);
    for (const [i, value] of draws.entries()) {
      const cell = Math.floor(100 * value);
      single[cell] = (single[cell] ?? 0) + 1;
      if (i % 2 === 0) continue;
      const pair = 10 * Math.floor(10 * value) + Math.floor(10 * (draws[i - 1] ?? 0));
      pairs[pair] = (pairs[pair] ?? 0) + 1;
    }
    expect(draws.every((value) => value >= 0 && value < 1)).toBe(true);
    // a fixed seed: a good generator exceeds this χ² of 99 degrees once in 10 000 seeds
    const limit = chiSquareQuantile(0.9999, 99);
    for (const cells of [single, pairs]) {
      const expected = cells.reduce((sum, count) => sum + count, 0) / 100;
      const chiSquare = cells.reduce((sum, count) => sum + (count - expected) ** 2 / expected, 0);
      expect(chiSquare).toBeLessThan(limit);
    }
  });

  it('are normal in their first four moments and their tails', () => {
    const { normal } = randomNumbers(2);
    const draws = drawn(normal);
    // four standard errors of each moment: √(1, 2, 15, 96)/√n
    for (const [power, expected, variance] of [
      [1, 0, 1],
      [2, 1, 2],
      [3, 0, 15],
      [4, 3, 96],
    ] as const) {
      expect(Math.abs(moment(draws, power) - expected)).toBeLessThan(
        4 * Math.sqrt(variance / many),
      );
    }
    const beyond = draws.filter((value) => Math.abs(value) > 1.959964).length / many;
    expect(Math.abs(beyond - 0.05)).toBeLessThan(4 * Math.sqrt((0.05 * 0.95) / many));
  });

  it.each([0.7, 1, 4.3, 120])('have χ² of %d degrees with its mean and variance', (df) => {
    const { chiSquare } = randomNumbers(3);
    const draws = drawn(() => chiSquare(df));
    const mean = moment(draws, 1);
    const variance = moment(draws, 2) - mean ** 2;
    // four standard errors; that of the variance from the fourth moment, 12 df (df + 4)
    expect(Math.abs(mean - df)).toBeLessThan(4 * Math.sqrt((2 * df) / many));
    const ofVariance = Math.sqrt((12 * df * (df + 4) - 4 * df * df) / many);
    expect(Math.abs(variance - 2 * df)).toBeLessThan(4 * ofVariance);
  });
});
