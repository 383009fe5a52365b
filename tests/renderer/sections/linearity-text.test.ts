import { describe, expect, it } from 'vitest';
import type { StandardCurves } from '../../../analysis/index.ts';
import { linearityText } from '../../../renderer/sections/standards/linearity-text.ts';
import { doubtfulSheet, propsOf } from '../fixture.ts';

const sheet = doubtfulSheet();
const standards: readonly StandardCurves[] = propsOf(sheet, 'a1').quantification?.standards ?? [];
const withLinearity = (linearity: StandardCurves['linearity']): string =>
  linearityText(
    sheet,
    standards.slice(0, 1).map((each) => ({ ...each, linearity })),
  );

describe('how far the standards follow Beer-Lambert, in a sentence', () => {
  it('is told of every species', () => {
    expect(linearityText(sheet, standards)).toMatch(/arm: no bend up to 0\.9\d; mono: .*; bis: /);
  });

  it('says where they bend, and where nothing can be told', () => {
    expect(withLinearity({ testedUpTo: 1.5, straightUpTo: 1.05 })).toContain('bends above 1.05');
    expect(withLinearity({ testedUpTo: 1.5, straightUpTo: 0 })).toContain('from the start');
    expect(withLinearity(null)).toContain('too alike to tell');
  });
});
