import { spawn } from 'node:child_process';
import path from 'node:path';
import { build, isStale } from './build.mjs';
import { serveLoopback } from './loopback.mjs';
import { openBrowser } from './open-browser.mjs';
import { electronRuntime, fetchRuntime } from './runtime.mjs';
import { startOptions } from './start-options.mjs';

const fetchLimitMs = 60_000;

/** What ends earlier than this, and not well, has never shown a window. */
const startUpMs = 15_000;

/**
 * A browser keeps what is not saved by address, port included: only where the port stays the same
 * can a sheet be offered back after a restart.
 */
const usualPort = 47_816;

/**
 * Builds if needed, then runs the app in Electron where its runtime can be had and starts, else
 * serves it to the default browser until `stop` is aborted. Resolves to the exit code.
 *
 * @param {{ root: string, args: readonly string[], env: Record<string, string | undefined>,
 *   say: (line: string) => void, stop: AbortSignal }} call
 */
export async function startApp({ root, args, env, say, stop }) {
  const options = startOptions(args, env);
  if (!options.ok) {
    say(options.message);
    return 2;
  }
  if (isStale(root)) {
    say('Building the app …');
    const failure = await build(root);
    if (stop.aborted) return 0;
    if (failure) {
      say(failure);
      return 1;
    }
  }
  if (stop.aborted) return 0;
  const why = options.isBrowserAsked
    ? 'As asked'
    : await inElectron({ root, env, say, stop, sheets: options.sheets });
  if (why === null) return 0;
  await inBrowser({ root, why, options, say, stop });
  return 0;
}

/** Resolves to null once the app was closed, else to why Electron could not show it. */
async function inElectron({ root, env, say, stop, sheets }) {
  let runtime = electronRuntime(root, env);
  if (!runtime) {
    say('Fetching the desktop runtime once (a minute at most; --browser goes without) …');
    await fetchRuntime(root, { limitMs: fetchLimitMs, stop });
    runtime = electronRuntime(root, env);
  }
  if (stop.aborted) return null;
  if (!runtime) return 'The desktop runtime cannot be had on this machine';
  const began = Date.now();
  const { code, signal, error } = await ended(runtime, [root, ...sheets], stop);
  if (code === 0 || stop.aborted) return null;
  const how = error ?? (signal ? `signal ${signal}` : `exit code ${code}`);
  if (Date.now() - began < startUpMs) return `The desktop runtime does not start here (${how})`;
  say(`The app ended unexpectedly (${how}). What was not saved is offered at the next start.`);
  return null;
}

function ended(executable, args, stop) {
  return new Promise((resolve) => {
    const child = spawn(executable, args, { stdio: 'inherit' });
    const quit = () => child.kill('SIGTERM');
    stop.addEventListener('abort', quit, { once: true });
    const settle = (how) => {
      stop.removeEventListener('abort', quit);
      resolve(how);
    };
    child.once('exit', (code, signal) => settle({ code, signal }));
    child.once('error', ({ code }) => settle({ code: null, error: code ?? 'not runnable' }));
  });
}

async function inBrowser({ root, why, options, say, stop }) {
  const { address, close } = await serve(path.join(root, 'dist/renderer'), options.port, say);
  say(`${why}: the app runs in your browser at ${address} (Ctrl-C stops it).`);
  if (options.sheets.length > 0) say('A browser cannot be handed a file: open the sheet there.');
  if (options.opensBrowser) openBrowser(address);
  if (!stop.aborted) {
    await new Promise((resolve) => stop.addEventListener('abort', resolve, { once: true }));
  }
  await close();
  say('Stopped.');
}

/** At the port asked for, else at the usual one; where that is taken, at any that is free. */
async function serve(folder, asked, say) {
  try {
    return await serveLoopback({ folder, port: asked ?? usualPort });
  } catch (error) {
    if (error.syscall !== 'listen') throw error;
    if (asked !== null) say(`Port ${asked} cannot be had (${error.code}); taking a free one.`);
    return serveLoopback({ folder });
  }
}
