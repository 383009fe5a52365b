import { describe, expect, it } from 'vitest';
import { splitSummary } from '../../../renderer/sections/split/split-summary.ts';
import { syntheticSheet } from '../../analysis/synthetic.ts';
import { doubtfulSheet, propsOf, propsWith } from '../fixture.ts';

describe('the split in one line', () => {
  it('is the ratio with its interval', () => {
    // 20 µmol/L of mono to 12 of bis, known to some per cent
    expect(splitSummary(propsOf(syntheticSheet(), 'a1'))).toMatch(
      /^mono : bis = 1\.6\d* : 1 \(95 %: 1\.[56]\d* to 1\.[67]\d*\)$/,
    );
  });

  it('is in words where a product is not to be seen', () => {
    const sheet = syntheticSheet({ aliquots: [{ arm: 8e-6, mono: 2e-5, bis: 0 }] });
    expect(splitSummary(propsOf(sheet, 'a1'))).toMatch(/^no bis to be seen \(less than .* %/);
  });

  it('does not pretend to wait for an aliquot that was refused', () => {
    const sheet = { ...doubtfulSheet(), fit: { windowNm: [300, 301] as const } };
    expect(splitSummary(propsOf(sheet, 'a1'))).toBe('no answer from this aliquot');
    expect(splitSummary(propsWith(sheet, 'a1', null))).toBe('no answer yet');
  });
});
