import { beforeEach, describe, expect, it } from 'vitest';
import { addAliquots, newSheet, removeAliquot, setTitle } from '../../../analysis/index.ts';
import {
  aliquot,
  change,
  chooseAliquot,
  isUnsaved,
  markSaved,
  redo,
  redoLabel,
  replaceSheet,
  sheet,
  undo,
  undoLabel,
} from '../../../renderer/state/store.ts';

const spectrum = { name: 'crude', wavelengthNm: [240, 241], absorbance: [0.1, 0.2] };
const titled = (title: string, gesture?: string): void =>
  change(`call it ${title}`, (before) => setTitle(before, title), gesture);

beforeEach(() => replaceSheet(newSheet(), { name: null, handle: null, isSaved: true }));

describe('the sheet on the page', () => {
  it('is unsaved from a change until it is saved, and no longer when the change is undone', () => {
    expect(isUnsaved.value).toBe(false);
    titled('a');
    expect(isUnsaved.value).toBe(true);
    undo();
    expect(isUnsaved.value).toBe(false);
    redo();
    markSaved(sheet.value, 'a.sheet.json', null);
    expect(isUnsaved.value).toBe(false);
  });

  it('is still unsaved if it changed while it was being written', () => {
    titled('written');
    const written = sheet.value;
    titled('typed meanwhile');
    markSaved(written, 'a.sheet.json', null);
    expect(isUnsaved.value).toBe(true);
  });

  it('names what undo and redo would do', () => {
    titled('a');
    titled('b');
    expect([undoLabel.value, redoLabel.value]).toEqual(['call it b', null]);
    undo();
    expect([undoLabel.value, redoLabel.value]).toEqual(['call it a', 'call it b']);
  });

  it('takes back a gesture as one step', () => {
    titled('before');
    titled('drag 1', 'drag');
    titled('drag 2', 'drag');
    titled('drag 3', 'drag');
    undo();
    expect(sheet.value.title).toBe('before');
  });

  it('leaves nothing of the sheet before in its history', () => {
    titled('of the old sheet');
    replaceSheet(newSheet(), { name: null, handle: null, isSaved: true });
    undo();
    expect(sheet.value.title).toBe('');
    expect(undoLabel.value).toBeNull();
  });

  it('shows the first aliquot until one is chosen, and again when the chosen one is gone', () => {
    expect(aliquot.value).toBeNull();
    change('add', (before) => addAliquots(before, [spectrum, spectrum], null));
    expect(aliquot.value).toBe('a1');
    chooseAliquot('a2');
    expect(aliquot.value).toBe('a2');
    change('remove', (before) => removeAliquot(before, 'a2'));
    expect(aliquot.value).toBe('a1');
  });
});
