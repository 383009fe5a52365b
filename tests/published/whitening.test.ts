import { expect, it } from 'vitest';
import { factorise } from '../../analysis/unmixing/orthogonal.ts';

// A weighted mean by definition. NUMERICS.md (status: computed): weights 1 and 10 on the residuals, that is
// 1 and 100 on their squares: (10·1 + 1000·3)/(10 + 1000) = 2.980, which one library gets wrong.
it('ten points at 1 and ten at 3 with weights 1 and 10 on their residuals give 2.980', () => {
  const y = Float64Array.from({ length: 20 }, (_, i) => (i < 10 ? 1 : 3));
  const weight = y.map((value) => (value === 1 ? 1 : 10));
  const [mean] = factorise([weight]).solve(y.map((value, i) => value * weight[i]!));
  // the printed three decimals; the quotient is 3010/1010
  expect(mean).toBeCloseTo(2.98, 3);
  expect(mean).toBeCloseTo(3010 / 1010, 12);
});
