import { execFile } from 'node:child_process';
import path from 'node:path';
import { promisify } from 'node:util';

const root = path.resolve(import.meta.dirname, '../..');

/** Builds screen and shell once, before the whole-app tests. */
export default async function setup(): Promise<void> {
  const vite = path.join(root, 'node_modules/vite/bin/vite.js');
  for (const args of [
    ['--config', 'vite.config.ts'],
    ['--config', 'vite.shell.config.ts', '--mode', 'main'],
    ['--config', 'vite.shell.config.ts', '--mode', 'preload'],
  ]) {
    await promisify(execFile)(process.execPath, [vite, 'build', '--logLevel', 'error', ...args], {
      cwd: root,
    });
  }
}
