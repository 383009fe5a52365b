import { readFile, realpath, stat } from 'node:fs/promises';
import path from 'node:path';
import { filesOf, openSheet, Refusal } from '../../analysis/index.ts';
import type { OpenedFile, OpenedSheet } from './channels.ts';
import type { Places } from './places.ts';

const largestSheet = 512 * 1024 * 1024;
/** Past this an export is refused by the importer anyway; its first bytes are enough to say so. */
const largestExport = 64 * 1024 * 1024 + 1;

/** Reads exports that a dialog named. One that is too large crosses as its first bytes and is refused there. */
export function readExports(paths: readonly string[]): Promise<OpenedFile[]> {
  return Promise.all(
    paths.map(async (file) => ({ name: path.basename(file), bytes: await bytesOf(file) })),
  );
}

/**
 * Reads a sheet and the files it names by relative path, as far as they lie within its own folder
 * (a sheet that was mailed must not be able to read anything else of this machine).
 */
export async function readSheet(file: string, places: Places): Promise<OpenedSheet> {
  const text = await sheetTextOf(file);
  const files: OpenedFile[] = [];
  const missing: { path: string; why: string }[] = [];
  for (const name of namedFiles(text)) {
    const found = await within(path.dirname(file), name);
    if (typeof found === 'string') files.push({ name, bytes: await bytesOf(found) });
    else missing.push({ path: name, why: found.why });
  }
  return { name: path.basename(file), handle: places.handleOf(file), text, files, missing };
}

async function sheetTextOf(file: string): Promise<string> {
  const found = await stat(file).catch(() => null);
  if (!found?.isFile()) throw unreadable(file, 'There is no such file.');
  if (found.size > largestSheet) throw unreadable(file, 'The file is larger than any sheet.');
  const bytes = await readFile(file);
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes);
  } catch {
    throw unreadable(file, 'This is not UTF-8 text, so it is no sheet.');
  }
}

function unreadable(file: string, message: string): Refusal {
  return new Refusal({
    code: 'sheet-unreadable',
    message,
    where: { file: path.basename(file) },
    mend: 'Choose a *.sheet.json file.',
  });
}

/** None where the text is not a sheet: the screen opens it too, and says what is wrong with it. */
function namedFiles(text: string): readonly string[] {
  try {
    return filesOf(openSheet(text).sheet);
  } catch (error) {
    if (error instanceof Refusal) return [];
    throw error;
  }
}

async function within(folder: string, name: string): Promise<string | { readonly why: string }> {
  if (path.isAbsolute(name)) return { why: 'It is not a path relative to the sheet.' };
  try {
    const [root, real] = await Promise.all([realpath(folder), realpath(path.join(folder, name))]);
    if (!real.startsWith(root + path.sep))
      return { why: 'It lies outside the folder of the sheet.' };
    return (await stat(real)).isFile() ? real : { why: 'It is not a file.' };
  } catch {
    return { why: 'There is no such file.' };
  }
}

async function bytesOf(file: string): Promise<Uint8Array> {
  const { size } = await stat(file);
  // only its length matters then
  if (size > largestExport) return new Uint8Array(largestExport);
  return new Uint8Array(await readFile(file));
}
