import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  addAliquots,
  addNoiseScans,
  addRun,
  addSpecies,
  addStandards,
  addStockFor,
  newSheet,
  openSheet,
  removeAliquot,
  removeNoiseScans,
  removeRun,
  removeSpecies,
  removeStandard,
  removeStock,
  type Sheet,
  setFit,
  setReaction,
  setTitle,
  sheetText,
  updateAliquot,
  updateRun,
  updateSpecies,
  updateStandard,
  updateStock,
} from '../../../analysis/index.ts';

const spectrum = { name: 'x', wavelengthNm: [250, 251], absorbance: [0.1, null] };

/** Picks one of a list by a number; undefined from an empty one. */
function pick<T extends { readonly id: string }>(
  list: readonly T[] | undefined,
  at: number,
): string {
  return list?.[at % Math.max(list.length, 1)]?.id ?? 'nobody';
}

const edits: readonly ((sheet: Sheet, at: number) => Sheet)[] = [
  (sheet, at) => setTitle(sheet, `title ${at}`),
  (sheet, at) => setReaction(sheet, { sites: 1 + (at % 4), core: pick(sheet.species, at) }),
  (sheet, at) =>
    setFit(
      sheet,
      at % 2 ? { windowNm: [240, 300 + at] } : { windowNm: undefined, noise: undefined },
    ),
  (sheet, at) => addSpecies(sheet, { name: 'new', cores: at % 2, arms: at % 3 }),
  (sheet, at) => updateSpecies(sheet, pick(sheet.species, at), { absorbs: at % 2 === 0 }),
  (sheet, at) => removeSpecies(sheet, pick(sheet.species, at)),
  (sheet, at) => addStandards(sheet, [spectrum, spectrum], pick(sheet.species, at)),
  (sheet, at) =>
    updateStandard(sheet, pick(sheet.standards, at), {
      species: pick(sheet.species, at + 1),
      concentrationMolPerL: 1e-5,
    }),
  (sheet, at) =>
    updateStandard(sheet, pick(sheet.standards, at), { concentrationMolPerL: undefined }),
  (sheet, at) => removeStandard(sheet, pick(sheet.standards, at)),
  (sheet, at) => addStockFor(sheet, pick(sheet.standards, at)),
  (sheet, at) =>
    updateStock(sheet, pick(sheet.stocks, at), { relativeStandardUncertainty: at / 1000 }),
  (sheet, at) => removeStock(sheet, pick(sheet.stocks, at)),
  (sheet, at) => addAliquots(sheet, [spectrum], sheet.runs?.[at % 3]?.id ?? null),
  (sheet, at) => updateAliquot(sheet, pick(sheet.aliquots, at), { dilution: { factor: 1 + at } }),
  (sheet, at) => removeAliquot(sheet, pick(sheet.aliquots, at)),
  (sheet, at) => addNoiseScans(sheet, at % 2 ? [spectrum, spectrum] : [spectrum]),
  (sheet, at) => removeNoiseScans(sheet, pick(sheet.noiseScans, at)),
  (sheet, at) =>
    setFit(sheet, {
      strayLight: at % 3 ? 0.0005 : 'fit',
      shiftStandardUncertaintyNm: at % 2 ? 0.1 : undefined,
    }),
  (sheet, at) => addRun(sheet, pick(sheet.aliquots, at)),
  (sheet, at) =>
    updateRun(sheet, pick(sheet.runs, at), { chargedMol: { [pick(sheet.species, at)]: 0.01 } }),
  (sheet, at) => removeRun(sheet, pick(sheet.runs, at)),
];

describe('edits of a sheet', () => {
  it('never make a sheet that cannot be opened again, in whatever order', () => {
    const step = fc.tuple(fc.nat(edits.length - 1), fc.nat(20));
    fc.assert(
      fc.property(fc.array(step, { maxLength: 25 }), (steps) => {
        const sheet = steps.reduce((before, [edit, at]) => edits[edit]!(before, at), newSheet());
        expect(openSheet(sheetText(sheet)).sheet).toEqual(sheet);
      }),
      { numRuns: 400 },
    );
  });

  it('leave the sheet they were given as it was', () => {
    const before = newSheet();
    const text = sheetText(before);
    for (const edit of edits) edit(before, 1);
    expect(sheetText(before)).toBe(text);
  });

  it('take what belongs to a species with it, and never the core or the arm', () => {
    const filled = addStockFor(addStandards(newSheet(), [spectrum], 'bis'), 'S1');
    const without = removeSpecies(filled, 'bis');
    expect(without.standards).toEqual([]);
    expect(without.stocks).toEqual([]);
    expect(removeSpecies(filled, 'core')).toBe(filled);
  });

  it('make one group of the scans given together, of absorbances only', () => {
    const { absorbance: _, ...rest } = spectrum;
    const given = { ...rest, molarAbsorptivity: [1, 2] };
    const sheet = addNoiseScans(newSheet(), [spectrum, given, spectrum]);
    expect(sheet.noiseScans).toMatchObject([{ id: 'scans1', spectra: [{}, {}] }]);
    expect(addNoiseScans(newSheet(), [given])).toEqual(newSheet());
    const two = addNoiseScans(sheet, [spectrum]);
    expect(removeNoiseScans(two, 'scans1').noiseScans?.map(({ id }) => id)).toEqual(['scans2']);
    expect(addNoiseScans(removeNoiseScans(two, 'scans1'), [spectrum]).noiseScans?.[1]?.id).toBe(
      'scans1',
    );
  });
});
