import {
  embeddedFrom,
  embedSpectra,
  filesOf,
  knownOf,
  newSheet,
  openSheet,
  type Reading,
  Refusal,
  type Sheet,
  sheetText,
} from '../../analysis/index.ts';
import type { MenuCommand, OpenedFile } from '../../main/desktop/channels.ts';
import { addExports, type Destination } from '../import/imports.ts';
import type { SheetSource } from '../platform/platform.ts';
import { platform } from '../platform/this-platform.ts';
import { attempt, mention, notify, tellRefusal } from '../state/notices.ts';
import {
  change,
  fileName,
  isOpen,
  isUnsaved,
  markSaved,
  redo,
  replaceSheet,
  saveHandle,
  sheet,
  sheetsShown,
  undo,
} from '../state/store.ts';
import { readFileBytes, reportTexts } from '../worker/analysis-client.ts';
import { awaited, matchAwaited } from './awaited-files.ts';
import { confirmLoss } from './confirm-loss.ts';
import { sampleSource } from './sample.ts';

/** What the buttons, the keys and the native menu do. */
export const actions: Record<MenuCommand, () => Promise<unknown>> = {
  'new-sheet': () =>
    replacing(async () => replaceSheet(newSheet(), { name: null, handle: null, isSaved: true })),
  'open-sheet': () =>
    replacing(async () => {
      const source = await platform.openSheet();
      if (source) await openSource(source);
    }),
  'open-sample': () => replacing(async () => openSource(await sampleSource())),
  'add-exports': async () => {
    const shown = sheetsShown.peek();
    await takeIn(await platform.openExports(), null, shown);
  },
  save: () => save(saveHandle.value),
  'save-as': () => save(null),
  'export-csv': () => exported('csv'),
  'export-html': () => exported('html'),
  'export-pdf': async () => {
    const texts = await reportTexts(present());
    if (!texts.ok) return tellRefusal(texts.refusal);
    tellWritten(await platform.exportPdf(texts.value.html, `${baseName()}.pdf`));
  },
  undo: async () => undo(),
  redo: async () => redo(),
};

export function run(command: MenuCommand): void {
  const cell = document.activeElement;
  if (cell instanceof HTMLElement && cell.matches('input[data-drafting]')) {
    if (command === 'undo' || command === 'redo') {
      // in a cell that is being typed in, undo belongs to the typing; there is no newer way to ask for it
      document.execCommand(command);
      return;
    }
    // what is being typed takes effect before it is saved
    cell.blur();
  }
  void attempt(actions[command]);
}

/** Opens a sheet in place of the one on the page; false if that one was not let go. */
export const openInstead = (source: SheetSource): Promise<boolean> =>
  replacing(() => openSource(source));

/** Opens a sheet with the exports that came with it; the page asks for those that did not. */
async function openSource(source: SheetSource): Promise<void> {
  const { sheet: opened, warnings } = openSheet(source.text, source.name);
  const files = new Map(source.files.map((file) => [file.name, file]));
  const readings = await readNamed(opened, filesOf(opened), files);
  const next = embedSpectra(opened, (file, trace) => {
    const reading = readings.get(file);
    return reading ? embeddedFrom(reading, trace) : null;
  });
  replaceSheet(next, { name: source.name, handle: source.handle, isSaved: true });
  if (warnings.length > 0) notify('news', 'The sheet holds what is not known here:', warnings);
  tellRefused(readings);
  if (source.missing.length > 0) {
    notify(
      'refusal',
      'Files that the sheet names could not be had:',
      source.missing.map(({ path, why }) => `${path}: ${why}`),
    );
  }
}

/** Takes in files that were given while the sheet of this count of `sheetsShown` was on the page. */
export async function takeIn(
  files: readonly OpenedFile[],
  destination: Destination | null,
  shown: number,
): Promise<void> {
  const rest = shown === sheetsShown.peek() ? await takeAwaited(files) : files;
  await addExports(rest, destination, shown);
}

/** Takes in files that the open sheet waits for, by their names; gives back those it does not. */
async function takeAwaited(files: readonly OpenedFile[]): Promise<readonly OpenedFile[]> {
  const { found, ambiguous, rest } = matchAwaited(awaited.value, files);
  const shown = sheetsShown.peek();
  const readings = await readNamed(sheet.value, [...found.keys()], found);
  // the files of one sheet are nothing to the next, whatever names they share
  if (readings.size > 0 && shown === sheetsShown.peek()) {
    change('take in files', (before) =>
      embedSpectra(before, (file, trace) => {
        const reading = readings.get(file);
        return reading ? embeddedFrom(reading, trace) : null;
      }),
    );
  }
  tellRefused(readings);
  if (ambiguous.length > 0) {
    notify(
      'refusal',
      'The sheet waits for several files of these names, in different folders, and which of them was given cannot be told. Give the files different names in the sheet, or open it in the desktop program, which finds them by their folders.',
      ambiguous,
    );
  }
  return rest;
}

async function readNamed(
  of: Sheet,
  names: readonly string[],
  files: ReadonlyMap<string, OpenedFile>,
): Promise<Map<string, Reading>> {
  const readings = new Map<string, Reading>();
  for (const name of names) {
    const file = files.get(name);
    if (file) readings.set(name, await readFileBytes(name, file.bytes, knownOf(of, name)));
  }
  return readings;
}

function tellRefused(readings: ReadonlyMap<string, Reading>): void {
  const refused = [...readings.values()].flatMap(({ file, refused: parts }) =>
    parts.map(({ why, line }) => `${file}${line === null ? '' : `, line ${line}`}: ${why}`),
  );
  if (refused.length > 0) notify('refusal', 'Files of the sheet could not be used:', refused);
}

async function replacing(work: () => Promise<void>): Promise<boolean> {
  if (isUnsaved.value && !(await confirmLoss())) return false;
  await work();
  return true;
}

async function save(handle: unknown): Promise<void> {
  const written = present();
  const shown = sheetsShown.peek();
  const saved = await platform.saveSheet(sheetText(written), handle, `${baseName()}.sheet.json`);
  if (!saved) return;
  // another sheet may have come meanwhile: its saves must not go into this one's file
  if (shown === sheetsShown.peek()) markSaved(written, saved.name, saved.handle);
  mention(`Saved as ${saved.name}.`);
}

async function exported(kind: 'csv' | 'html'): Promise<void> {
  const texts = await reportTexts(present());
  if (!texts.ok) return tellRefusal(texts.refusal);
  tellWritten(await platform.exportText(texts.value[kind], `${baseName()}.${kind}`, kind));
}

function present(): Sheet {
  if (isOpen.value) return sheet.value;
  throw new Refusal({
    code: 'no-sheet',
    message: 'No sheet is open.',
    mend: 'Begin a new sheet, or open one.',
  });
}

function tellWritten(name: string | null): void {
  if (name !== null) mention(`Written: ${name}.`);
}

function baseName(): string {
  const named = fileName.value?.replace(/(\.sheet)?\.json$/i, '');
  const titled = sheet.value.title
    ?.replace(/[^\p{L}\p{N} _-]+/gu, '')
    .trim()
    .slice(0, 60);
  return named || titled || 'sheet';
}
