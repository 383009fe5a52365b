import path from 'node:path';
import { _electron } from 'playwright-core';
import { describe, expect, it } from 'vitest';
import { electronRuntime } from '../../main/desktop/runtime.mjs';

const root = path.resolve(import.meta.dirname, '../..');
const runtime = electronRuntime(root);

/** Why the real shell cannot be driven on this machine; null where it can. */
function whyNot(): string | null {
  if (!runtime) return "Electron's runtime is not here (npm start fetches it where it can be had)";
  const { DISPLAY, WAYLAND_DISPLAY } = process.env;
  if (process.platform === 'linux' && !DISPLAY && !WAYLAND_DISPLAY) return 'there is no display';
  if (process.getuid?.() === 0) return "Electron's sandbox does not run as root";
  return null;
}

const reason = whyNot();

describe.runIf(reason === null)('the real shell', () => {
  it('opens the app with the desktop calls and without Node', async () => {
    const app = await _electron.launch({ executablePath: runtime ?? '', args: [root] });
    try {
      const page = await app.firstWindow();
      expect(page.url()).toBe('monobis://app/index.html');
      await page.getByRole('button', { name: 'Open the sample sheet' }).last().click();
      await page.locator('.answer-head').waitFor();
      expect(
        await page.evaluate(() => [
          'monobisDesktop' in window,
          'require' in window,
          'process' in window,
        ]),
      ).toEqual([true, false, false]);
    } finally {
      await app.close();
    }
  });
});

describe.runIf(reason !== null)('the real shell', () => {
  it(`DID NOT RUN: ${reason}; only its parts were tested, against a stand-in`, () => {
    console.log(`The smoke test of the real Electron shell did not run: ${reason}.`);
    expect(whyNot()).not.toBeNull();
  });
});
