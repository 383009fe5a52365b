import { spawn } from 'node:child_process';
import { existsSync, readdirSync, statSync } from 'node:fs';
import path from 'node:path';

const sources = [
  'analysis',
  'main',
  'renderer',
  'sample-data',
  'package-lock.json',
  'vite.config.ts',
  'vite.shell.config.ts',
];

/** The last file that each of the three builds writes. */
const built = ['dist/renderer/index.html', 'dist/desktop/main.js', 'dist/desktop/preload.cjs'];

const builds = [
  ['--config', 'vite.config.ts'],
  ['--config', 'vite.shell.config.ts', '--mode', 'main'],
  ['--config', 'vite.shell.config.ts', '--mode', 'preload'],
];

/**
 * Whether something that is built is missing or older than what it is built from.
 *
 * @param {string} root of the project
 */
export function isStale(root) {
  const ages = built.map((file) => path.join(root, file)).map((file) => changedAt(file));
  const oldest = Math.min(...ages);
  return oldest === 0 || sources.some((source) => newestIn(path.join(root, source)) > oldest);
}

/** Of a folder and all in it: its own time tells of what was deleted. 0 for what is not there. */
function newestIn(place) {
  const own = changedAt(place);
  if (own === 0 || !statSync(place).isDirectory()) return own;
  return Math.max(own, ...readdirSync(place).map((name) => newestIn(path.join(place, name))));
}

function changedAt(file) {
  return statSync(file, { throwIfNoEntry: false })?.mtimeMs ?? 0;
}

/**
 * Builds screen and shell. Resolves to null when all went well, else to a sentence.
 *
 * @param {string} root of the project
 * @param {'warn' | 'error'} logLevel
 */
export async function build(root, logLevel = 'warn') {
  const vite = path.join(root, 'node_modules/vite/bin/vite.js');
  if (!existsSync(vite)) return 'What the build needs is not installed: run "npm ci" first.';
  for (const args of builds) {
    const child = spawn(process.execPath, [vite, 'build', '--logLevel', logLevel, ...args], {
      cwd: root,
      stdio: 'inherit',
    });
    const code = await new Promise((resolve) => {
      child.once('exit', resolve);
      child.once('error', () => resolve(1));
    });
    if (code !== 0) return 'The build failed; what went wrong stands above.';
  }
  return null;
}
