import { describe, expect, it } from 'vitest';
import { noiseDraw } from '../../../analysis/split/monte-carlo-draw.ts';
import { randomNumbers } from '../../../analysis/split/monte-carlo-generator.ts';

const points = 50_000;

function meanProduct(values: Float64Array, lag: number): number {
  let sum = 0;
  for (let i = lag; i < values.length; i++) sum += (values[i] ?? 0) * (values[i - lag] ?? 0);
  return sum / (values.length - lag);
}

describe('drawn noise', () => {
  // four standard errors of a mean product of noise that leans on two neighbours to each side
  const allowed = 4 * Math.sqrt(4 / points);

  it('is white with a kernel of one point', () => {
    const noise = noiseDraw(randomNumbers(1), Float64Array.of(1), points);
    expect(Math.abs(meanProduct(noise, 0) - 1)).toBeLessThan(allowed);
    expect(Math.abs(meanProduct(noise, 1))).toBeLessThan(allowed);
  });

  it('has unit variance and the autocorrelation of its kernel, whatever the scale of the kernel', () => {
    const noise = noiseDraw(randomNumbers(2), Float64Array.of(2, 2, 2), points);
    for (const [lag, expected] of [1, 2 / 3, 1 / 3, 0].entries()) {
      expect(Math.abs(meanProduct(noise, lag) - expected)).toBeLessThan(allowed);
    }
  });

  it('varies at the ends as much as in the middle', () => {
    const random = randomNumbers(3);
    const kernel = Float64Array.of(1, 1, 1, 1, 1);
    const draws = 20_000;
    let [first, last] = [0, 0];
    for (let draw = 0; draw < draws; draw++) {
      const noise = noiseDraw(random, kernel, 12);
      first += (noise[0] ?? 0) ** 2 / draws;
      last += (noise[11] ?? 0) ** 2 / draws;
    }
    // four standard errors of a variance
    expect(Math.abs(first - 1)).toBeLessThan(4 * Math.sqrt(2 / draws));
    expect(Math.abs(last - 1)).toBeLessThan(4 * Math.sqrt(2 / draws));
  });
});
