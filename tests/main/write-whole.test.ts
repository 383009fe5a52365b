import {
  chmod,
  mkdir,
  mkdtemp,
  readdir,
  readFile,
  readlink,
  rm,
  stat,
  symlink,
  writeFile,
} from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';

const fails = vi.hoisted(() => ({ rename: false, write: false }));
vi.mock('node:fs/promises', async (original) => {
  const real = await original<typeof import('node:fs/promises')>();
  const full = () => Promise.reject(Object.assign(new Error('full'), { code: 'ENOSPC' }));
  return {
    ...real,
    rename: (from: string, to: string) => (fails.rename ? full() : real.rename(from, to)),
    open: async (...args: Parameters<typeof real.open>) => {
      const handle = await real.open(...args);
      if (fails.write) handle.writeFile = full;
      return handle;
    },
  };
});

const { writeWhole } = await import('../../main/write-whole.ts');

let folder = '';
let file = '';
beforeEach(async () => {
  fails.rename = false;
  fails.write = false;
  folder = await mkdtemp(path.join(tmpdir(), 'monobis-write-'));
  file = path.join(folder, 'a.sheet.json');
  await writeFile(file, 'old');
});
afterEach(() => rm(folder, { recursive: true, force: true }));

const refused = { name: 'Refusal', code: 'cannot-write' };

describe('a file', () => {
  it('is replaced whole, by text or by bytes', async () => {
    await writeWhole(file, 'new µ');
    expect(await readFile(file, 'utf8')).toBe('new µ');
    await writeWhole(file, new Uint8Array([1, 2, 3]));
    expect([...(await readFile(file))]).toEqual([1, 2, 3]);
    expect(await readdir(folder)).toEqual(['a.sheet.json']);
  });

  it.each(['rename', 'write'] as const)(
    'stays as it was, with nothing left beside it, where the %s fails',
    async (step) => {
      fails[step] = true;
      await expect(writeWhole(file, 'new')).rejects.toMatchObject(refused);
      expect(await readFile(file, 'utf8')).toBe('old');
      expect(await readdir(folder)).toEqual(['a.sheet.json']);
    },
  );

  it('is not written where a folder has its name', async () => {
    await mkdir(path.join(folder, 'b.sheet.json'));
    await expect(writeWhole(path.join(folder, 'b.sheet.json'), 'x')).rejects.toMatchObject(refused);
    expect((await readdir(folder)).sort()).toEqual(['a.sheet.json', 'b.sheet.json']);
  });

  it('is not written where there is no such folder', async () => {
    await expect(writeWhole(path.join(folder, 'gone/a.json'), 'x')).rejects.toMatchObject(refused);
  });

  it.skipIf(process.platform === 'win32')('keeps who may read it', async () => {
    await chmod(file, 0o600);
    await writeWhole(file, 'new');
    expect((await stat(file)).mode & 0o777).toBe(0o600);
  });

  it.skipIf(process.platform === 'win32')(
    'is written where a link leads, which stays',
    async () => {
      const link = path.join(folder, 'link.sheet.json');
      await symlink(file, link);
      await writeWhole(link, 'new');
      expect(await readlink(link)).toBe(file);
      expect(await readFile(file, 'utf8')).toBe('new');
    },
  );
});
