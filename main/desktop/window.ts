import path from 'node:path';
import { BrowserWindow, dialog } from 'electron';
import { appOrigin, guardContents } from './guards.ts';

/** The window of one sheet. `preload` is the path of the bundled preload. */
export function openWindow(preload: string): BrowserWindow {
  const window = new BrowserWindow({
    width: 1440,
    height: 900,
    minWidth: 1024,
    minHeight: 700,
    show: false,
    title: 'Monobis',
    webPreferences: {
      preload,
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
    },
  });
  guardContents(window.webContents);
  window.once('ready-to-show', () => window.show());
  void window.loadURL(`${appOrigin}/index.html`);
  return window;
}

/** Asks before a window with unsaved changes closes. */
export function confirmClose(window: BrowserWindow, isUnsaved: () => boolean): void {
  window.on('close', (event) => {
    if (!isUnsaved()) return;
    const choice = dialog.showMessageBoxSync(window, {
      type: 'question',
      message: 'The sheet has changes that are not saved.',
      detail: 'They are kept and will be offered when the program starts again.',
      buttons: ['Stay', 'Close'],
      defaultId: 0,
      cancelId: 0,
    });
    if (choice === 0) event.preventDefault();
  });
}

export function preloadPath(folder: string): string {
  return path.join(folder, 'preload.cjs');
}
