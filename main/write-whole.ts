import { randomUUID } from 'node:crypto';
import { open, realpath, rename, rm, stat } from 'node:fs/promises';
import path from 'node:path';
import { Refusal } from '../analysis/index.ts';

/**
 * Writes a file so that it is there whole or not at all: a temporary file beside it, flushed to
 * the disk, then renamed over it. A link is followed, and who may read the file stays as it was.
 * Throws a `Refusal` where the place cannot be written.
 */
export async function writeWhole(file: string, content: string | Uint8Array): Promise<void> {
  // where nothing is there yet, the place is the one named
  const place = await realpath(file).catch(() => file);
  const mode = await stat(place).then(
    (found) => found.mode & 0o777,
    () => null,
  );
  const temporary = path.join(path.dirname(place), `.${path.basename(place)}.${randomUUID()}.part`);
  try {
    const handle = await open(temporary, 'wx');
    try {
      if (mode !== null) await handle.chmod(mode);
      await handle.writeFile(content);
      await handle.sync();
    } finally {
      await handle.close();
    }
    await rename(temporary, place);
  } catch (error) {
    await rm(temporary, { force: true });
    const reason = error instanceof Error && 'code' in error ? ` (${String(error.code)})` : '';
    throw new Refusal({
      code: 'cannot-write',
      message: `The file cannot be written there${reason}; what was there before is untouched.`,
      where: { file },
      mend: 'Choose a folder that exists and that you may write to.',
    });
  }
}
