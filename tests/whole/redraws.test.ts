import { AxeBuilder } from '@axe-core/playwright';
import type { Browser, Page } from 'playwright-core';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { launchBrowser } from './browser.ts';
import { type OpenApp, openApp } from './open-app.ts';

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

async function openedSample(colorScheme: 'light' | 'dark' = 'light'): Promise<OpenApp> {
  app = await openApp(browser, { colorScheme });
  await app.page.getByRole('button', { name: 'Open the sample sheet' }).last().click();
  await app.page.locator('.answer-head').waitFor();
  return app;
}

const check = (page: Page) => page.getByRole('region', { name: 'Check by redraws' });

/** Asks for that many redraws with the keyboard alone. */
async function ask(page: Page, draws: string): Promise<void> {
  await check(page).getByLabel('Number of redraws').selectOption(draws);
  await check(page).getByRole('button', { name: 'Check by redraws' }).press('Enter');
}

describe('the check by redraws', () => {
  it('shows its progress and then both intervals; a change of the sheet marks it', async () => {
    const { page, problems, strangers } = await openedSample('dark');
    await ask(page, '500');
    await check(page).getByRole('progressbar').waitFor();
    const table = check(page).getByRole('table');
    await table.waitFor({ timeout: 90_000 });
    expect(await check(page).getByRole('status').textContent()).toContain('500 redraws');
    const row = await table.getByRole('row', { name: /^mono, of products/ }).textContent();
    expect(row).toMatch(/(\d+\.\d+ to \d+\.\d+).*\d+\.\d+ to \d+\.\d+/);
    const { violations } = await new AxeBuilder({ page }).setLegacyMode(true).analyze();
    expect(violations.map(({ id }) => id)).toEqual([]);
    await page.locator('.shelf-aliquot').nth(1).click();
    await expect
      .poll(() => check(page).getByRole('status').textContent())
      .toContain('Run it again');
    expect(problems()).toEqual([]);
    expect(strangers()).toEqual([]);
  });

  it('lets a refit go first, and can be cancelled', async () => {
    const { page, problems } = await openedSample();
    await ask(page, '10000');
    await expect.poll(() => check(page).getByText(/left$/).count()).toBe(1);
    await check(page).getByRole('button', { name: 'Cancel' }).press('Enter');
    await expect.poll(() => check(page).getByRole('status').textContent()).toContain('stopped');
    const start = check(page).getByRole('button', { name: 'Check by redraws' });
    expect(await start.evaluate((element) => element === document.activeElement)).toBe(true);
    await ask(page, '10000');
    await check(page).getByRole('progressbar').waitFor();
    const from = page.getByLabel('Window from, nm');
    await from.fill('300');
    await from.press('Enter');
    await expect.poll(() => page.locator('.figures dd').first().textContent()).toBe('161');
    await expect.poll(() => check(page).getByRole('status').textContent()).toContain('stopped');
    expect(problems()).toEqual([]);
  });
});
