import { beforeEach, describe, expect, it, vi } from 'vitest';

vi.mock('electron', () => import('./fake-electron.ts'));

const { asReal, BrowserWindow, dialog, lastWindow } = await import('./fake-electron.ts');
const { confirmClose, offerAgainAfterCrash, openWindow } = await import(
  '../../../main/desktop/window.ts'
);

beforeEach(() => vi.resetAllMocks());

describe('the window', () => {
  it('is sandboxed, isolated and without Node, and loads our own origin', () => {
    openWindow('/app/preload.cjs', null);
    const window = lastWindow();
    expect(window.options.webPreferences).toEqual({
      preload: '/app/preload.cjs',
      sandbox: true,
      contextIsolation: true,
      nodeIntegration: false,
      nodeIntegrationInWorker: false,
      nodeIntegrationInSubFrames: false,
      webSecurity: true,
      allowRunningInsecureContent: false,
      webviewTag: false,
      navigateOnDragDrop: false,
      spellcheck: false,
    });
    expect(window.loadURL.mock.calls).toEqual([['monobis://app/index.html']]);
  });

  it('opens where it stood before', () => {
    openWindow('/app/preload.cjs', { x: 5, y: 6, width: 1200, height: 900 });
    expect(lastWindow().options).toMatchObject({ x: 5, y: 6, width: 1200, height: 900 });
  });

  it('shows itself only once there is something to see', () => {
    openWindow('/app/preload.cjs', null);
    expect(lastWindow().options.show).toBe(false);
    lastWindow().emit('ready-to-show');
    expect(lastWindow().show).toHaveBeenCalledOnce();
  });
});

describe('closing', () => {
  function closing(isUnsaved: boolean, choice: number): boolean {
    const window = new BrowserWindow({});
    confirmClose(asReal.window(window), () => isUnsaved);
    dialog.showMessageBoxSync.mockReturnValueOnce(choice);
    const event = { preventDefault: vi.fn() };
    window.emit('close', event);
    return event.preventDefault.mock.calls.length === 0;
  }

  it('asks nothing where all is saved', () => {
    expect(closing(false, 0)).toBe(true);
    expect(dialog.showMessageBoxSync).not.toHaveBeenCalled();
  });

  it('asks where something is not saved, and does as it is told', () => {
    expect(closing(true, 0)).toBe(false);
    expect(closing(true, 1)).toBe(true);
  });
});

describe('a page whose process has died', () => {
  function crashed(reason: string, choice: number) {
    const window = new BrowserWindow({});
    offerAgainAfterCrash(asReal.window(window));
    dialog.showMessageBoxSync.mockReturnValueOnce(choice);
    window.webContents.emit('render-process-gone', {}, { reason });
    return window;
  }

  it('is offered again, or the program closes', () => {
    expect(crashed('crashed', 0).loadURL).toHaveBeenCalledWith('monobis://app/index.html');
    const closed = crashed('oom', 1);
    expect(closed.loadURL).not.toHaveBeenCalled();
    expect(closed.destroy).toHaveBeenCalledOnce();
  });

  it('is no matter where it ended by itself', () => {
    crashed('clean-exit', 0);
    expect(dialog.showMessageBoxSync).not.toHaveBeenCalled();
  });
});
