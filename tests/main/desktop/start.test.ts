import { existsSync } from 'node:fs';
import { chmod, mkdir, mkdtemp, readFile, rm, utimes, writeFile } from 'node:fs/promises';
import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { isStale } from '../../../main/desktop/build.mjs';
import { electronRuntime, fetchRuntime } from '../../../main/desktop/runtime.mjs';
import { startApp } from '../../../main/desktop/start-app.mjs';
import { startOptions } from '../../../main/desktop/start-options.mjs';

let folder = '';
const at = (...parts: string[]): string => path.join(folder, ...parts);

/** A project that is built and has no runtime. */
beforeEach(async () => {
  folder = await mkdtemp(path.join(tmpdir(), 'monobis-start-'));
  for (const file of [
    'analysis/index.ts',
    'dist/renderer/index.html',
    'dist/desktop/main.js',
    'dist/desktop/preload.cjs',
  ]) {
    await mkdir(path.dirname(at(file)), { recursive: true });
    await writeFile(at(file), '<!doctype html>');
  }
});
afterEach(() => rm(folder, { recursive: true, force: true }));

/** Puts a script in the place of Electron's runtime. */
async function withRuntime(script: string): Promise<void> {
  await mkdir(at('node_modules/electron/dist'), { recursive: true });
  await writeFile(at('node_modules/electron/path.txt'), 'electron');
  await writeFile(at('node_modules/electron/dist/electron'), `#!/bin/sh\n${script}\n`);
  await chmod(at('node_modules/electron/dist/electron'), 0o755);
}

/** Starts, and stops once the address was said. */
async function started(args: readonly string[], env = {}) {
  const lines: string[] = [];
  const stop = new AbortController();
  const answers: number[] = [];
  let asking: Promise<unknown> = Promise.resolve();
  const code = await startApp({
    root: folder,
    args: ['--no-open', ...args],
    env,
    say: (line) => {
      lines.push(line);
      const address = /http:\S+/.exec(line)?.[0];
      if (!address) return;
      asking = fetch(address)
        .then(({ status }) => answers.push(status))
        .finally(() => stop.abort());
    },
    stop: stop.signal,
  });
  await asking;
  return { code, lines, text: lines.join('\n'), answers };
}

function isFree(port: number): Promise<boolean> {
  return new Promise((resolve) => {
    const server = createServer();
    server.once('error', () => resolve(false));
    server.listen(port, '127.0.0.1', () => server.close(() => resolve(true)));
  });
}

describe('npm start', () => {
  it('serves to the browser, says so in one line with the address, and stops cleanly', async () => {
    const { code, lines, answers } = await started(['--browser', '--port', '0']);
    expect(lines).toEqual([
      expect.stringMatching(
        /^As asked: the app runs in your browser at http:\/\/127\.0\.0\.1:\d+\/ /,
      ),
      'Stopped.',
    ]);
    expect(answers).toEqual([200]);
    expect(code).toBe(0);
  });

  it('serves to the browser where the runtime cannot be had', async () => {
    const { code, text, answers } = await started(['--port', '0']);
    expect(text).toMatch(/cannot be had on this machine: the app runs in your browser at http/);
    expect(answers).toEqual([200]);
    expect(code).toBe(0);
  });

  it('tells a browser user how to open the sheet that was named', async () => {
    expect((await started(['--browser', '--port', '0', 'a.sheet.json'])).text).toContain(
      'open the sheet there',
    );
  });

  it('takes a free port where the one asked for is taken, and says so', async () => {
    const taken = createServer();
    await new Promise<void>((resolve) => taken.listen(0, '127.0.0.1', resolve));
    const address = taken.address();
    const port = typeof address === 'object' ? address?.port : undefined;
    const { text, answers } = await started(['--browser', '--port', String(port)]);
    taken.close();
    expect(text).toContain(`Port ${port} cannot be had (EADDRINUSE)`);
    expect(answers).toEqual([200]);
  });

  it('keeps one address from start to start, for a browser keeps what is not saved by address', async () => {
    // where another program holds the usual port, any other must do
    const port = (await isFree(47_816)) ? '47816' : '[0-9]+';
    for (let start = 0; start < 2; start += 1) {
      const { text, answers } = await started(['--browser']);
      expect(text).toMatch(new RegExp(`http://127[.]0[.]0[.]1:${port}/ `));
      expect(answers).toEqual([200]);
    }
  });

  it.each([
    [['--bogus'], /Unknown option '--bogus'.*\nnpm start/s],
    [['--port', 'abc'], /"abc" is not a port/],
    [['--port', '70000'], /"70000" is not a port/],
  ])('says what is wrong with %j, and starts nothing', async (args, words) => {
    const { code, text, answers } = await started(args);
    expect(text).toMatch(words);
    expect(text).not.toMatch(/^\s+at /m);
    expect(answers).toEqual([]);
    expect(code).toBe(2);
  });

  it('says what to do where the build cannot be made', async () => {
    await rm(at('dist'), { recursive: true });
    const { code, text } = await started(['--browser']);
    expect(text).toContain('run "npm ci" first');
    expect(code).toBe(1);
  });
});

describe.skipIf(process.platform === 'win32')("npm start with Electron's runtime", () => {
  it('hands it the project and the sheet by its whole path, and ends as it ends', async () => {
    await withRuntime(`printf '%s\\n' "$@" > "${at('given')}"`);
    const { code, lines } = await started(['a.sheet.json'], { INIT_CWD: '/where/npm/was/called' });
    expect(lines).toEqual([]);
    expect(code).toBe(0);
    expect(await readFile(at('given'), 'utf8')).toBe(
      `${folder}\n/where/npm/was/called/a.sheet.json\n`,
    );
  });

  it('is not asked when the browser is', async () => {
    await withRuntime(`touch "${at('asked')}"`);
    await started(['--browser', '--port', '0']);
    expect(existsSync(at('asked'))).toBe(false);
  });

  it.each([
    ['exit 1', 'exit code 1'],
    ['kill -TRAP $$', 'signal SIGTRAP'],
  ])('goes on in the browser where it does not start: %s', async (script, how) => {
    await withRuntime(script);
    const { code, text, answers } = await started(['--port', '0']);
    expect(text).toContain(`does not start here (${how}): the app runs in your browser at http`);
    expect(answers).toEqual([200]);
    expect(code).toBe(0);
  });

  it('goes on in the browser where it cannot be run at all', async () => {
    await withRuntime('exit 0');
    await chmod(at('node_modules/electron/dist/electron'), 0o644);
    const { text, answers } = await started(['--port', '0']);
    expect(text).toContain('(EACCES): the app runs in your browser');
    expect(answers).toEqual([200]);
  });

  it('stops it when it is stopped', async () => {
    await withRuntime('exec sleep 600');
    const stop = new AbortController();
    const done = startApp({ root: folder, args: [], env: {}, say: () => {}, stop: stop.signal });
    setTimeout(() => stop.abort(), 300);
    expect(await done).toBe(0);
  });
});

describe("Electron's runtime", () => {
  it('is found by its files, without loading the package', async () => {
    expect(electronRuntime(folder, {})).toBeNull();
    await mkdir(at('node_modules/electron/dist'), { recursive: true });
    await writeFile(at('node_modules/electron/path.txt'), 'electron');
    // named, but not there
    expect(electronRuntime(folder, {})).toBeNull();
    await writeFile(at('node_modules/electron/dist/electron'), '');
    expect(electronRuntime(folder, {})).toBe(at('node_modules/electron/dist/electron'));
  });

  it('is taken from where the environment says', async () => {
    const env = { ELECTRON_OVERRIDE_DIST_PATH: at('elsewhere') };
    expect(electronRuntime(folder, env)).toBeNull();
    const names = { darwin: 'Electron.app/Contents/MacOS/Electron', win32: 'electron.exe' };
    const name =
      process.platform === 'darwin' || process.platform === 'win32'
        ? names[process.platform]
        : 'electron';
    await mkdir(path.dirname(at('elsewhere', name)), { recursive: true });
    await writeFile(at('elsewhere', name), '');
    expect(electronRuntime(folder, env)).toBe(at('elsewhere', name));
  });

  it('is fetched by its own script, which may fail or be given up', async () => {
    const script = at('node_modules/electron/install.js');
    const runtime = async (source: string, limitMs: number): Promise<string | null> => {
      await mkdir(path.dirname(script), { recursive: true });
      await writeFile(script, source);
      await fetchRuntime(folder, { limitMs });
      return electronRuntime(folder, {});
    };
    await fetchRuntime(folder, { limitMs: 1000 });
    expect(await runtime('process.exit(1)', 20_000)).toBeNull();
    expect(await runtime('setTimeout(() => {}, 600_000)', 200)).toBeNull();
    const good = `const fs = require('node:fs');
      fs.mkdirSync(__dirname + '/dist');
      fs.writeFileSync(__dirname + '/dist/electron', '');
      fs.writeFileSync(__dirname + '/path.txt', 'electron');`;
    expect(await runtime(good, 20_000)).toBe(at('node_modules/electron/dist/electron'));
  });
});

describe('what is built', () => {
  it('is stale where a file is missing, or older than what it is built from', async () => {
    expect(isStale(folder)).toBe(false);
    const later = new Date(Date.now() + 60_000);
    await utimes(at('analysis/index.ts'), later, later);
    expect(isStale(folder)).toBe(true);
    for (const file of ['renderer/index.html', 'desktop/main.js', 'desktop/preload.cjs'])
      await utimes(at('dist', file), later, later);
    expect(isStale(folder)).toBe(false);
    await rm(at('dist/desktop/preload.cjs'));
    expect(isStale(folder)).toBe(true);
  });
});

it('options come from the arguments first, then from PORT', () => {
  expect(startOptions(['--port', '8080'], { PORT: '9090' })).toMatchObject({ port: 8080 });
  expect(startOptions([], { PORT: '9090' })).toMatchObject({ port: 9090 });
  expect(startOptions([], {})).toEqual({
    ok: true,
    isBrowserAsked: false,
    opensBrowser: true,
    port: null,
    sheets: [],
  });
});
