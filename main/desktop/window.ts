import path from 'node:path';
import { BrowserWindow, dialog, type Rectangle } from 'electron';
import { programName } from '../../analysis/index.ts';
import { appOrigin } from './guards.ts';

const appPage = `${appOrigin}/index.html`;

/** The window of the sheet. `preload` is the path of the bundled preload; null bounds are the default. */
export function openWindow(preload: string, bounds: Rectangle | null): BrowserWindow {
  const window = new BrowserWindow({
    ...(bounds ?? { width: 1440, height: 900 }),
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
  window.once('ready-to-show', () => window.show());
  void window.loadURL(appPage);
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

/** Offers the page again after its process has died; what was on it is kept by the page itself. */
export function offerAgainAfterCrash(window: BrowserWindow): void {
  window.webContents.on('render-process-gone', (_event, { reason }) => {
    if (reason === 'clean-exit') return;
    const choice = dialog.showMessageBoxSync(window, {
      type: 'error',
      message: 'The page of the sheet has stopped.',
      detail: `The sheet is kept as it stood shortly before and is offered on the page when it is back. (${reason})`,
      buttons: ['Show the page again', 'Close the program'],
      defaultId: 0,
      cancelId: 0,
    });
    if (choice === 0) void window.loadURL(appPage);
    else window.destroy();
  });
}

/** A fault of the program's own: said once in words, in full on standard error. */
export function tellFault(error: unknown): void {
  const text = error instanceof Error ? (error.stack ?? error.message) : String(error);
  process.stderr.write(`${text}\n`);
  const what = error instanceof Error ? error.message : String(error);
  dialog.showErrorBox(
    'Something went wrong in the program itself.',
    `${what}\n\nThe sheet on the page is untouched: save it under another name, then start the program again. If it comes back, report it with these words and "${programName}".`,
  );
}

export function preloadPath(folder: string): string {
  return path.join(folder, 'preload.cjs');
}
