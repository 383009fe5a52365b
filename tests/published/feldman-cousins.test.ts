import { expect, it } from 'vitest';
import { confidenceInterval } from '../../analysis/split/confidence-set.ts';

// Feldman and Cousins, Phys. Rev. D 57 (1998) 3873, table of 95 % intervals for a normal mean that
// cannot be negative, reading x in standard deviations. Status: these four rows from memory,
// unverified; that our acceptance regions hold 95 % is tested by itself
// (tests/analysis/split/confidence-set.test.ts).
it.each([
  [-3, 0, 0.42],
  [0, 0, 1.96],
  [1, 0, 2.96],
  [2, 0.35, 3.96],
])('a reading of %d gives %d to %d', (reading, low, high) => {
  const interval = confidenceInterval({
    departure: (mean) => reading - mean,
    sd: () => 1,
    estimate: reading,
    upper: Number.POSITIVE_INFINITY,
    df: Number.POSITIVE_INFINITY,
  });
  // printed to two decimals: half a unit (0.355 is printed 0.35, as 0.3549 would be)
  expect(Math.abs(interval[0] - low)).toBeLessThan(0.0055);
  expect(Math.abs(interval[1] - high)).toBeLessThan(0.0055);
});
