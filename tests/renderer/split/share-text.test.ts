import { describe, expect, it } from 'vitest';
import { shareText } from '../../../renderer/sections/split/share-text.ts';

const share = (value: number, u: number, low: number | null, high: number | null): string =>
  shareText({ value, standardUncertainty: u, interval95: [low, high] });

describe('a share of the products', () => {
  it('is rounded to its uncertainty', () => {
    expect(share(0.119, 0.0035, 0.1121, 0.126)).toBe('11.90 %');
  });

  it('is a bound where the data give no more, never 0 or 100 per cent', () => {
    expect(share(0, 1e-4, 0, 2.3e-4)).toBe('below 0.023 %');
    expect(share(1, 1e-4, 0.99977, 1)).toBe('above 99.977 %');
    expect(share(0.5, 0.4, 0, 1)).toBe('not bounded');
    expect(share(0.5, 0.4, null, null)).toBe('not bounded');
  });
});
