import { mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';

vi.mock('electron', () => import('./fake-electron.ts'));

const { asReal, BrowserWindow, dialog, FakeIpc } = await import('./fake-electron.ts');
const { channels } = await import('../../../main/desktop/channels.ts');
const { handleChannels } = await import('../../../main/desktop/handlers.ts');
const { Places } = await import('../../../main/desktop/places.ts');
const { newSheet, sheetText } = await import('../../../analysis/index.ts');

const ours = asReal.frame({ url: 'monobis://app/index.html', parent: null });
const other = asReal.frame({ url: 'https://example.org/', parent: null });

let folder = '';
beforeEach(async () => {
  vi.resetAllMocks();
  folder = await mkdtemp(path.join(tmpdir(), 'monobis-channels-'));
});
afterEach(() => rm(folder, { recursive: true, force: true }));

function shell() {
  const ipc = new FakeIpc();
  const window = new BrowserWindow({});
  const state = { places: new Places(), unsaved: false };
  handleChannels(asReal.ipcMain(ipc), asReal.window(window), state);
  const call = async (channel: string, event: unknown, ...args: unknown[]): Promise<unknown> =>
    ipc.handlers.get(channel)?.(event, ...args);
  return { ipc, state, call };
}

const saving = (more: object = {}) => ({
  text: 'one',
  handle: null,
  suggestedName: 'x.sheet.json',
  ...more,
});

function choose(filePath: string): void {
  dialog.showSaveDialog.mockResolvedValue({ canceled: false, filePath });
}

const noDialog = () =>
  [dialog.showOpenDialog, dialog.showSaveDialog].every(({ mock }) => mock.calls.length === 0);

describe('a channel', () => {
  it.each([
    [channels.openSheet, []],
    [channels.openExports, []],
    [channels.saveSheet, [saving()]],
    [channels.exportText, [{ text: 'x', suggestedName: 'a', kind: 'csv' }]],
    [channels.exportPdf, [{ html: '<p>', suggestedName: 'a' }]],
  ])('%s answers our own page only', async (channel, args) => {
    const { call } = shell();
    expect(await call(channel, other, ...args)).toMatchObject({ ok: false });
    expect(noDialog()).toBe(true);
    expect(await call(channel, ours, ...args)).toMatchObject({ ok: true });
    expect(noDialog()).toBe(false);
  });

  it.each([
    [channels.saveSheet, [saving({ text: 1 })]],
    [channels.saveSheet, [saving({ path: '/etc/passwd' })]],
    [channels.saveSheet, [saving({ suggestedName: 'x'.repeat(201) })]],
    [channels.saveSheet, [saving(), 1]],
    [channels.saveSheet, []],
    [channels.exportText, [{ text: 'x', suggestedName: 'a', kind: 'exe' }]],
    [channels.exportPdf, ['<p>']],
    [channels.openSheet, ['/etc/passwd']],
    [channels.openExports, [['/etc/passwd']]],
  ])('%s refuses arguments that are not its own', async (channel, args) => {
    const { call } = shell();
    const refused = { ok: false, refusal: { code: 'not-allowed' } };
    expect(await call(channel, ours, ...args)).toMatchObject(refused);
    expect(noDialog()).toBe(true);
  });

  it('keeps whether something is unsaved, said by our page in so many words', () => {
    const { ipc, state } = shell();
    const say = (event: unknown, value: unknown): boolean => {
      ipc.listeners.get(channels.setUnsaved)?.(event, value);
      return state.unsaved;
    };
    expect(say(other, true)).toBe(false);
    expect(say(ours, 'yes')).toBe(false);
    expect(say(ours, true)).toBe(true);
  });
});

describe('saving', () => {
  it('asks for a place once, then goes there by handle', async () => {
    const { call } = shell();
    const file = path.join(folder, 'saved.sheet.json');
    choose(file);
    const first = await call(channels.saveSheet, ours, saving());
    expect(first).toEqual({
      ok: true,
      value: { name: 'saved.sheet.json', handle: expect.stringMatching(/^[\da-f-]{36}$/) },
    });
    const { handle } = (first as { value: { handle: string } }).value;
    await call(channels.saveSheet, ours, saving({ text: 'two', handle }));
    expect(await readFile(file, 'utf8')).toBe('two');
    expect(dialog.showSaveDialog).toHaveBeenCalledTimes(1);
  });

  it('asks anew for a handle that was not given out, a path above all', async () => {
    const { call } = shell();
    const forged = path.join(folder, 'forged.sheet.json');
    expect(await call(channels.saveSheet, ours, saving({ handle: forged }))).toEqual({
      ok: true,
      value: null,
    });
    expect(dialog.showSaveDialog).toHaveBeenCalledTimes(1);
    expect(await readdir(folder)).toEqual([]);
  });

  it.each(['../../x.sheet.json', '/etc/x.sheet.json', 'C:\\Windows\\x.sheet.json'])(
    'takes of the name %s no folder',
    async (suggestedName) => {
      const { call } = shell();
      await call(channels.saveSheet, ours, saving({ suggestedName }));
      expect(dialog.showSaveDialog.mock.calls[0]?.[1]).toMatchObject({
        defaultPath: 'x.sheet.json',
      });
    },
  );

  it('adds the ending that a dialog has not, and asks before it replaces that file', async () => {
    const { call } = shell();
    choose(path.join(folder, 'mine'));
    expect(await call(channels.saveSheet, ours, saving())).toMatchObject({
      value: { name: 'mine.sheet.json' },
    });
    // answered with Cancel
    expect(await call(channels.saveSheet, ours, saving({ text: 'two' }))).toMatchObject({
      value: null,
    });
    expect(await readFile(path.join(folder, 'mine.sheet.json'), 'utf8')).toBe('one');
    dialog.showMessageBox.mockResolvedValueOnce({ response: 1, checkboxChecked: false });
    await call(channels.saveSheet, ours, saving({ text: 'two' }));
    expect(await readFile(path.join(folder, 'mine.sheet.json'), 'utf8')).toBe('two');
  });

  it('says in words where a place cannot be written', async () => {
    const { call } = shell();
    choose(path.join(folder, 'gone/x.sheet.json'));
    expect(await call(channels.saveSheet, ours, saving())).toMatchObject({
      ok: false,
      refusal: { code: 'cannot-write', mend: expect.stringContaining('folder') },
    });
  });
});

describe('exports', () => {
  it('are written where the dialog says, and only their name comes back', async () => {
    const { call } = shell();
    choose(path.join(folder, 'out.csv'));
    const answer = await call(channels.exportText, ours, {
      text: 'a,b\n',
      suggestedName: 'out.csv',
      kind: 'csv',
    });
    expect(answer).toEqual({ ok: true, value: 'out.csv' });
    expect(await readFile(path.join(folder, 'out.csv'), 'utf8')).toBe('a,b\n');
  });

  it('are printed to PDF', async () => {
    const { call } = shell();
    choose(path.join(folder, 'report.pdf'));
    await call(channels.exportPdf, ours, { html: '<p>', suggestedName: 'report.pdf' });
    expect(await readFile(path.join(folder, 'report.pdf'), 'latin1')).toMatch(/^%PDF/);
  });
});

describe('opening', () => {
  it('reads what the dialog named', async () => {
    const { call } = shell();
    const file = path.join(folder, 'a.sheet.json');
    await writeFile(file, sheetText(newSheet()));
    dialog.showOpenDialog.mockResolvedValueOnce({ canceled: false, filePaths: [file] });
    const answer = await call(channels.openSheet, ours);
    expect(answer).toMatchObject({ ok: true, value: { name: 'a.sheet.json', files: [] } });
    expect(JSON.stringify(answer)).not.toContain(folder);
  });

  it('a sheet opened is saved to its own place', async () => {
    const { call, state } = shell();
    const file = path.join(folder, 'a.sheet.json');
    await writeFile(file, 'old');
    const handle = state.places.handleOf(file);
    await call(channels.saveSheet, ours, saving({ text: 'new', handle }));
    expect(await readFile(file, 'utf8')).toBe('new');
    expect(dialog.showSaveDialog).not.toHaveBeenCalled();
  });
});
