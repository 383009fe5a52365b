import { expect, it } from 'vitest';
import { factorise } from '../../analysis/unmixing/orthogonal.ts';

// A weighted mean by definition: Σ w² y / Σ w². Status: computed by hand; one optimiser's own weights
// miss it, which is why ours never go anywhere but into the rows.
it('ten points at 1 and ten at 3, weighted 1 and 10, give 2.980', () => {
  const y = Float64Array.from({ length: 20 }, (_, i) => (i < 10 ? 1 : 3));
  const weight = y.map((value) => (value === 1 ? 1 : 10));
  const whitened = y.map((value, i) => value * (weight[i] ?? Number.NaN));
  const [mean] = factorise([weight]).solve(whitened);
  // (10·1·1 + 10·100·3)/(10·1 + 10·100); all whole numbers, so the last digit only
  expect(mean).toBeCloseTo(3010 / 1010, 14);
  expect(mean?.toFixed(3)).toBe('2.980');
  // unweighted it would be 2, weighted once instead of twice 2.818
  expect(factorise([y.map(() => 1)]).solve(y)[0]).toBeCloseTo(2, 14);
});
