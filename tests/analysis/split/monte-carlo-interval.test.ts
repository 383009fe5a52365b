import { describe, expect, it } from 'vitest';
import { randomNumbers } from '../../../analysis/split/monte-carlo-generator.ts';
import { drawnDistribution } from '../../../analysis/split/monte-carlo-interval.ts';

describe('an interval from draws', () => {
  it('is by rank: of 1 to 2000, the 50th and the 1950th (JCGM 101, 7.7)', () => {
    const draws = Float64Array.from({ length: 2000 }, (_, i) => 2000 - i);
    const { symmetric95, mean } = drawnDistribution(draws);
    expect(symmetric95).toMatchObject({ low: 50, high: 1950 });
    expect(mean).toBe(1000.5);
  });

  it('has no error and no width where all draws are alike', () => {
    const { symmetric95, shortest95, standardDeviation } = drawnDistribution(
      new Float64Array(200).fill(3),
    );
    const point = { low: 3, high: 3, lowError: 0, highError: 0 };
    expect([symmetric95, shortest95, standardDeviation]).toEqual([point, point, 0]);
  });

  it('keeps an infinite end infinite', () => {
    const draws = Float64Array.from({ length: 200 }, (_, i) => (i < 100 ? i : Infinity));
    const { symmetric95, mean } = drawnDistribution(draws);
    expect(symmetric95.high).toBe(Infinity);
    expect(mean).toBe(Infinity);
  });

  it('is told with an error as large as the ends scatter when all is drawn again', () => {
    const { normal } = randomNumbers(11);
    const repeats = 300;
    const found = Array.from({ length: repeats }, () =>
      drawnDistribution(Float64Array.from({ length: 1000 }, normal)),
    );
    for (const which of ['symmetric95', 'shortest95'] as const) {
      const highs = found.map((each) => each[which].high);
      const mean = highs.reduce((sum, value) => sum + value, 0) / repeats;
      const scatter = Math.sqrt(highs.reduce((sum, x) => sum + (x - mean) ** 2, 0) / repeats);
      const told = found.reduce((sum, each) => sum + each[which].highError, 0) / repeats;
      // the symmetric one's error is right to a few per cent; the cube root of the other to a quarter
      const allowed = which === 'symmetric95' ? 0.2 : 0.35;
      expect(Math.abs(told / scatter - 1)).toBeLessThan(allowed);
    }
  });

  it('refuses fewer draws than can tell', () => {
    expect(() => drawnDistribution(new Float64Array(99))).toThrow('too few');
  });
});
