import { describe, expect, it } from 'vitest';
import type { Sheet } from '../../analysis/index.ts';
import { amountOf, first, holds } from './fitted.ts';
import { syntheticSheet } from './synthetic.ts';

/** Standards of mono made without error; the weaker of the two recorded 5 mAU too high. */
function sheetWith(baseline: NonNullable<Sheet['fit']>['baseline'], seed: number): Sheet {
  const sheet = syntheticSheet({ seed, offset: 0 });
  return {
    ...sheet,
    fit: { ...sheet.fit, baseline },
    stocks: (sheet.stocks ?? []).map((stock) => ({ ...stock, relativeStandardUncertainty: 0 })),
    standards: (sheet.standards ?? []).map((standard) => ({
      ...standard,
      relativeStandardUncertainty: 0,
      spectrum:
        standard.id === 'mono-1'
          ? {
              embedded: {
                ...standard.spectrum.embedded!,
                absorbance: standard.spectrum.embedded!.absorbance!.map(
                  (value) => (value ?? 0) + 0.005,
                ),
              },
            }
          : standard.spectrum,
    })),
  };
}

describe('two standards, one of them with an offset of its own', () => {
  it('give the amount as if there were none where a baseline is fitted', () => {
    let inside = 0;
    for (let seed = 1; seed <= 40; seed++) {
      if (holds(amountOf(first(sheetWith('offset', seed)), 'mono'), 2e-5)) inside++;
    }
    // 38 expected, standard deviation 1.4
    expect(inside).toBeGreaterThanOrEqual(34);
  });

  it('widen the interval where none is, so that it still holds the truth', () => {
    for (let seed = 1; seed <= 20; seed++) {
      const none = amountOf(first(sheetWith('none', seed)), 'mono');
      const offset = amountOf(first(sheetWith('offset', seed)), 'mono');
      expect(holds(none, 2e-5)).toBe(true);
      expect(none.standardUncertainty!).toBeGreaterThan(3 * offset.standardUncertainty!);
    }
  });
});
