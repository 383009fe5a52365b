import { describe, expect, it } from 'vitest';
import { randomNumbers } from '../../analysis/split/monte-carlo-generator.ts';
import { drawnDistribution } from '../../analysis/split/monte-carlo-interval.ts';

/**
 * JCGM 101:2008 (Propagation of distributions using a Monte Carlo method), examples 9.2 and 9.4.
 * `published`: the figures printed there, from memory, not verified against a copy. `exact`: found
 * independently (normal and Irwin-Hall distributions; non-central χ² with scipy).
 */
const draws = 200_000;

/** Four Monte Carlo standard errors, with the rounding of the printed figure. */
function within(value: number, expected: number, error: number, rounding = 0): void {
  expect(Math.abs(value - expected)).toBeLessThanOrEqual(4 * error + rounding / 2);
}

describe('additive model, JCGM 101, 9.2: the sum of four quantities of mean 0 and deviation 1', () => {
  const cases = [
    { shape: 'normal', published: 3.92, exact: 3.919927969080108 },
    { shape: 'rectangular', published: 3.88, exact: 3.87940674134782 },
  ] as const;

  it.each(cases)('$shape', ({ shape, published, exact }) => {
    const random = randomNumbers(92);
    const one = (): number =>
      shape === 'normal' ? random.normal() : Math.sqrt(12) * (random.uniform() - 0.5);
    const sums = Float64Array.from({ length: draws }, () => one() + one() + one() + one());
    const { mean, standardDeviation, symmetric95, shortest95 } = drawnDistribution(sums);
    within(mean, 0, 2 / Math.sqrt(draws));
    within(standardDeviation, 2, 2 / Math.sqrt(2 * draws));
    // the error of an end is some 0.012 of 3.92 here
    expect(symmetric95.lowError).toBeLessThan(0.02);
    within(symmetric95.low, -exact, symmetric95.lowError);
    within(symmetric95.high, exact, symmetric95.highError);
    within(symmetric95.high, published, symmetric95.highError, 0.01);
    // symmetric and of one mode: the shortest is the same interval, less sharply placed
    within(shortest95.low, -exact, shortest95.lowError);
    within(shortest95.high, exact, shortest95.highError);
  });
});

describe('a quantity at a bound, JCGM 101, 9.4: Y = X1² + X2² with X ~ N(x, 0.005²)', () => {
  const cases = [
    {
      x1: 0,
      mean: 5e-5,
      sd: 5e-5,
      published: { y: 5e-5, u: 5e-5, high: 0.00015, low: 0 },
      exact: [0, 0.00014978661367769948],
    },
    {
      x1: 0.01,
      mean: 1.5e-4,
      sd: 0.00011180339887498949,
      published: { y: 1.5e-4, u: 1.12e-4, high: 0.000367, low: 0 },
      exact: [0, 0.0003660052897467759],
    },
    {
      x1: 0.05,
      mean: 2.55e-3,
      sd: 0.0005024937810560445,
      published: { y: 2.551e-3, u: 5.02e-4, high: 0.003543, low: 0.00159 },
      exact: [0.001593569672317227, 0.003548569817467106],
    },
  ] as const;

  it.each(cases)('x1 = $x1', ({ x1, mean, sd, published, exact }) => {
    const { normal } = randomNumbers(94);
    const losses = Float64Array.from(
      { length: draws },
      () => (x1 + 0.005 * normal()) ** 2 + (0.005 * normal()) ** 2,
    );
    const found = drawnDistribution(losses);
    const ofMean = sd / Math.sqrt(draws);
    within(found.mean, mean, ofMean);
    within(found.mean, published.y, ofMean, 2e-6); // theirs is a Monte Carlo value as well
    // the exponential (x1 = 0) has the largest kurtosis, 9: error of its deviation sd √(8/4n)
    within(found.standardDeviation, sd, sd * Math.sqrt(2 / draws));
    within(found.standardDeviation, published.u, sd * Math.sqrt(2 / draws), 1e-6);
    const { low, high, lowError, highError } = found.shortest95;
    within(low, exact[0], lowError, 1e-7);
    within(high, exact[1], highError);
    // theirs are Monte Carlo values too, and the place of a shortest interval is loose: 1 % of u
    within(high, published.high, highError, 0.02 * sd);
    within(low, published.low, lowError, 0.02 * sd);
    expect(low).toBeGreaterThanOrEqual(0);
  });
});
