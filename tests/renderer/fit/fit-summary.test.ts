import { describe, expect, it } from 'vitest';
import { fitSummary } from '../../../renderer/sections/fit/fit-summary.ts';
import { noiseText } from '../../../renderer/sections/fit/noise-text.ts';
import { whyNotFitted } from '../../../renderer/sections/fit/why-not-fitted.ts';
import { doubtfulSheet, propsOf, propsWith } from '../fixture.ts';

describe('why an aliquot has no fit', () => {
  it('is what the whole sheet lacks, if it lacks anything', () => {
    const props = propsWith(doubtfulSheet(), 'a1', null, 'There is no standard of bis.');
    expect(whyNotFitted(props)).toBe('There is no standard of bis.');
  });

  it('is the refusal of this aliquot, with its mend', () => {
    const sheet = { ...doubtfulSheet(), fit: { windowNm: [300, 301] as const } };
    const props = propsOf(sheet, 'a1');
    expect(props.quantification?.results.refused).toHaveLength(1);
    expect(whyNotFitted(props)).toMatch(/points.*Widen the window/);
    expect(whyNotFitted({ ...props, aliquot: 'a2' })).toBeNull();
  });

  it('is nothing where there is a fit, or none is there yet', () => {
    expect(whyNotFitted(propsOf(doubtfulSheet(), 'a1'))).toBeNull();
    expect(whyNotFitted(propsWith(doubtfulSheet(), 'a1', null))).toBeNull();
  });
});

describe('the noise in words', () => {
  it('speaks of the parts that are there', () => {
    expect(noiseText({ constant: 3e-4, transmittance: 2e-4 })).toBe(
      '0.30 mAU constant, 0.20 mAU from transmittance',
    );
    expect(noiseText({ constant: 0, transmittance: 2.9e-4 })).toBe('0.29 mAU from transmittance');
    expect(noiseText({ constant: 0, transmittance: 0 })).toBe('none');
  });
});

describe('the fit in one line', () => {
  it('says what was fitted and how well', () => {
    expect(fitSummary(propsOf(doubtfulSheet(), 'a1'))).toMatch(
      /^a1: 176 points, 260 to 440 nm, residual \d+(\.\d+)? mAU$/,
    );
  });

  it('tells an aliquot that cannot be fitted from one that is not fitted yet', () => {
    const narrow = { ...doubtfulSheet(), fit: { windowNm: [300, 301] as const } };
    expect(fitSummary(propsOf(narrow, 'a1'))).toBe('a1: cannot be fitted');
    expect(fitSummary(propsWith(narrow, 'a1', null))).toBe('nothing fitted yet');
  });
});
