import { spawn } from 'node:child_process';
import { existsSync, readFileSync } from 'node:fs';
import path from 'node:path';

/**
 * Where Electron's runtime is, or null. Looks at files only: loading the package `electron` to find
 * out would begin a download.
 *
 * @param {string} root of the project
 * @param {Record<string, string | undefined>} env
 * @returns {string | null} path of the executable
 */
export function electronRuntime(root, env = process.env) {
  const names = { darwin: 'Electron.app/Contents/MacOS/Electron', win32: 'electron.exe' };
  const override = env.ELECTRON_OVERRIDE_DIST_PATH;
  if (override) return existing(path.join(override, names[process.platform] ?? 'electron'));
  const note = path.join(root, 'node_modules/electron/path.txt');
  if (!existsSync(note)) return null;
  const name = readFileSync(note, 'utf8').trim();
  return existing(path.join(root, 'node_modules/electron/dist', name));
}

function existing(file) {
  return existsSync(file) ? file : null;
}

/**
 * Lets Electron's own script fetch its runtime, once and for a limited time; what came of it is for
 * `electronRuntime` to see.
 *
 * @param {string} root of the project
 * @param {{ limitMs: number, stop?: AbortSignal }} until it is given up
 */
export async function fetchRuntime(root, { limitMs, stop }) {
  const script = path.join(root, 'node_modules/electron/install.js');
  if (!existsSync(script)) return;
  const limit = AbortSignal.timeout(limitMs);
  const child = spawn(process.execPath, [script], {
    cwd: root,
    stdio: 'ignore',
    signal: stop ? AbortSignal.any([stop, limit]) : limit,
  });
  await new Promise((resolve) => {
    child.once('exit', resolve);
    child.once('error', resolve);
  });
}
