import path from 'node:path';
import { _electron } from 'playwright-core';
import { describe, expect, it } from 'vitest';
import { electronRuntime } from '../../main/desktop/runtime.mjs';

const root = path.resolve(import.meta.dirname, '../..');
const runtime = electronRuntime(root);

describe.runIf(runtime !== null)('the real shell', () => {
  it('opens the app, sandboxed, with the desktop calls and no Node', async () => {
    const app = await _electron.launch({ executablePath: runtime ?? '', args: [root] });
    try {
      const page = await app.firstWindow();
      await page.getByRole('button', { name: 'Open the sample sheet' }).last().click();
      await page.locator('.answer-head').waitFor();
      expect(await page.evaluate(() => ['monobisDesktop' in window, 'require' in window])).toEqual([
        true,
        false,
      ]);
    } finally {
      await app.close();
    }
  });
});

describe.runIf(runtime === null)('the real shell', () => {
  it('DID NOT RUN: the Electron runtime is not on this machine, only its stand-in was tested', () => {
    console.log(
      'The smoke test of the real Electron shell did not run: its runtime cannot be had here (node_modules/electron/path.txt is missing).',
    );
    expect(electronRuntime(root)).toBeNull();
  });
});
