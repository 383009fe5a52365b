import { describe, expect, it } from 'vitest';
import { estimateMissing, Refusal } from '../../analysis/index.ts';
import { noFiles } from './fitted.ts';
import { syntheticSheet, usual } from './synthetic.ts';

const hidden = (nm: number) => Math.exp(-0.5 * ((nm - 300) / 10) ** 2);
const amounts = { arm: 8e-6, mono: 2e-5, bis: 1.2e-5 };

/** Aliquots that all hold the hidden band, the products in the same proportions; the hidden one in others. */
function sheetWith(heights: readonly number[]) {
  const sheets = heights.map((height, index) =>
    syntheticSheet({
      ...usual,
      seed: 7,
      aliquots: [amounts],
      extra: (nm) => height * hidden(nm),
    }).aliquots?.map((aliquot) => ({ ...aliquot, id: `a${index + 1}` })),
  );
  return { ...syntheticSheet({ seed: 7 }), aliquots: sheets.flatMap((aliquots) => aliquots ?? []) };
}

const truth = amounts.mono / (amounts.mono + amounts.bis);

describe('the spectrum of a species without a standard', () => {
  const found = estimateMissing(sheetWith([0.02, 0.05, 0.08]), noFiles);

  it('comes out in shape', () => {
    const expected = found.wavelengthNm.map(hidden);
    const dot = (a: Float64Array, b: Float64Array) =>
      a.reduce((sum, v, i) => sum + v * (b[i] ?? 0), 0);
    const cosine =
      dot(found.shape, expected) /
      Math.sqrt(dot(found.shape, found.shape) * dot(expected, expected));
    expect(cosine).toBeGreaterThan(0.99);
    expect(Math.max(...found.shape)).toBeCloseTo(1, 12);
    expect(Math.min(...found.shape)).toBeGreaterThanOrEqual(0);
  });

  it('in each aliquot as strong as it is, and the split beside it right', () => {
    expect(found.aliquots.map(({ aliquot }) => aliquot)).toEqual(['a1', 'a2', 'a3']);
    for (const [index, height] of [0.02, 0.05, 0.08].entries()) {
      const { absorbance, without, fraction } = found.aliquots[index]!;
      // the shape is known within its noise, its largest point included: a few percent
      expect(Math.abs(absorbance / height - 1)).toBeLessThan(0.1);
      expect(Math.abs(fraction! - truth)).toBeLessThan(0.1 * Math.abs(without! - truth) + 0.004);
    }
  });

  it('is refused where none is hidden, and where only one aliquot shows it', () => {
    for (const heights of [
      [0, 0, 0],
      [0.05, 0],
    ]) {
      expect(() => estimateMissing(sheetWith(heights), noFiles)).toThrow(Refusal);
    }
  });
});
