import { describe, expect, it } from 'vitest';
import { budgetAdvice } from '../../../analysis/split/budget-advice.ts';

describe('what to improve first', () => {
  it('names the largest source and what half of its uncertainty would bring', () => {
    // √(1 - 0.7 · 3/4) = 0.689
    const text = budgetAdvice([
      { source: 'photometric noise', share: 0.3 },
      { source: 'stock mono-A', share: 0.7 },
    ]);
    expect(text).toContain(
      'Halving the uncertainty of stock mono-A would shrink the interval by 31 %',
    );
    expect(text).toContain('weigh it anew');
  });

  it('is half of the interval where there is one source only', () => {
    expect(budgetAdvice([{ source: 'dilution of S1', share: 1 }])).toContain('by 50 %');
  });

  it('says so where no source stands out', () => {
    const even = Array.from({ length: 12 }, (_, i) => ({ source: `stock ${i}`, share: 1 / 12 }));
    expect(budgetAdvice(even)).toMatch(/^No source stands out: .* by 3 % only\.$/);
  });

  it('does not ask to halve what more care would not halve', () => {
    const most = budgetAdvice([{ source: 'lack of fit', share: 0.9 }]);
    expect(most).toMatch(/^Most of the uncertainty/);
    expect(most).not.toContain('Halving');
    const part = budgetAdvice([
      { source: 'baseline', share: 0.4 },
      { source: 'photometric noise', share: 0.35 },
    ]);
    expect(part).toMatch(/^The largest part of the uncertainty/);
  });

  it('is nothing without a budget', () => {
    expect(budgetAdvice([])).toBeNull();
  });
});
