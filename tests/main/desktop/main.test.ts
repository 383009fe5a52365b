import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';

const fake = await import('./fake-electron.ts');
// the program is loaded anew for every test; the stand-in stays the same one
vi.doMock('electron', () => fake);

const { argv } = process;
/** What the program listens to for its own faults must not hide those of other tests. */
const faults = ['uncaughtException', 'unhandledRejection'] as const;
const before = faults.map((name) => [name, process.rawListeners(name)] as const);

let folder = '';
beforeEach(async () => {
  vi.resetModules();
  fake.forget();
  folder = await mkdtemp(path.join(tmpdir(), 'monobis-main-'));
  fake.app.getPath.mockReturnValue(folder);
});
afterEach(async () => {
  process.argv = argv;
  for (const [name, listeners] of before) {
    process.removeAllListeners(name);
    for (const listener of listeners) Reflect.apply(process.on, process, [name, listener]);
  }
  await rm(folder, { recursive: true, force: true });
});

/** Starts the program and waits until it has its window, or has given up. */
async function started(...args: string[]) {
  process.argv = ['/bin/electron', '/the/app', ...args];
  await import('../../../main/desktop/main.ts');
  await vi.waitFor(() => {
    if (
      fake.windows.length + fake.app.quit.mock.calls.length + fake.app.exit.mock.calls.length ===
      0
    )
      throw new Error('not yet');
  });
  return fake.windows[0];
}

/** The sheets, or refusals, that were sent to the page. */
const opened = (window: InstanceType<typeof fake.BrowserWindow> | undefined): unknown[] =>
  (window?.webContents.sent ?? [])
    .filter(([channel]) => channel === 'monobis:open-requested')
    .map(([, answer]) => answer);

async function sheet(name: string): Promise<string> {
  await writeFile(path.join(folder, name), '{}');
  return path.join(folder, name);
}

describe('the program', () => {
  it('is sandboxed and has its scheme before it is ready; every page is guarded', async () => {
    const order: string[] = [];
    fake.app.enableSandbox.mockImplementation(() => order.push('sandbox'));
    fake.app.whenReady.mockImplementation(async () => void order.push('ready'));
    const window = await started();
    expect(order).toEqual(['sandbox', 'ready']);
    expect(fake.protocol.schemes).toHaveLength(1);
    expect(fake.protocol.isProtocolHandled('monobis')).toBe(true);
    expect(fake.session.defaultSession.setPermissionRequestHandler).toHaveBeenCalledOnce();
    expect(window?.webContents.windowOpen).not.toBeNull();
    expect(window?.webContents.listenerCount('will-navigate')).toBe(1);
    expect(fake.ipcMain.handlers.size).toBe(5);
    expect(fake.Menu.setApplicationMenu).toHaveBeenCalledOnce();
  });

  it('runs once: a second one leaves at once, without a window', async () => {
    fake.app.requestSingleInstanceLock.mockReturnValue(false);
    expect(await started()).toBeUndefined();
    expect(fake.app.quit).toHaveBeenCalledOnce();
    expect(fake.app.whenReady).not.toHaveBeenCalled();
  });

  it('ends with words where it cannot start', async () => {
    const write = vi.spyOn(process.stderr, 'write').mockReturnValue(true);
    fake.app.whenReady.mockRejectedValue(new Error('no display'));
    await started();
    write.mockRestore();
    expect(fake.dialog.showErrorBox.mock.calls[0]?.[1]).toContain('no display');
    expect(fake.dialog.showErrorBox.mock.calls[0]?.[1]).not.toMatch(/\n\s+at /);
    expect(fake.app.exit).toHaveBeenCalledWith(1);
  });

  it('keeps where its window stood', async () => {
    const window = await started();
    window?.emit('close', { preventDefault: () => {} });
    vi.resetModules();
    fake.forget();
    fake.app.getPath.mockReturnValue(folder);
    expect((await started())?.options).toMatchObject({ x: 10, y: 20, width: 1100, height: 800 });
  });
});

describe('a sheet', () => {
  it('named on the command line opens once the page is there', async () => {
    const window = await started(await sheet('a.sheet.json'));
    expect(opened(window)).toEqual([]);
    window?.webContents.emit('did-finish-load');
    await expect
      .poll(() => opened(window))
      .toMatchObject([{ ok: true, value: { name: 'a.sheet.json', text: '{}' } }]);
  });

  it('named by a second start opens in the first, which comes to the front', async () => {
    const window = await started();
    window?.webContents.emit('did-finish-load');
    await sheet('b.sheet.json');
    fake.app.emit('second-instance', {}, ['/bin/electron', '/the/app', 'b.sheet.json'], folder);
    await expect.poll(() => opened(window)).toMatchObject([{ value: { name: 'b.sheet.json' } }]);
    expect(window?.restore).toHaveBeenCalledOnce();
    expect(window?.focus).toHaveBeenCalledOnce();
  });

  it('opened by a double click before the program is ready is not lost', async () => {
    const file = await sheet('c.sheet.json');
    fake.app.whenReady.mockImplementation(async () => {
      fake.app.emit('open-file', { preventDefault: () => {} }, file);
    });
    const window = await started();
    window?.webContents.emit('did-finish-load');
    await expect.poll(() => opened(window).length).toBe(1);
  });

  it('that cannot be read is refused in words on the page', async () => {
    const window = await started(path.join(folder, 'gone.sheet.json'));
    window?.webContents.emit('did-finish-load');
    await expect
      .poll(() => opened(window)[0])
      .toMatchObject({ ok: false, refusal: { code: 'sheet-unreadable' } });
  });
});
