import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  addAliquots,
  addNoiseScans,
  addRun,
  addStandards,
  addStockFor,
  type EmbeddedSpectrum,
  newSheet,
  openSheet,
  removeAliquot,
  removeNoiseScans,
  removeRun,
  removeSpecies,
  removeStandard,
  removeStock,
  renameSpecies,
  type Sheet,
  setReaction,
  sheetText,
  updateAliquot,
  updateRun,
  updateSpecies,
  updateStandard,
  updateStock,
  whyNotRename,
} from '../../../analysis/index.ts';

const spectrum: EmbeddedSpectrum = {
  name: 'a trace',
  wavelengthNm: [240, 241, 242],
  absorbance: [0.1, null, 0.3],
  source: { file: 'a.csv', sha256: 'ab' },
};

/** A sheet with something of everything, and all that can refer to a species referring to mono. */
function filled(): Sheet {
  const withStock = addStockFor(addStandards(newSheet(), [spectrum, spectrum], 'mono'), 'S1');
  const withRun = addAliquots(addRun(withStock), [spectrum, spectrum], 'r1');
  return updateRun(withRun, 'r1', { chargedMol: { core: 0.01, mono: 0.001 } });
}

const number = fc.double({ min: 1e-9, max: 1e4, noNaN: true });
const id = fc.oneof(
  fc.constantFrom('core', 'arm', 'mono', 'bis', 'species1', 'S1', 'S2', 'a1', 'a2', 'r1', 'r2'),
  fc.constantFrom('mono-stock1', 'bis-stock1', 'not there', '__proto__', 'constructor', ''),
  fc.string({ maxLength: 250 }),
);
const idOrNone = fc.option(id, { nil: undefined });
const some = { requiredKeys: [] };

type Edit = (sheet: Sheet) => Sheet;
const withId = (edit: (sheet: Sheet, id: string) => Sheet): fc.Arbitrary<Edit> =>
  id.map((one) => (sheet) => edit(sheet, one));
const withChanges = <T>(
  changes: fc.Arbitrary<T>,
  edit: (sheet: Sheet, id: string, changes: T) => Sheet,
): fc.Arbitrary<Edit> =>
  fc.tuple(id, changes).map(
    ([one, what]) =>
      (sheet) =>
        edit(sheet, one, what),
  );

/** Edits that name anything, what is not there among it. */
const edit: fc.Arbitrary<Edit> = fc.oneof(
  withChanges(fc.record({ core: id, arm: id }, some), (sheet, _, what) => setReaction(sheet, what)),
  withChanges(fc.record({ absorbs: fc.boolean() }), updateSpecies),
  withChanges(id, renameSpecies),
  withId(removeSpecies),
  withId((sheet, species) => addStandards(sheet, [spectrum], species)),
  withChanges(
    fc.record({ species: id, stock: idOrNone, concentrationMolPerL: number }, some),
    updateStandard,
  ),
  withId(removeStandard),
  withId(addStockFor),
  withChanges(fc.record({ species: id, relativeStandardUncertainty: number }, some), updateStock),
  withId(removeStock),
  withId((sheet, run) => addAliquots(sheet, [spectrum], run)),
  withChanges(fc.record({ run: idOrNone, pathLengthCm: number }, some), updateAliquot),
  withId(removeAliquot),
  withId((sheet) => addNoiseScans(sheet, [spectrum])),
  withId(removeNoiseScans),
  withId(addRun),
  withChanges(fc.record({ chargedMol: fc.dictionary(id, number, { maxKeys: 3 }) }), updateRun),
  withId(removeRun),
);

describe('an edit that names anything', () => {
  it('leaves a sheet that opens again as it was saved', () => {
    fc.assert(
      fc.property(fc.array(edit, { minLength: 1, maxLength: 25 }), (edits) => {
        const sheet = edits.reduce((before, apply) => apply(before), filled());
        const text = sheetText(sheet);
        expect(openSheet(text).sheet).toEqual(JSON.parse(text));
      }),
      { numRuns: 500 },
    );
  });
});

describe('renaming a species', () => {
  it('takes along all that refers to it', () => {
    const sheet = renameSpecies(filled(), 'mono', 'half');
    expect(sheet.species.map((species) => species.id)).toEqual(['core', 'arm', 'half', 'bis']);
    expect(sheet.stocks?.map(({ species }) => species)).toEqual(['half']);
    expect(sheet.standards?.map(({ species }) => species)).toEqual(['half', 'half']);
    expect(sheet.runs?.[0]?.chargedMol).toEqual({ core: 0.01, half: 0.001 });
    expect(renameSpecies(sheet, 'core', 'ketone').reaction.core).toBe('ketone');
  });

  it('there and back is where it was', () => {
    expect(renameSpecies(renameSpecies(filled(), 'mono', 'half'), 'half', 'mono')).toEqual(
      filled(),
    );
  });

  it('to the id of another is refused in words, and changes nothing', () => {
    const sheet = filled();
    expect(whyNotRename(sheet, 'mono', 'bis')).toContain('another species');
    expect(renameSpecies(sheet, 'mono', 'bis')).toBe(sheet);
    expect(whyNotRename(sheet, 'mono', '')).toContain('needed');
    expect(whyNotRename(sheet, 'mono', 'mono')).toBeNull();
  });
});

describe('what is left behind', () => {
  it('a run or a stock that goes leaves what came from it', () => {
    const sheet = removeStock(removeRun(filled(), 'r1'), 'mono-stock1');
    expect(sheet.aliquots?.map(({ run }) => run)).toEqual([undefined, undefined]);
    expect(sheet.standards?.map(({ stock }) => stock)).toEqual([undefined, undefined]);
  });

  it('a standard that changes its species lets go of the stock of the old one', () => {
    const sheet = updateStandard(filled(), 'S1', { species: 'bis' });
    expect(sheet.standards?.[0]).toMatchObject({ species: 'bis' });
    expect(sheet.standards?.[0]).not.toHaveProperty('stock');
  });

  it('a new thing gets an id that nobody has, also after a removal in the middle', () => {
    const sheet = addAliquots(removeAliquot(filled(), 'a1'), [spectrum, spectrum], null);
    expect(sheet.aliquots?.map((aliquot) => aliquot.id).sort()).toEqual(['a1', 'a2', 'a3']);
  });
});
