import path from 'node:path';
import { app, dialog, ipcMain, Menu, protocol, session } from 'electron';
import { programName, Refusal } from '../../analysis/index.ts';
import { type Answer, channels, type OpenedSheet } from './channels.ts';
import { guardSession } from './guards.ts';
import { handleChannels, type ShellState } from './handlers.ts';
import { menuTemplate } from './menu.ts';
import { Places } from './places.ts';
import { registerScheme, serveApp } from './protocol.ts';
import { readSheet } from './read-files.ts';
import { confirmClose, openWindow, preloadPath } from './window.ts';

const here = import.meta.dirname;
const state: ShellState = { places: new Places(), unsaved: false };

registerScheme(protocol);
app.enableSandbox();

if (!app.requestSingleInstanceLock()) app.quit();
// no top-level await: the app would wait for itself
else void app.whenReady().then(boot);

function boot(): void {
  guardSession(session.defaultSession);
  serveApp(protocol, path.join(here, '../renderer'));
  const window = openWindow(preloadPath(here));
  confirmClose(window, () => state.unsaved);
  handleChannels(ipcMain, window, state);
  const send = (channel: string, value: unknown): void => window.webContents.send(channel, value);
  Menu.setApplicationMenu(
    Menu.buildFromTemplate(
      menuTemplate(process.platform, (command) => send(channels.command, command), about),
    ),
  );
  const openRequested = (file: string): void => {
    void readRequested(file).then((opened) => send(channels.openRequested, opened));
  };
  const [asked] = sheetsIn(process.argv);
  if (asked !== undefined) window.webContents.once('did-finish-load', () => openRequested(asked));
  app.on('second-instance', (_event, args, folder) => {
    if (window.isMinimized()) window.restore();
    window.focus();
    const [file] = sheetsIn(args);
    if (file !== undefined) openRequested(path.resolve(folder, file));
  });
  app.on('open-file', (event, file) => {
    event.preventDefault();
    openRequested(file);
  });
  app.on('window-all-closed', () => app.quit());
}

function sheetsIn(args: readonly string[]): string[] {
  return args.slice(1).filter((arg) => arg.toLowerCase().endsWith('.json'));
}

async function readRequested(file: string): Promise<Answer<OpenedSheet>> {
  try {
    return { ok: true, value: await readSheet(file, state.places) };
  } catch (error) {
    if (error instanceof Refusal) return { ok: false, refusal: error.toText() };
    throw error;
  }
}

function about(): void {
  void dialog.showMessageBox({
    type: 'info',
    message: programName,
    detail: `Electron ${process.versions.electron}, Chromium ${process.versions.chrome}, Node ${process.versions.node}`,
  });
}
