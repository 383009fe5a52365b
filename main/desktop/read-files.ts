import { open, realpath, stat } from 'node:fs/promises';
import path from 'node:path';
import { filesOf, openSheet, Refusal } from '../../analysis/index.ts';
import type { OpenedFile, OpenedSheet } from './channels.ts';
import type { Places } from './places.ts';

/** Bytes; just below what one string of the JavaScript engine can hold. */
export const largestSheet = 500 * 1024 * 1024;
/** Past this an export is refused by the importer anyway; its first bytes are enough to say so. */
const largestExport = 64 * 1024 * 1024 + 1;
/** Of all exports that are opened together, in bytes. */
const largestLoad = 1024 * 1024 * 1024;

/**
 * Reads exports that a dialog named: all, or none where one cannot be read. One that is too large
 * crosses as its first bytes and is refused there.
 */
export async function readExports(paths: readonly string[]): Promise<OpenedFile[]> {
  const files: OpenedFile[] = [];
  let load = 0;
  for (const file of paths) {
    const bytes = await firstBytes(file, largestExport);
    load += typeof bytes === 'string' ? 0 : bytes.length;
    const why = load > largestLoad ? 'Together with those before it, it is too much at once.' : '';
    if (typeof bytes === 'string' || why) {
      throw new Refusal({
        code: 'cannot-read',
        message: `${why || bytes} No file was taken in.`,
        where: { file: path.basename(file) },
        mend: why ? 'Choose fewer files at a time.' : 'Leave it out, or make it readable.',
      });
    }
    files.push({ name: path.basename(file), bytes });
  }
  return files;
}

/**
 * Reads a sheet and the files it names by relative path, as far as they lie within its own folder
 * (a sheet that was mailed must not be able to read anything else of this machine).
 */
export async function readSheet(file: string, places: Places): Promise<OpenedSheet> {
  const text = await sheetTextOf(file);
  const files: OpenedFile[] = [];
  const missing: { path: string; why: string }[] = [];
  let load = 0;
  for (const name of namedFiles(text)) {
    const found = await within(path.dirname(file), name);
    const bytes = 'real' in found ? await firstBytes(found.real, largestExport) : found.why;
    if (typeof bytes === 'string') missing.push({ path: name, why: bytes });
    else if (load + bytes.length > largestLoad)
      missing.push({ path: name, why: 'The files of this sheet are too much at once.' });
    else {
      files.push({ name, bytes });
      load += bytes.length;
    }
  }
  return { name: path.basename(file), handle: places.handleOf(file), text, files, missing };
}

async function sheetTextOf(file: string): Promise<string> {
  const bytes = await firstBytes(file, largestSheet + 1);
  if (typeof bytes === 'string') throw unreadable(file, bytes);
  if (bytes.length > largestSheet) throw unreadable(file, 'The file is larger than any sheet.');
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

async function within(
  folder: string,
  name: string,
): Promise<{ readonly real: string } | { readonly why: string }> {
  if (path.isAbsolute(name)) return { why: 'It is not a path relative to the sheet.' };
  try {
    const [root, real] = await Promise.all([realpath(folder), realpath(path.join(folder, name))]);
    const below = path.relative(root, real);
    const isInside = !/^([.][.]$|[.][.][/\\]|$)/.test(below) && !path.isAbsolute(below);
    return isInside ? { real } : { why: 'It lies outside the folder of the sheet.' };
  } catch (error) {
    return { why: whyUnread(error) };
  }
}

/** At most `limit` bytes of a file, or in words why it cannot be read. */
async function firstBytes(file: string, limit: number): Promise<Uint8Array | string> {
  try {
    // before it is opened: opening a pipe would wait for its other end
    if (!(await stat(file)).isFile()) return 'It is not a file.';
    const handle = await open(file);
    try {
      const bytes = new Uint8Array(Math.min((await handle.stat()).size, limit));
      let length = 0;
      for (let read = -1; read !== 0 && length < bytes.length; length += read) {
        read = (await handle.read(bytes, length)).bytesRead;
      }
      return bytes.subarray(0, length);
    } finally {
      await handle.close();
    }
  } catch (error) {
    return whyUnread(error);
  }
}

function whyUnread(error: unknown): string {
  const code = error instanceof Error && 'code' in error ? String(error.code) : '';
  if (code === 'ENOENT' || code === 'ENOTDIR') return 'There is no such file.';
  if (code === 'EACCES' || code === 'EPERM') return 'You may not read it.';
  if (code === 'EBUSY') return 'Another program holds it.';
  if (code === '') throw error;
  return `It cannot be read (${code}).`;
}
