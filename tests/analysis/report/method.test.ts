import { describe, expect, it } from 'vitest';
import { addNoiseScans, setFit } from '../../../analysis/index.ts';
import { methodHtml } from '../../../analysis/report/sections/closing.ts';
import { sheet } from './fixture.ts';

const { noise: _, ...fit } = sheet.fit ?? {};
const plain = { ...sheet, fit };
const scan = { name: 'blank', wavelengthNm: [250, 251], absorbance: [0, 0] };
const method = (of: typeof sheet): string => methodHtml(of, 'monobis test');

describe('the method part of the report', () => {
  it('says how far the wavelength offset was free', () => {
    expect(method(plain)).toContain('taken to agree in wavelength');
    expect(method(setFit(plain, { shift: 'common' }))).toContain('left free');
    expect(method(setFit(plain, { shift: 'common', shiftStandardUncertaintyNm: 0.1 }))).toContain(
      'wavelength scale of 0.1 nm',
    );
  });

  it('names the stray light: none, stated or found', () => {
    expect(method(plain)).toContain('No stray light');
    // 100 × 0.0007 is 0.06999999999999999
    expect(method(setFit(plain, { strayLight: 0.0007 }))).toContain(
      'stated as 0.07 % of the light',
    );
    expect(method(setFit(plain, { strayLight: 'fit' }))).toContain('found by the fit');
  });

  it('names where the noise is from: stated before scans, scans before the spectrum', () => {
    expect(method(plain)).toContain('estimated from the spectrum');
    const scanned = addNoiseScans(addNoiseScans(plain, [scan, scan, scan]), [scan]);
    expect(method(scanned)).toContain('taken from 4 scans of 2 cuvettes');
    const noise = { constant: 3e-4, transmittance: 2e-4 };
    expect(method(setFit(scanned, { noise }))).toContain('The noise was given: 0.3 mAU');
  });
});
