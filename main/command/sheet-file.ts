import { readFile, stat } from 'node:fs/promises';
import path from 'node:path';
import {
  filesOf,
  knownOf,
  openSheet,
  type Reading,
  type ReadOptions,
  Refusal,
  readExport,
  type Sheet,
  tooLargeReading,
} from '../../analysis/index.ts';

export interface SheetFile {
  readonly sheet: Sheet;
  readonly readings: ReadonlyMap<string, Reading>;
  readonly warnings: readonly string[];
}

/** Opens a sheet and reads every export it points at, relative to itself. Throws a `Refusal`. */
export async function openSheetFile(file: string): Promise<SheetFile> {
  const bytes = await bytesOf(file, 'Give the path of a *.sheet.json file.');
  const { sheet, warnings } = openSheet(textOf(bytes, file), file);
  const folder = path.dirname(file);
  const readings = new Map<string, Reading>();
  const missing: string[] = [];
  for (const name of filesOf(sheet)) {
    if (path.isAbsolute(name)) {
      throw new Refusal({
        code: 'absolute-path',
        message: `The spectrum file "${name}" is not a path relative to the sheet.`,
        where: { file },
        mend: 'Put the file beside the sheet and name it from there.',
      });
    }
    const reading = await readExportFile(path.join(folder, name), name, knownOf(sheet, name));
    if (reading) readings.set(name, reading);
    else missing.push(name);
  }
  if (missing.length > 0) {
    const names = missing.map((name) => `"${name}"`).join(', ');
    throw new Refusal({
      code: 'file-missing',
      message: `${missing.length === 1 ? 'A file of the sheet was' : `${missing.length} files of the sheet were`} not found: ${names}.`,
      where: { file },
      mend: 'Put them back where the sheet looks for them (paths are relative to the sheet), or load the exports again in the app.',
    });
  }
  return { sheet, readings, warnings };
}

/** One export as a reading; null if there is no such file. `name` is what the reading calls it. */
export async function readExportFile(
  file: string,
  name: string,
  options: ReadOptions = {},
): Promise<Reading | null> {
  const size = await sizeOf(file);
  if (size === null) return null;
  // a file past the limit is refused by its size, before it fills the memory
  return tooLargeReading(size, name) ?? readExport(await readFile(file), name, options);
}

async function sizeOf(file: string): Promise<number | null> {
  try {
    const found = await stat(file);
    return found.isFile() ? found.size : null;
  } catch {
    return null;
  }
}

async function bytesOf(file: string, mend: string): Promise<Uint8Array> {
  const size = await sizeOf(file);
  if (size === null) {
    throw new Refusal({
      code: 'file-missing',
      message: 'There is no such file.',
      where: { file },
      mend,
    });
  }
  if (size > 1 << 30) {
    throw new Refusal({
      code: 'sheet-too-large',
      message: `The file has ${Math.round(size / 1e6)} MB, more than any sheet.`,
      where: { file },
      mend,
    });
  }
  return readFile(file);
}

function textOf(bytes: Uint8Array, file: string): string {
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes);
  } catch {
    throw new Refusal({
      code: 'sheet-not-text',
      message: 'This is not UTF-8 text, so it is no sheet.',
      where: { file },
      mend: 'Give the path of a *.sheet.json file; exports are read with "monobis read".',
    });
  }
}
