import { spawn } from 'node:child_process';
import { existsSync } from 'node:fs';
import path from 'node:path';
import { parseArgs } from 'node:util';
import { serveLoopback } from './loopback.mjs';
import { electronRuntime, fetchRuntime } from './runtime.mjs';

// `npm start`: builds, then opens the app in Electron where its runtime can be had, else in the
// default browser. Never a dead end.

const root = path.resolve(import.meta.dirname, '../..');
const fetchLimitMs = 60_000;

const { values, positionals } = parseArgs({
  allowPositionals: true,
  options: {
    /** Do without the desktop runtime. */
    browser: { type: 'boolean' },
    /** Serve, but open nothing. */
    'no-open': { type: 'boolean' },
    port: { type: 'string' },
  },
});

const say = (line) => process.stdout.write(`${line}\n`);

await build();
const runtime = values.browser ? null : await findRuntime();
if (runtime) startElectron(runtime);
else await startInBrowser();

async function build() {
  say('Building the app …');
  const vite = path.join(root, 'node_modules/vite/bin/vite.js');
  for (const args of [
    ['--config', 'vite.config.ts'],
    ['--config', 'vite.shell.config.ts', '--mode', 'main'],
    ['--config', 'vite.shell.config.ts', '--mode', 'preload'],
  ]) {
    const code = await exitOf(
      spawn(process.execPath, [vite, 'build', '--logLevel', 'warn', ...args], {
        cwd: root,
        stdio: 'inherit',
      }),
    );
    if (code !== 0) {
      say('The build failed; what went wrong stands above.');
      process.exit(1);
    }
  }
}

async function findRuntime() {
  const there = electronRuntime(root);
  if (there) return there;
  say('The desktop runtime is not here yet; trying to fetch it once …');
  return (await fetchRuntime(root, fetchLimitMs)) ? electronRuntime(root) : null;
}

function startElectron(executable) {
  const sheets = positionals.map((file) => path.resolve(file));
  const child = spawn(executable, [root, ...sheets], { stdio: 'inherit' });
  child.once('exit', (code) => process.exit(code ?? 0));
}

async function startInBrowser() {
  const { address } = await serveLoopback({
    folder: path.join(root, 'dist/renderer'),
    port: Number(values.port ?? process.env.PORT ?? 0),
  });
  const why = values.browser ? 'As asked' : 'The desktop runtime cannot be had on this machine';
  say(`${why}: the app runs in your browser at ${address} (Ctrl-C stops it).`);
  if (positionals.length > 0) say('A browser cannot open a path: use Open… for the sheet.');
  if (!values['no-open']) openBrowser(address);
}

function openBrowser(address) {
  const [command, args] =
    process.platform === 'darwin'
      ? ['open', [address]]
      : process.platform === 'win32'
        ? ['cmd', ['/c', 'start', '', address]]
        : ['xdg-open', [address]];
  if (process.platform === 'linux' && !onPath(command)) return;
  const child = spawn(command, args, { stdio: 'ignore', detached: true });
  child.once('error', () => say(`Open ${address} in a browser.`));
  child.unref();
}

function onPath(command) {
  return (process.env.PATH ?? '')
    .split(path.delimiter)
    .some((folder) => existsSync(path.join(folder, command)));
}

function exitOf(child) {
  return new Promise((resolve) => {
    child.once('exit', resolve);
    child.once('error', () => resolve(1));
  });
}
