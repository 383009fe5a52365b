import { describe, expect, it } from 'vitest';
import { type AliquotResult, prepare, quantifyAliquot } from '../../../analysis/index.ts';
import { codesOf, holds, noFiles } from '../fitted.ts';
import { type Conditions, simulated } from '../simulated.ts';

function measured(changes: Partial<Conditions>): AliquotResult {
  const { sheet } = simulated({ stock: 0, dilution: 0, ...changes });
  const aliquot = sheet.aliquots?.[0];
  if (!aliquot) throw new Error('no aliquot');
  return quantifyAliquot(prepare(sheet, noFiles), aliquot, noFiles).result;
}

function ratioOf({ ratios }: AliquotResult): number {
  return ratios[0]?.value.value ?? Number.NaN;
}

describe('a wavelength offset between crude and standards', () => {
  const seeds = Array.from({ length: 30 }, (_, i) => i + 1);

  it('is found, and the bias of the ratio goes with it', () => {
    const results = seeds.map((seed) =>
      measured({ seed, shiftNm: 0.3, stepNm: 2, fit: { shift: 'common' } }),
    );
    for (const { fit } of results)
      expect(Math.abs((fit.shiftNm.value ?? 0) - 0.3)).toBeLessThan(0.08);
    const shift = results.reduce((sum, { fit }) => sum + (fit.shiftNm.value ?? 0) / 30, 0);
    expect(Math.abs(shift - 0.3)).toBeLessThan(0.03);
    const ratio = results.reduce((sum, result) => sum + ratioOf(result) / 30, 0);
    // one ratio scatters by 0.4 % (measured), the mean of thirty by 0.07 %: three of those
    expect(Math.abs(ratio - 1)).toBeLessThan(0.0021);
  });

  it('is doubted where the sheet holds it at none', () => {
    const result = measured({ shiftNm: 0.3 });
    expect(codesOf(result)).toContain('wavelength-offset');
    expect(codesOf(result)).not.toContain('unexplained-band');
  });

  it('is known better with a prior, and drawn towards nothing by a tight one', () => {
    const free = measured({ shiftNm: 0.1, fit: { shift: 'common' } }).fit.shiftNm;
    const tight = measured({
      shiftNm: 0.1,
      fit: { shift: 'common', shiftStandardUncertaintyNm: 1e-4 },
    }).fit.shiftNm;
    expect(tight.standardUncertainty).toBeLessThan(free.standardUncertainty ?? 0);
    expect(Math.abs(tight.value ?? 1)).toBeLessThan(1e-3);
    const loose = measured({
      shiftNm: 0.1,
      fit: { shift: 'common', shiftStandardUncertaintyNm: 10 },
    }).fit.shiftNm;
    // a prior a thousand times as wide as the data's own says nothing
    expect(loose.value).toBeCloseTo(free.value ?? 0, 5);
  });
});

describe('stray light', () => {
  const strong = { absorbance: 1.6, strayLight: 0.005 };

  it('is told where it flattens strong absorbance', () => {
    const doubts = measured(strong).doubts.filter(({ code }) => code === 'saturated');
    expect(doubts[0]?.message).toMatch(/about 0\.\d+ % of stray light/);
    expect(codesOf(measured({ absorbance: 1.6 }))).not.toContain('saturated');
  });

  it('is found by the fit, and taken out as stated', () => {
    const fitted = measured({ ...strong, fit: { strayLight: 'fit' } });
    expect(fitted.fit.strayLight.from).toBe('fit');
    expect(holds(fitted.fit.strayLight, 0.005)).toBe(true);
    const stated = measured({ ...strong, fit: { strayLight: 0.005 } });
    expect(stated.fit.strayLight).toMatchObject({ value: 0.005, from: 'sheet' });
    for (const result of [fitted, stated]) {
      expect(holds(result.split[0]!.fraction, 0.5)).toBe(true);
      expect(codesOf(result)).not.toContain('saturated');
    }
    const ignored = measured(strong);
    expect(ignored.fit.reducedChiSquare).toBeGreaterThan(3 * (stated.fit.reducedChiSquare ?? 1));
  });
});
