import { beforeEach, describe, expect, it, vi } from 'vitest';
import { newSheet, readExport, updateSpecies } from '../../../analysis/index.ts';
import { addExports, leaveOut, likelySpecies, pending } from '../../../renderer/import/imports.ts';
import { dismiss, notices } from '../../../renderer/state/notices.ts';
import { replaceSheet, sheet, sheetsShown, undo } from '../../../renderer/state/store.ts';

// no worker under Node: the same reading, in the same thread
vi.mock('../../../renderer/worker/analysis-client.ts', () => ({
  readFileBytes: async (name: string, bytes: Uint8Array) => readExport(bytes, name),
}));

const file = (name: string, text: string) => ({ name, bytes: new TextEncoder().encode(text) });
const table = (...headings: string[]): string => {
  const rows = Array.from({ length: 5 }, (_, i) =>
    [240 + i, ...headings.map((_heading, k) => (0.1 * (i + k + 1)).toFixed(3))].join(','),
  );
  return [`wavelength (nm),${headings.join(',')}`, ...rows].join('\n');
};

beforeEach(() => {
  replaceSheet(newSheet(), { name: null, handle: null, isSaved: true });
  pending.value = null;
  for (const { id } of notices.value) dismiss(id);
});

describe('exports that are taken in', () => {
  it('become one entry a trace, as one step that can be undone', async () => {
    await addExports([file('two.csv', table('first', 'second'))], 'aliquots');
    expect(sheet.value.aliquots?.map(({ spectrum }) => spectrum.embedded?.name)).toEqual([
      'first',
      'second',
    ]);
    expect(notices.value.some(({ details = [] }) => details.length === 2)).toBe(true);
    undo();
    expect(sheet.value.aliquots).toEqual([]);
  });

  it('are never put into a run by guess: aliquots of a run count as replicates', async () => {
    const runs = [{ id: 'r1', name: 'the first' }];
    replaceSheet({ ...newSheet(), runs }, { name: null, handle: null, isSaved: true });
    await addExports([file('crude.csv', table('crude'))], 'aliquots');
    expect(sheet.value.aliquots?.[0]?.run).toBeUndefined();
  });

  it('that fail are told with their reason, and the others are taken all the same', async () => {
    await addExports([file('empty.csv', ''), file('good.csv', table('crude'))], 'aliquots');
    expect(sheet.value.aliquots).toHaveLength(1);
    const refusal = notices.value.find(({ kind }) => kind === 'refusal');
    expect(refusal?.details?.[0]).toContain('empty.csv');
  });

  it('whose place is not known wait for the question, and a second drop joins them', async () => {
    await addExports([file('one.csv', table('one'))], null);
    await addExports([file('two.csv', table('two'))], null);
    expect(pending.value?.map(({ name }) => name)).toEqual(['one', 'two']);
    expect(sheet.value.aliquots).toEqual([]);
    if (pending.value) leaveOut(pending.value);
    expect(notices.value.at(-1)?.text).toContain('2 spectra left out');
  });
});

describe('scans that show the noise', () => {
  it('are one group for each drop, as one step that can be undone', async () => {
    await addExports([file('scans.csv', table('first', 'second', 'third'))], 'noise-scans');
    await addExports([file('a.csv', table('a')), file('b.csv', table('b'))], 'noise-scans');
    expect(sheet.value.noiseScans?.map(({ spectra }) => spectra.length)).toEqual([3, 2]);
    undo();
    expect(sheet.value.noiseScans).toHaveLength(1);
    expect(sheet.value.aliquots ?? []).toEqual([]);
  });

  it('are absorbances: a molar absorptivity is left out by name', async () => {
    const epsilon = [
      'wavelength (nm),molar absorptivity (L/mol/cm)',
      ...Array.from({ length: 5 }, (_, i) => `${240 + i},${1000 + i}`),
    ].join('\n');
    await addExports([file('epsilon.csv', epsilon)], 'noise-scans');
    expect(sheet.value.noiseScans).toBeUndefined();
    const refusal = notices.value.find(({ kind }) => kind === 'refusal');
    expect(refusal?.details?.[0]).toContain('epsilon.csv');
  });
});

describe('the species of a standard', () => {
  const named = (source: string, name: string) => ({
    name,
    wavelengthNm: [240, 241],
    absorbance: [0, 0],
    source: { file: source, sha256: '' },
  });

  it('is taken from a word in the heading or the file name', () => {
    expect(likelySpecies(newSheet(), named('bis-A1.csv', 'absorbance'))).toEqual({
      species: 'bis',
      isNamed: true,
    });
    const sheet = updateSpecies(newSheet(), 'mono', { name: 'mono adduct' });
    expect(likelySpecies(sheet, named('x.csv', 'Mono adduct 20 µM')).species).toBe('mono');
  });

  it('is not read out of the middle of another word', () => {
    const guess = likelySpecies(newSheet(), named('pharma.csv', 'alarm monobis'));
    expect(guess.isNamed).toBe(false);
  });

  it('is the longest that stands there', () => {
    const sheet = updateSpecies(newSheet(), 'bis', { name: 'mono bis' });
    expect(likelySpecies(sheet, named('mono bis.csv', '')).species).toBe('bis');
  });

  it('is said to be a guess, with its reason', async () => {
    await addExports([file('lamp.csv', table('lamp'))], 'standards');
    const guess = notices.value.find(({ text }) => text.includes('guessed'));
    expect(guess?.details?.[0]).toContain('nothing in its name says which');
  });
});

describe('exports still being read when another sheet is opened', () => {
  it('do not end up in it, and are named to be dropped again', async () => {
    const next = { name: null, handle: null, isSaved: true };
    const taken = addExports([file('late.csv', table('late'))], 'standards');
    replaceSheet(newSheet(), next);
    await taken;
    // nor those that the browser still had to read before they came here
    const shown = sheetsShown.peek();
    replaceSheet(newSheet(), next);
    await addExports([file('later.csv', table('later'))], 'standards', shown);
    expect(sheet.value.standards ?? []).toEqual([]);
    expect(notices.value.some(({ details = [] }) => details.includes('late.csv'))).toBe(true);
    expect(notices.value.some(({ details = [] }) => details.includes('later.csv'))).toBe(true);
  });
});
