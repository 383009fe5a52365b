import { mkdir, mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { findBrowser, launchBrowser } from './browser.ts';
import { downloaded, dropFiles, type OpenApp, openApp } from './open-app.ts';

// What drives the app must itself be able to see that something is wrong: here with pages of its own.

/** On a busy machine a message from the page takes its time. */
const slow = { timeout: 20_000 };

let browser: Browser;
let folder = '';
beforeAll(async () => {
  browser = await launchBrowser();
  folder = await mkdtemp(path.join(tmpdir(), 'monobis-harness-'));
});
afterAll(async () => {
  await browser.close();
  await rm(folder, { recursive: true, force: true });
});

/** A page with this body and this script of its own. */
async function pageOf(body: string, script: string): Promise<OpenApp> {
  const own = await mkdtemp(path.join(folder, 'page-'));
  await mkdir(path.join(own, 'assets'));
  await writeFile(
    path.join(own, 'index.html'),
    `<!doctype html><html lang="en"><head><meta charset="utf-8"><title>Page</title><link rel="icon" href="data:,"><script type="module" src="assets/page.js"></script></head><body>${body}<p id="done"></p></body></html>`,
  );
  await writeFile(
    path.join(own, 'assets/page.js'),
    `${script}\ndocument.getElementById('done').textContent = 'done';`,
  );
  const app = await openApp(browser, { folder: own, colorScheme: 'dark' });
  await app.page.getByText('done').waitFor();
  return app;
}

describe('the harness sees', () => {
  it('nothing wrong with a page that does nothing wrong', async () => {
    const app = await pageOf('<h1>Quiet</h1>', '');
    expect(app.problems()).toEqual([]);
    expect(app.strangers()).toEqual([]);
    expect(await app.page.evaluate(() => matchMedia('(prefers-color-scheme: dark)').matches)).toBe(
      true,
    );
    await app.close();
  });

  it.each([
    ['a console error', "console.error('something')", 'console: something'],
    ['a fault of the page', "setTimeout(() => { throw new Error('broken') })", 'page: broken'],
    ['a promise that nobody caught', "Promise.reject(new Error('lost'))", 'page: lost'],
    [
      'a style that the policy forbids',
      "document.body.setAttribute('style', 'color: red')",
      'policy: style-src',
    ],
    ['a script that the policy forbids', "try { eval('1') } catch {}", 'policy: script-src'],
    ['a file that is not there', "fetch('assets/gone.csv').catch(() => {})", '404: '],
  ])('%s', async (_, script, problem) => {
    const app = await pageOf('', script);
    await expect.poll(() => app.problems().join('\n'), slow).toContain(problem);
    await app.close();
  });

  it('an error of a worker', async () => {
    const app = await pageOf('', "new Worker('assets/page.js', { type: 'module' })");
    // in a worker there is no document: the page's own script fails there
    await expect.poll(() => app.problems().join('\n'), slow).toContain('document is not defined');
    await app.close();
  });

  it('a request to another host, though the policy stops it', async () => {
    const app = await pageOf('', "fetch('http://127.0.0.2:9/').catch(() => {})");
    await expect
      .poll(() => [...app.problems(), ...app.strangers()].join('\n'), slow)
      .toContain('127.0.0.2');
    await app.close();
  });
});

describe('the harness does', () => {
  it('drop real files, whose bytes the page can read', async () => {
    const file = path.join(folder, 'dropped.csv');
    await writeFile(file, 'nm,A\n250,0.1\n');
    const app = await pageOf(
      '<main><p>Drop here</p><output></output></main>',
      `const main = document.querySelector('main');
       main.addEventListener('dragover', (event) => event.preventDefault());
       main.addEventListener('drop', async (event) => {
         event.preventDefault();
         const [file] = event.dataTransfer.files;
         document.querySelector('output').textContent = file.name + ': ' + (await file.text()).length;
       });`,
    );
    await dropFiles(app.page, 'main', [file]);
    await app.page.getByText('dropped.csv: 13').waitFor();
    await app.close();
  });

  it('catch a download', async () => {
    const app = await pageOf(
      '<button>Save</button>',
      `document.querySelector('button').onclick = () => {
         const link = document.createElement('a');
         link.href = URL.createObjectURL(new Blob(['kept']));
         link.download = 'kept.txt';
         link.click();
       };`,
    );
    const got = await downloaded(app.page, () => app.page.getByRole('button').click());
    expect(got).toMatchObject({ name: 'kept.txt', text: 'kept' });
    await app.close();
  });

  it('draw letters: a text has a width, and different letters differ in it', async () => {
    const app = await pageOf('<span>iiii</span> <span>WWWW</span>', '');
    const widths = await app.page
      .locator('span')
      .evaluateAll((spans) => spans.map((span) => span.getBoundingClientRect().width));
    expect(widths[0]).toBeGreaterThan(0);
    expect(widths[1]).toBeGreaterThan(1.5 * (widths[0] ?? 0));
    await app.close();
  });
});

describe('the search for a browser', () => {
  const machine = { platform: 'linux', arch: 'x64', env: {} } as const;

  it('takes what is named, and says so when that is not there', () => {
    expect(findBrowser({ ...machine, env: { MONOBIS_BROWSER: process.execPath } })).toBe(
      process.execPath,
    );
    expect(() => findBrowser({ ...machine, env: { MONOBIS_BROWSER: '/nowhere/browser' } })).toThrow(
      '/nowhere/browser',
    );
  });

  it('then one on the PATH, then the packaged one', async () => {
    await writeFile(path.join(folder, 'chromium'), '');
    expect(findBrowser({ ...machine, env: { PATH: folder } })).toBe(path.join(folder, 'chromium'));
    expect(findBrowser(machine)).toBeNull();
  });

  it('says what to install where none can be had', () => {
    expect(() => findBrowser({ ...machine, arch: 'arm64' })).toThrow(/Install Chromium/);
  });
});
