import { execFile } from 'node:child_process';
import { mkdir, mkdtemp, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { promisify } from 'node:util';
import { listPackage } from '@electron/asar';
import { load } from 'js-yaml';
import * as v from 'valibot';
import { describe, expect, it } from 'vitest';

const root = path.resolve(import.meta.dirname, '../..');

describe.runIf(process.platform === 'linux')('a package', () => {
  it('holds what is built and nothing else', async () => {
    const folder = await mkdtemp(path.join(tmpdir(), 'monobis-package-'));
    try {
      // a stub in place of the runtime, which cannot be had everywhere: the archive is the real one
      await mkdir(path.join(folder, 'stub'));
      await writeFile(path.join(folder, 'stub/electron'), '');
      // fuses are set in the runtime's own file, which the stub is not
      const settings = load(await readFile(path.join(root, 'electron-builder.yml'), 'utf8'));
      const { electronFuses: _, ...rest } = v.parse(v.looseObject({}), settings);
      const own = {
        ...rest,
        electronDist: path.join(folder, 'stub'),
        directories: { output: path.join(folder, 'out') },
      };
      await writeFile(path.join(folder, 'settings.json'), JSON.stringify(own));
      const builder = path.join(root, 'node_modules/electron-builder/cli.js');
      const args = [
        '--linux',
        'dir',
        '--publish',
        'never',
        '--config',
        path.join(folder, 'settings.json'),
      ];
      await promisify(execFile)(process.execPath, [builder, ...args], {
        cwd: root,
        maxBuffer: 1 << 26,
      });
      const files = listPackage(path.join(folder, 'out/linux-unpacked/resources/app.asar'), {
        isPack: false,
      });
      expect(files).toEqual(
        expect.arrayContaining([
          '/dist/renderer/index.html',
          '/dist/desktop/main.js',
          '/dist/desktop/preload.cjs',
          '/package.json',
        ]),
      );
      const strange = files.filter((file) =>
        /\.ts$|\.tsx$|^\/(tests|analysis|main|renderer|sample-data|node_modules)\b|truth|\.map$/.test(
          file,
        ),
      );
      expect(strange).toEqual([]);
    } finally {
      await rm(folder, { recursive: true, force: true });
    }
  });
});
