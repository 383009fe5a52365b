import { existsSync } from 'node:fs';
import path from 'node:path';
import { type BrowserWindow, dialog, type IpcMain } from 'electron';
import * as v from 'valibot';
import { Refusal } from '../../analysis/index.ts';
import { writeWhole } from '../write-whole.ts';
import { channels, type ExportKind } from './channels.ts';
import { answered, argumentsOf, isOurs } from './guards.ts';
import { printToPdf } from './pdf.ts';
import type { Places } from './places.ts';
import { largestSheet, readExports, readSheet } from './read-files.ts';

const sheetFilter = { name: 'Sheet', extensions: ['sheet.json', 'json'] };
const exportNames: Record<ExportKind | 'pdf', string> = {
  csv: 'Comma-separated values',
  html: 'Web page',
  json: 'JSON',
  pdf: 'PDF',
};

export interface ShellState {
  readonly places: Places;
  unsaved: boolean;
}

/** Answers every channel for one window. Paths come from dialogs, or from handles given out before. */
export function handleChannels(ipcMain: IpcMain, window: BrowserWindow, state: ShellState): void {
  const { places } = state;
  ipcMain.handle(channels.openSheet, (event, ...args: unknown[]) =>
    answered(event, argumentsOf.nothing, args, async () => {
      const [file] = await askOpen(window, { filters: [sheetFilter] });
      return file === undefined ? null : readSheet(file, places);
    }),
  );
  ipcMain.handle(channels.openExports, (event, ...args: unknown[]) =>
    answered(event, argumentsOf.nothing, args, async () =>
      readExports(await askOpen(window, { properties: ['openFile', 'multiSelections'] })),
    ),
  );
  ipcMain.handle(channels.saveSheet, (event, ...args: unknown[]) =>
    answered(event, argumentsOf.save, args, async ([{ text, handle, suggestedName }]) => {
      const known = handle === null ? undefined : places.pathOf(handle);
      const file = known ?? (await askSave(window, suggestedName, sheetFilter));
      if (file === undefined) return null;
      await writeWhole(file, ofSize(text));
      return { name: path.basename(file), handle: places.handleOf(file) };
    }),
  );
  ipcMain.handle(channels.exportText, (event, ...args: unknown[]) =>
    answered(event, argumentsOf.exportText, args, ([{ text, suggestedName, kind }]) =>
      writeExport(window, suggestedName, kind, async () => ofSize(text)),
    ),
  );
  ipcMain.handle(channels.exportPdf, (event, ...args: unknown[]) =>
    answered(event, argumentsOf.exportPdf, args, ([{ html, suggestedName }]) =>
      writeExport(window, suggestedName, 'pdf', () => printToPdf(ofSize(html))),
    ),
  );
  ipcMain.on(channels.setUnsaved, (event, ...args: unknown[]) => {
    if (isOurs(event) && v.is(argumentsOf.unsaved, args)) state.unsaved = args[0];
  });
}

async function writeExport(
  window: BrowserWindow,
  suggestedName: string,
  kind: ExportKind | 'pdf',
  content: () => Promise<string | Uint8Array>,
): Promise<string | null> {
  const filter = { name: exportNames[kind], extensions: [kind] };
  const file = await askSave(window, suggestedName, filter);
  if (file === undefined) return null;
  await writeWhole(file, await content());
  return path.basename(file);
}

async function askOpen(
  window: BrowserWindow,
  options: Electron.OpenDialogOptions,
): Promise<readonly string[]> {
  const { canceled, filePaths } = await dialog.showOpenDialog(window, options);
  return canceled ? [] : filePaths;
}

async function askSave(
  window: BrowserWindow,
  suggestedName: string,
  filter: Electron.FileFilter,
): Promise<string | undefined> {
  const { canceled, filePath } = await dialog.showSaveDialog(window, {
    // a name only: the screen cannot point the dialog at a folder
    defaultPath: path.basename(suggestedName.replaceAll('\\', '/')),
    filters: [filter],
    properties: ['createDirectory', 'showOverwriteConfirmation'],
  });
  if (canceled || filePath === '') return undefined;
  const isNamed = filter.extensions.some((each) => filePath.toLowerCase().endsWith(`.${each}`));
  if (isNamed) return filePath;
  const file = `${filePath}.${filter.extensions[0]}`;
  // not every desktop's dialog adds the ending, and then it has not asked about this file
  return existsSync(file) && !(await mayReplace(window, file)) ? undefined : file;
}

async function mayReplace(window: BrowserWindow, file: string): Promise<boolean> {
  const { response } = await dialog.showMessageBox(window, {
    type: 'question',
    message: `"${path.basename(file)}" is there already.`,
    buttons: ['Cancel', 'Replace it'],
    defaultId: 0,
    cancelId: 0,
  });
  return response === 1;
}

/** What is larger could not be opened again. */
function ofSize(text: string): string {
  if (Buffer.byteLength(text) <= largestSheet) return text;
  throw new Refusal({
    code: 'too-large-to-write',
    message: 'This is larger than 500 MiB, and could not be opened again; nothing was written.',
    mend: 'Divide the aliquots over several sheets.',
  });
}
