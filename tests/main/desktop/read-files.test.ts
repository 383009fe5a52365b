import { execFileSync } from 'node:child_process';
import { mkdir, mkdtemp, rm, symlink, truncate, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { newSheet, sheetText } from '../../../analysis/index.ts';
import { Places } from '../../../main/desktop/places.ts';
import { readExports, readSheet } from '../../../main/desktop/read-files.ts';

const good = 'nm,A\n250,0.1\n251,0.2\n';
let folder = '';
const at = (...parts: string[]): string => path.join(folder, ...parts);
beforeAll(async () => {
  folder = await mkdtemp(path.join(tmpdir(), 'monobis-files-'));
  await mkdir(at('sheets/crude'), { recursive: true });
  await mkdir(at('sheets-beside'));
  await writeFile(at('secret.csv'), 'not for the sheet');
  await writeFile(at('sheets-beside/secret.csv'), 'not for the sheet');
  await writeFile(at('sheets/crude/good.csv'), good);
  await writeFile(at('sheets/..two-dots.csv'), 'nm,A\n');
});
afterAll(() => rm(folder, { recursive: true, force: true }));

async function opened(names: readonly string[]) {
  const standards = names.map((file) => ({
    id: file,
    species: 'mono',
    spectrum: { file },
    concentrationMolPerL: 1,
  }));
  await writeFile(at('sheets/a.sheet.json'), sheetText({ ...newSheet(), standards }));
  return readSheet(at('sheets/a.sheet.json'), new Places());
}

describe('a sheet that names files', () => {
  it('gets those inside its own folder, under the names it gave', async () => {
    const { files, missing, name } = await opened([
      'crude/good.csv',
      './crude/../crude/good.csv',
      '..two-dots.csv',
    ]);
    expect(name).toBe('a.sheet.json');
    expect(files.map((file) => file.name)).toEqual([
      'crude/good.csv',
      './crude/../crude/good.csv',
      '..two-dots.csv',
    ]);
    expect(new TextDecoder().decode(files[0]?.bytes)).toBe(good);
    expect(missing).toEqual([]);
  });

  it.each([
    ['../secret.csv', 'outside the folder'],
    ['crude/../../secret.csv', 'outside the folder'],
    ['../sheets-beside/secret.csv', 'outside the folder'],
    ['/etc/hostname', 'not a path relative'],
    ['gone.csv', 'no such file'],
    ['crude/good.csv/inside.csv', 'no such file'],
    ['crude', 'not a file'],
    ['.', 'outside the folder'],
    ['with\u0000zero.csv', 'cannot be read'],
  ])('does not get %j', async (name, why) => {
    const { files, missing } = await opened([name]);
    expect(files).toEqual([]);
    expect(missing).toEqual([{ path: name, why: expect.stringContaining(why) }]);
  });

  it.skipIf(process.platform === 'win32')(
    'does not get what a link in its folder leads to',
    async () => {
      await symlink(at('secret.csv'), at('sheets/link.csv'));
      await symlink(folder, at('sheets/up'));
      const answer = await opened(['link.csv', 'up/secret.csv']);
      expect(answer.files).toEqual([]);
      expect(answer.missing.map(({ path: name }) => name)).toEqual(['link.csv', 'up/secret.csv']);
    },
  );

  it.skipIf(process.platform === 'win32')('does not wait for a pipe', async () => {
    const make = { command: 'mkfifo', place: at('sheets/pipe.csv') };
    execFileSync(make.command, [make.place]);
    expect((await opened(['pipe.csv'])).missing[0]?.why).toContain('not a file');
  });
});

describe('a sheet', () => {
  const reading = (name: string) => readSheet(at(name), new Places());

  it.each([
    ['is not there', 'gone.sheet.json', /no such file/],
    ['is a folder', 'sheets', /not a file/],
  ])('that %s is refused in words', async (_, name, words) => {
    await expect(reading(name)).rejects.toMatchObject({
      code: 'sheet-unreadable',
      message: expect.stringMatching(words),
      where: { file: name },
    });
  });

  it('that is not UTF-8, or larger than any sheet, is refused in words', async () => {
    await writeFile(at('latin.sheet.json'), Buffer.from([0x7b, 0xe9, 0x7d]));
    await expect(reading('latin.sheet.json')).rejects.toThrow('not UTF-8');
    await writeFile(at('huge.sheet.json'), '');
    // sparse: takes no room on the disk
    await truncate(at('huge.sheet.json'), 3 * 2 ** 30);
    await expect(reading('huge.sheet.json')).rejects.toThrow('larger than any sheet');
  });

  it('that is no sheet at all crosses as it is: the page says what is wrong with it', async () => {
    await writeFile(at('half.sheet.json'), '{"format": "monobis-sh');
    expect(await reading('half.sheet.json')).toMatchObject({
      text: '{"format": "monobis-sh',
      files: [],
    });
  });
});

describe('exports', () => {
  it('come whole, with their names and nothing of their folders', async () => {
    const files = await readExports([at('sheets/crude/good.csv'), at('secret.csv')]);
    expect(files.map(({ name, bytes }) => [name, bytes.length])).toEqual([
      ['good.csv', good.length],
      ['secret.csv', 17],
    ]);
  });

  it('past the limit of the importer come as their first bytes, enough to be refused there', async () => {
    await writeFile(at('huge.csv'), 'nm,A\n');
    await truncate(at('huge.csv'), 3 * 2 ** 30);
    const [huge] = await readExports([at('huge.csv')]);
    expect(huge?.bytes.length).toBe(64 * 1024 * 1024 + 1);
    expect(new TextDecoder().decode(huge?.bytes.subarray(0, 4))).toBe('nm,A');
  });

  it('are all left where one cannot be read, and it is named', async () => {
    await expect(readExports([at('secret.csv'), at('gone.csv')])).rejects.toMatchObject({
      code: 'cannot-read',
      message: 'There is no such file. No file was taken in.',
      where: { file: 'gone.csv' },
    });
  });
});
