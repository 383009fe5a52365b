import { mkdir, mkdtemp, readdir, readFile, rm, symlink, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterAll, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest';
import type * as Fake from './fake-electron.ts';

vi.mock('electron', () => import('./fake-electron.ts'));

const electron = (await import('electron')) as unknown as typeof Fake;
const { channels } = await import('../../../main/desktop/channels.ts');
const { guardContents, guardSession, isOurs } = await import('../../../main/desktop/guards.ts');
const { handleChannels } = await import('../../../main/desktop/handlers.ts');
const { menuTemplate } = await import('../../../main/desktop/menu.ts');
const { printToPdf } = await import('../../../main/desktop/pdf.ts');
const { Places } = await import('../../../main/desktop/places.ts');
const { appFile } = await import('../../../main/desktop/protocol.ts');
const { readSheet } = await import('../../../main/desktop/read-files.ts');
const { confirmClose, openWindow } = await import('../../../main/desktop/window.ts');
const { newSheet, sheetText } = await import('../../../analysis/index.ts');

const ours = { senderFrame: { url: 'monobis://app/index.html', parent: null } };

let folder = '';
beforeAll(async () => {
  folder = await mkdtemp(path.join(tmpdir(), 'monobis-shell-'));
  await mkdir(path.join(folder, 'sheets'));
  await mkdir(path.join(folder, 'built/assets'), { recursive: true });
  await writeFile(path.join(folder, 'secret.csv'), 'not for the sheet');
  await writeFile(path.join(folder, 'built/index.html'), '<!doctype html>');
  await writeFile(path.join(folder, 'built/assets/app.js'), '0');
  await symlink(path.join(folder, 'secret.csv'), path.join(folder, 'built/link.js'));
});
afterAll(() => rm(folder, { recursive: true, force: true }));

function shell() {
  const ipc = new (electron as unknown as typeof Fake).FakeIpc();
  const window = new electron.BrowserWindow({ webPreferences: {} });
  const state = { places: new Places(), unsaved: false };
  // the stand-ins have what the shell uses of the real ones
  handleChannels(ipc as never, window as never, state);
  const call = (channel: string, event: unknown, ...args: unknown[]) =>
    ipc.handlers.get(channel)?.(event, ...args);
  return { ipc, state, call };
}

describe('the window', () => {
  it('is sandboxed, isolated and without Node, and loads our own origin', () => {
    const window = openWindow('/app/preload.cjs') as unknown as Fake.BrowserWindow;
    expect(window.options.webPreferences).toMatchObject({
      sandbox: true,
      contextIsolation: true,
      nodeIntegration: false,
      nodeIntegrationInWorker: false,
      webSecurity: true,
      webviewTag: false,
    });
    expect(window.loadURL).toHaveBeenCalledWith('monobis://app/index.html');
  });

  it('lets nothing navigate, open or attach', () => {
    const contents = new electron.FakeContents();
    guardContents(contents as never);
    for (const name of ['will-navigate', 'will-redirect', 'will-attach-webview']) {
      const event = { preventDefault: vi.fn() };
      contents.emit(name, event);
      expect(event.preventDefault, name).toHaveBeenCalledOnce();
    }
    expect(contents.windowOpen?.()).toEqual({ action: 'deny' });
  });

  it('grants no permission', () => {
    const session = {
      setPermissionRequestHandler: vi.fn(),
      setPermissionCheckHandler: vi.fn(),
      setDevicePermissionHandler: vi.fn(),
    };
    guardSession(session as never);
    const decide = vi.fn();
    session.setPermissionRequestHandler.mock.calls[0]?.[0](null, 'media', decide);
    expect(decide).toHaveBeenCalledWith(false);
    expect(session.setPermissionCheckHandler.mock.calls[0]?.[0]()).toBe(false);
    expect(session.setDevicePermissionHandler.mock.calls[0]?.[0]()).toBe(false);
  });

  it('asks before unsaved changes go', () => {
    const window = new electron.BrowserWindow({ webPreferences: {} });
    let isUnsaved = true;
    confirmClose(window as never, () => isUnsaved);
    const event = { preventDefault: vi.fn() };
    window.emit('close', event);
    expect(event.preventDefault).toHaveBeenCalledOnce();
    isUnsaved = false;
    window.emit('close', event);
    expect(event.preventDefault).toHaveBeenCalledOnce();
  });
});

describe('the channels', () => {
  beforeEach(() => vi.clearAllMocks());

  it.each([
    ['another origin', { senderFrame: { url: 'https://example.org/', parent: null } }],
    ['a look-alike', { senderFrame: { url: 'monobis://app.evil/index.html', parent: null } }],
    ['a frame within', { senderFrame: { url: 'monobis://app/index.html', parent: {} } }],
    ['no frame', { senderFrame: null }],
  ])('do not answer %s', async (_, event) => {
    expect(isOurs(event as never)).toBe(false);
    const { call } = shell();
    expect(await call(channels.openSheet, event)).toMatchObject({ ok: false });
    expect(electron.dialog.showOpenDialog).not.toHaveBeenCalled();
  });

  it.each([
    [channels.saveSheet, [{ text: 1, handle: null, suggestedName: 'a' }]],
    [channels.saveSheet, [{ text: 'x', handle: null, suggestedName: 'a', path: '/etc/passwd' }]],
    [channels.saveSheet, []],
    [channels.exportText, [{ text: 'x', suggestedName: 'a', kind: 'exe' }]],
    [channels.exportPdf, ['<p>']],
    [channels.openSheet, ['/etc/passwd']],
  ])('refuse arguments that are not theirs: %s %j', async (channel, args) => {
    const { call } = shell();
    expect(await call(channel, ours, ...args)).toMatchObject({
      ok: false,
      refusal: { code: 'not-allowed' },
    });
    expect(electron.dialog.showSaveDialog).not.toHaveBeenCalled();
  });

  it('save where the dialog says, then there again by handle; a forged handle asks anew', async () => {
    const { call } = shell();
    const file = path.join(folder, 'saved.sheet.json');
    electron.dialog.showSaveDialog.mockResolvedValue({ canceled: false, filePath: file });
    const first = await call(channels.saveSheet, ours, {
      text: 'one',
      handle: null,
      suggestedName: '../../x.sheet.json',
    });
    expect(first).toMatchObject({ ok: true, value: { name: 'saved.sheet.json' } });
    // a name cannot point the dialog at a folder
    expect(electron.dialog.showSaveDialog.mock.calls[0]).toMatchObject([
      {},
      { defaultPath: 'x.sheet.json' },
    ]);
    const { handle } = (first as { value: { handle: string } }).value;
    expect(handle).not.toContain(folder);
    await call(channels.saveSheet, ours, { text: 'two', handle, suggestedName: 'x' });
    expect(await readFile(file, 'utf8')).toBe('two');
    expect(electron.dialog.showSaveDialog).toHaveBeenCalledTimes(1);
    await call(channels.saveSheet, ours, { text: 'three', handle: file, suggestedName: 'x' });
    expect(electron.dialog.showSaveDialog).toHaveBeenCalledTimes(2);
  });

  it('leave no half file and no litter where a place cannot be written', async () => {
    const { call } = shell();
    const file = path.join(folder, 'sheets');
    electron.dialog.showSaveDialog.mockResolvedValue({ canceled: false, filePath: file });
    const answer = await call(channels.saveSheet, ours, {
      text: 'x',
      handle: null,
      suggestedName: 'x',
    });
    expect(answer).toMatchObject({ ok: false, refusal: { code: 'cannot-write' } });
    expect((await readdir(folder)).filter((name) => name.endsWith('.part'))).toEqual([]);
  });

  it('keep whether there are unsaved changes, from our page only', () => {
    const { ipc, state } = shell();
    ipc.listeners.get(channels.setUnsaved)?.({ senderFrame: null }, true);
    expect(state.unsaved).toBe(false);
    ipc.listeners.get(channels.setUnsaved)?.(ours, 'yes');
    expect(state.unsaved).toBe(false);
    ipc.listeners.get(channels.setUnsaved)?.(ours, true);
    expect(state.unsaved).toBe(true);
  });
});

describe('a sheet that names files', () => {
  it('gets those inside its own folder, and no other', async () => {
    const inside = path.join(folder, 'sheets');
    await writeFile(path.join(inside, 'good.csv'), 'nm,A\n250,0.1\n251,0.2\n');
    await symlink(path.join(folder, 'secret.csv'), path.join(inside, 'link.csv')).catch(() => {});
    const spectrum = (file: string) => ({
      id: file,
      species: 'mono',
      spectrum: { file },
      concentrationMolPerL: 1,
    });
    const names = ['good.csv', '../secret.csv', 'link.csv', '/etc/hostname', 'gone.csv'];
    const sheet = { ...newSheet(), standards: names.map(spectrum) };
    const file = path.join(inside, 'a.sheet.json');
    await writeFile(file, sheetText(sheet));
    const opened = await readSheet(file, new Places());
    expect(opened.files.map(({ name }) => name)).toEqual(['good.csv']);
    expect(opened.missing.map((each) => each.path)).toEqual(names.slice(1));
    expect(JSON.stringify(opened)).not.toContain('not for the sheet');
  });
});

describe("the app's own protocol", () => {
  const get = (address: string) =>
    appFile({ url: address, method: 'GET' }, path.join(folder, 'built'));

  it('serves built files with the policy', async () => {
    const response = await get('monobis://app/index.html');
    expect(response.status).toBe(200);
    expect(response.headers.get('content-security-policy')).toContain("default-src 'none'");
    expect(response.headers.get('content-security-policy')).not.toMatch(/unsafe/);
    expect((await get('monobis://app/assets/app.js')).headers.get('content-type')).toContain(
      'javascript',
    );
  });

  it.each([
    'monobis://app/../secret.csv',
    'monobis://app/%2e%2e/secret.csv',
    'monobis://app/..%2fsecret.csv',
    'monobis://app/%2e%2e%5csecret.csv',
    'monobis://app/link.js',
    'monobis://app/%00',
    'monobis://app/%E0%A4%A',
    'monobis://other/index.html',
    'monobis://app/assets',
  ])('refuses %s', async (address) => {
    expect((await get(address)).status).toBe(404);
  });
});

describe('printing', () => {
  it('happens in a window without script, and loads nothing but the report', async () => {
    const pdf = await printToPdf('<p>report</p>');
    expect(Buffer.from(pdf).toString()).toContain('%PDF');
    const window = (electron as unknown as typeof Fake).windows.at(-1)!;
    expect(window.options.webPreferences).toMatchObject({
      javascript: false,
      sandbox: true,
      nodeIntegration: false,
    });
    const filter = window.webContents.session.webRequest.onBeforeRequest.mock.calls[0]?.[0];
    const decide = vi.fn();
    filter({ url: 'https://example.org/x.png' }, decide);
    filter({ url: 'data:text/html,x' }, decide);
    expect(decide.mock.calls).toEqual([[{ cancel: true }], [{ cancel: false }]]);
    expect(window.destroy).toHaveBeenCalledOnce();
  });
});

describe('the menu', () => {
  it.each(['darwin', 'win32', 'linux'] as const)('offers every command on %s', (platform) => {
    const sent: string[] = [];
    const template = menuTemplate(
      platform,
      (command) => sent.push(command),
      () => {},
    );
    for (const { submenu } of template) {
      if (!Array.isArray(submenu)) throw new Error('a menu without entries');
      for (const entry of submenu)
        if (entry.label !== 'About Monobis') entry.click?.({} as never, undefined, {} as never);
    }
    expect(sent.sort()).toEqual(
      [
        'add-exports',
        'export-csv',
        'export-html',
        'export-pdf',
        'new-sheet',
        'open-sample',
        'open-sheet',
        'redo',
        'save',
        'save-as',
        'undo',
      ].sort(),
    );
  });
});
