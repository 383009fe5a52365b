import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { newSheet, openSheet, Refusal, sheetText } from '../../../analysis/index.ts';

function refusalOf(text: string): Refusal {
  try {
    openSheet(text, 'a.sheet.json');
  } catch (error) {
    if (error instanceof Refusal) return error;
    throw error;
  }
  throw new Error('the sheet was accepted');
}

/** A new sheet with some members replaced, as text. */
function sheetWith(members: object): string {
  return JSON.stringify({ ...newSheet(), ...members }, null, 2);
}

describe('opening a sheet', () => {
  it('takes a new sheet as it is written', () => {
    const { sheet, warnings } = openSheet(sheetText(newSheet()));
    expect(sheet).toEqual(newSheet());
    expect(warnings).toEqual([]);
  });

  it('keeps members that it does not know, and says so', () => {
    const text = sheetWith({ colour: 'blue', reaction: { ...newSheet().reaction, yield: 3 } });
    const { sheet, warnings } = openSheet(text);
    expect(JSON.parse(sheetText(sheet))).toEqual(JSON.parse(text));
    expect(warnings.map((warning) => /"(.*?)"/.exec(warning)?.[1])).toEqual(
      expect.arrayContaining(['colour', 'reaction.yield']),
    );
  });

  it('names the line of a wrong member', () => {
    const text = sheetWith({ reaction: { core: 'core', arm: 'arm', sites: 'two' } });
    const refusal = refusalOf(text);
    expect(refusal.code).toBe('sheet-invalid');
    expect(text.split('\n')[(refusal.where.line ?? 0) - 1]).toContain('"sites": "two"');
    expect(refusal.message).toContain('reaction.sites');
  });

  it('says which member is missing', () => {
    const { reaction, ...rest } = newSheet();
    expect(reaction.sites).toBe(2);
    expect(refusalOf(JSON.stringify(rest)).message).toBe('"reaction" is missing.');
  });

  it.each([
    ['', 'sheet-empty'],
    ['   \n', 'sheet-empty'],
    ['{"format": "monobis-sheet", ', 'sheet-not-json'],
    ['wavelength,absorbance\n250,0.1\n', 'sheet-not-json'],
    ['[]', 'not-a-sheet'],
    ['null', 'not-a-sheet'],
    ['{"format": "another"}', 'not-a-sheet'],
    ['{"format": "monobis-sheet", "version": 2}', 'sheet-newer'],
    ['{"format": "monobis-sheet", "version": "1"}', 'sheet-invalid'],
    [`${'['.repeat(200_000)}`, 'sheet-too-deep'],
  ])('refuses %j with %s', (text, code) => {
    const refusal = refusalOf(text);
    expect(refusal.code).toBe(code);
    expect(refusal.mend).not.toBe('');
  });

  it('refuses a member that stands twice, since one of them would be lost', () => {
    const refusal = refusalOf('{"format": "monobis-sheet",\n "version": 1,\n "version": 1}');
    expect(refusal.code).toBe('sheet-duplicate-member');
    expect(refusal.where.line).toBe(3);
  });

  const embedded = { name: 'x', wavelengthNm: [250, 251], absorbance: [0.1, null] };
  const standard = {
    id: 'S1',
    species: 'mono',
    spectrum: { file: 'a.csv' },
    concentrationMolPerL: 1,
  };
  it.each([
    [{ standards: [{ ...standard, species: 'nobody' }] }, 'unknown-reference'],
    [{ standards: [{ ...standard, stock: 'nothing' }] }, 'unknown-reference'],
    [{ standards: [standard, standard] }, 'duplicate-id'],
    [{ standards: [{ ...standard, spectrum: {} }] }, 'spectrum-source'],
    [{ standards: [{ ...standard, spectrum: { file: 'a.csv', embedded } }] }, 'spectrum-source'],
    [
      { standards: [{ ...standard, spectrum: { embedded: { ...embedded, absorbance: [1] } } }] },
      'embedded-lengths',
    ],
    [
      {
        standards: [
          { ...standard, spectrum: { embedded: { ...embedded, wavelengthNm: [251, 250] } } },
        ],
      },
      'embedded-order',
    ],
    [{ standards: [{ ...standard, concentrationMolPerL: -1 }] }, 'sheet-invalid'],
    [{ standards: [{ ...standard, pathLengthCm: 0 }] }, 'sheet-invalid'],
    [{ aliquots: [{ id: 'a', run: 'r', spectrum: { file: 'a.csv' } }] }, 'unknown-reference'],
    [{ aliquots: [{ id: 'a', spectrum: { file: 'a.csv' }, dilution: {} }] }, 'dilution-source'],
    [
      {
        aliquots: [
          { id: 'a', spectrum: { file: 'a.csv' }, dilution: { steps: [{ takeMl: 5, toMl: 1 }] } },
        ],
      },
      'dilution-concentrates',
    ],
    [{ runs: [{ id: 'r', chargedMol: { nobody: 1 } }] }, 'unknown-reference'],
    [{ fit: { windowNm: [400, 300] } }, 'sheet-invalid'],
    [{ runs: [{ id: 'constructor' }] }, 'sheet-invalid'],
    [{ fit: { baseline: 'curly' } }, 'sheet-invalid'],
    [
      { stocks: [{ id: 's', species: 'bis' }], standards: [{ ...standard, stock: 's' }] },
      'stock-of-another-species',
    ],
  ])('refuses what does not hang together: %j', (members, code) => {
    const refusal = refusalOf(sheetWith(members));
    expect(refusal.code).toBe(code);
    expect(refusal.where.line).toBeGreaterThan(0);
  });
});

describe('the text of a sheet', () => {
  it('gives back any JSON that a sheet may hold', () => {
    // -0 is the one number that JSON cannot bring back
    const json = fc
      .jsonValue({ maxDepth: 4 })
      .filter((value) => !Object.is(value, -0) && !JSON.stringify(value).includes('-0'));
    fc.assert(
      fc.property(json, (extra) => {
        const sheet = { ...newSheet(), extra };
        expect(JSON.parse(sheetText(sheet))).toEqual(JSON.parse(JSON.stringify(sheet)));
      }),
    );
  });

  it('keeps a list of numbers on one line', () => {
    const text = sheetText({ ...newSheet(), fit: { windowNm: [240, 450] } });
    expect(text).toContain('"windowNm": [240, 450]');
  });
});
