import path from 'node:path';
import { app, dialog, ipcMain, Menu, protocol, screen, session } from 'electron';
import { programName, Refusal } from '../../analysis/index.ts';
import { type Answer, channels, type OpenedSheet } from './channels.ts';
import { guardContents, guardSession } from './guards.ts';
import { handleChannels, type ShellState } from './handlers.ts';
import { menuTemplate } from './menu.ts';
import { OpenRequests, sheetsIn } from './open-requests.ts';
import { Places } from './places.ts';
import { registerScheme, serveApp } from './protocol.ts';
import { readSheet } from './read-files.ts';
import {
  confirmClose,
  offerAgainAfterCrash,
  openWindow,
  preloadPath,
  tellFault,
} from './window.ts';
import { keepBounds, lastBounds } from './window-bounds.ts';

const here = import.meta.dirname;
const state: ShellState = { places: new Places(), unsaved: false };
const requests = new OpenRequests();

process.on('uncaughtException', tellFault);
process.on('unhandledRejection', tellFault);
registerScheme(protocol);
app.enableSandbox();
app.on('web-contents-created', (_event, contents) => guardContents(contents));
app.on('window-all-closed', () => app.quit());
// comes before the app is ready where a sheet was opened by a double click
app.on('open-file', (event, file) => {
  event.preventDefault();
  requests.ask(file);
});

if (!app.requestSingleInstanceLock()) app.quit();
// no top-level await: the app would wait for itself
else
  void app
    .whenReady()
    .then(boot)
    .catch((error: unknown) => {
      tellFault(error);
      // without a window nobody could close it
      app.exit(1);
    });

function boot(): void {
  guardSession(session.defaultSession);
  serveApp(protocol, path.join(here, '../renderer'));
  const boundsFile = path.join(app.getPath('userData'), 'window.json');
  const screens = screen.getAllDisplays().map(({ workArea }) => workArea);
  const window = openWindow(preloadPath(here), lastBounds(boundsFile, screens));
  const { webContents } = window;
  confirmClose(window, () => state.unsaved);
  window.on('close', () => keepBounds(boundsFile, window.getNormalBounds()));
  webContents.on('render-process-gone', () => {
    requests.hold();
    // the page that will be back has nothing to lose until it says so
    state.unsaved = false;
  });
  offerAgainAfterCrash(window);
  handleChannels(ipcMain, window, state);
  const send = (channel: string, value: unknown): void => {
    if (!window.isDestroyed()) webContents.send(channel, value);
  };
  Menu.setApplicationMenu(
    Menu.buildFromTemplate(
      menuTemplate(process.platform, (command) => send(channels.command, command), about),
    ),
  );
  webContents.on('did-finish-load', () =>
    requests.deliverTo((file) => {
      void readRequested(file).then((opened) => send(channels.openRequested, opened));
    }),
  );
  askFor(process.argv, process.cwd());
  app.on('second-instance', (_event, args, folder) => {
    if (window.isMinimized()) window.restore();
    window.focus();
    askFor(args, folder);
  });
}

function askFor(args: readonly string[], folder: string): void {
  const [file] = sheetsIn(args);
  if (file !== undefined) requests.ask(path.resolve(folder, file));
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
