import { writeFile } from 'node:fs/promises';
import os from 'node:os';
import path from 'node:path';
import { AxeBuilder } from '@axe-core/playwright';
import type { Browser } from 'playwright-core';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { syntheticSheet } from '../analysis/synthetic.ts';
import { launchBrowser } from './browser.ts';
import { dropFiles, type OpenApp, openApp } from './open-app.ts';

let browser: Browser;
let app: OpenApp | null = null;

beforeAll(async () => {
  browser = await launchBrowser();
});
afterEach(async () => {
  await app?.close();
  app = null;
});
afterAll(async () => {
  // the packaged browser may hang on a closed pipe: what counts is over
  await Promise.race([browser.close(), new Promise((resolve) => setTimeout(resolve, 5000))]);
});

/** A sheet of three aliquots with a band that no standard has, as a file to drop. */
async function sheetWithHiddenBand(): Promise<string> {
  const hidden = (nm: number) => Math.exp(-0.5 * ((nm - 300) / 10) ** 2);
  const aliquots = [0.02, 0.05, 0.08].flatMap((height, index) =>
    (syntheticSheet({ seed: 7 + index, extra: (nm) => height * hidden(nm) }).aliquots ?? []).map(
      (aliquot) => ({ ...aliquot, id: `a${index + 1}` }),
    ),
  );
  const file = path.join(os.tmpdir(), 'monobis-hidden-band.sheet.json');
  await writeFile(file, JSON.stringify({ ...syntheticSheet({ seed: 7 }), aliquots }));
  return file;
}

describe('what is asked for under the fit', () => {
  it('maps where the answer holds, takes a window of the map, and estimates what is missing', async () => {
    app = await openApp(browser);
    const { page, problems, strangers } = app;
    await dropFiles(page, 'body', [await sheetWithHiddenBand()]);
    await page.locator('.answer-head').waitFor();
    await page.locator('.missing-spectrum summary').press('Enter');
    const estimate = page.locator('.missing-spectrum');
    await estimate.getByRole('table').waitFor({ timeout: 60_000 });
    expect(await estimate.textContent()).toContain('An estimate, not a standard');
    // the products stand at 62.5 % mono in all three
    for (const share of await estimate.locator('tbody td:last-child').allTextContents()) {
      expect(Math.abs(Number(share) - 62.5)).toBeLessThan(0.4);
    }
    await page.locator('.window-map summary').press('Enter');
    const departing = page.locator('.map-cell[data-departs]').first();
    await departing.waitFor({ timeout: 60_000 });
    expect(await departing.getAttribute('aria-label')).toContain('departs from the whole window');
    const { violations } = await new AxeBuilder({ page }).setLegacyMode(true).analyze();
    expect(violations.map(({ id }) => id)).toEqual([]);
    await departing.press('Enter');
    await page.getByRole('button', { name: 'Undo' }).waitFor();
    await expect
      .poll(() => page.getByRole('button', { name: 'Undo' }).getAttribute('title'))
      .toContain('window of the map');
    expect(problems()).toEqual([]);
    expect(strangers()).toEqual([]);
  }, 180_000);
});
