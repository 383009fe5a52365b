import { mkdtemp, rm, truncate, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { AxeBuilder } from '@axe-core/playwright';
import type { Browser, Page } from 'playwright-core';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { openSheet, sheetText } from '../../analysis/index.ts';
import { syntheticSheet } from '../analysis/synthetic.ts';
import { launchBrowser } from './browser.ts';
import { downloaded, dropFiles, type OpenApp, openApp } from './open-app.ts';

const root = path.resolve(import.meta.dirname, '../..');
const sample = (file: string): string => path.join(root, 'sample-data', file);

let browser: Browser;
let app: OpenApp | null = null;
let folder = '';

beforeAll(async () => {
  browser = await launchBrowser();
  folder = await mkdtemp(path.join(tmpdir(), 'monobis-whole-'));
});
afterEach(async () => {
  await app?.close();
  app = null;
});
afterAll(async () => {
  await rm(folder, { recursive: true, force: true });
  // the packaged browser may hang on a closed pipe: what counts is over
  await Promise.race([browser.close(), new Promise((resolve) => setTimeout(resolve, 5000))]);
});

async function opened(look: Parameters<typeof openApp>[1] = {}): Promise<OpenApp> {
  app = await openApp(browser, look);
  return app;
}

async function openTheSample(page: Page): Promise<void> {
  await page.getByRole('button', { name: 'Open the sample sheet' }).last().click();
  await page.locator('.answer-head').waitFor();
}

const answer = (page: Page) => page.locator('.answer-head').textContent();

/** Nothing went wrong behind the screen, and nothing left the machine. */
function expectQuiet({ problems, strangers }: OpenApp): void {
  expect(problems()).toEqual([]);
  expect(strangers()).toEqual([]);
}

async function violations(page: Page): Promise<string[]> {
  // `legacy` mode needs no page of its own, which the policy would not let it open
  const { violations: found } = await new AxeBuilder({ page }).setLegacyMode(true).analyze();
  return found.map(
    ({ id, nodes }) =>
      `${id}: ${nodes
        .map(({ target }) => target.join(' '))
        .slice(0, 3)
        .join(', ')}`,
  );
}

describe('the sample', () => {
  it('is one click away and shows the answer with its interval, its doubts and its runs', async () => {
    const { page } = await opened();
    await openTheSample(page);
    expect(await answer(page)).toMatch(/^mono : bis = 2\.\d+ : 1$/);
    expect(await page.locator('.answer-interval').textContent()).toMatch(/95 %: 2\.\d+ to 2\.\d+/);
    expect(await page.locator('.doubt').textContent()).toContain('240 to 243 nm');
    expect(await page.getByText('Invented data').count()).toBeGreaterThan(0);
    expect(await page.locator('.shelf-aliquot').count()).toBe(6);
    expect(await page.getByRole('heading', { name: 'Runs compared' }).count()).toBe(1);
    await page.locator('.js-plotly-plot').nth(1).waitFor();
    expectQuiet(app!);
  });

  it('points Fit and Split at the aliquot chosen on the shelf', async () => {
    const { page } = await opened();
    await openTheSample(page);
    await page.locator('.shelf-aliquot').nth(5).click();
    await page.getByText('A band that nothing here explains').waitFor();
    expect(await answer(page)).toMatch(/= 0\.1\d+ : 1$/);
    expectQuiet(app!);
  });

  it('is clean to an accessibility scan, empty and filled, light and dark', async () => {
    for (const colorScheme of ['light', 'dark'] as const) {
      const { page, close } = await opened({ colorScheme });
      expect(await violations(page)).toEqual([]);
      await openTheSample(page);
      await page.locator('.js-plotly-plot').nth(1).waitFor();
      expect(await violations(page)).toEqual([]);
      expectQuiet(app!);
      await close();
      app = null;
    }
  });
});

describe('the fit window', () => {
  it('moves by typing, and the answer follows; undo brings both back', async () => {
    const { page } = await opened();
    await openTheSample(page);
    const before = await answer(page);
    const from = page.getByLabel('Window from, nm');
    await from.fill('350');
    await from.press('Enter');
    await expect.poll(() => page.locator('.figures dd').first().textContent()).toBe('111');
    expect(await answer(page)).not.toBe(before);
    await page.getByRole('button', { name: 'Undo' }).click();
    await expect.poll(() => answer(page)).toBe(before);
    expect(await from.inputValue()).toBe('240');
    expectQuiet(app!);
  });

  it('moves by its edge on the plot, with keys and with the pointer, as one step each', async () => {
    const { page } = await opened();
    await openTheSample(page);
    const edge = page.getByRole('slider', { name: 'Lower end of the fit window' });
    await edge.focus();
    await edge.press('ArrowRight');
    await expect.poll(() => edge.getAttribute('aria-valuenow')).toBe('241');
    await edge.press('Shift+ArrowRight');
    await expect.poll(() => edge.getAttribute('aria-valuenow')).toBe('251');
    const box = await edge.boundingBox();
    if (!box) throw new Error('the edge is not on the screen');
    await page.mouse.move(box.x + box.width / 2, box.y + 100);
    await page.mouse.down();
    await page.mouse.move(box.x + 60, box.y + 100, { steps: 4 });
    await page.mouse.move(box.x + 120, box.y + 100, { steps: 4 });
    await page.mouse.up();
    const moved = Number(await edge.getAttribute('aria-valuenow'));
    expect(moved).toBeGreaterThan(265);
    await expect
      .poll(async () => Number(await page.getByLabel('Window from, nm').inputValue()))
      .toBe(moved);
    await page.getByRole('button', { name: 'Undo' }).click();
    await expect.poll(() => edge.getAttribute('aria-valuenow')).toBe('251');
    expectQuiet(app!);
  });

  it('refuses an entry that makes no sense, beside the field, and leaves the sheet as it was', async () => {
    const { page } = await opened();
    await openTheSample(page);
    const field = page.getByLabel('Ranges left out, nm');
    await field.fill('304–300');
    await field.press('Enter');
    expect(await page.getByText('runs backwards').count()).toBe(1);
    expect(await page.getByRole('button', { name: 'Undo' }).isDisabled()).toBe(true);
    await field.fill('300–304');
    await field.press('Enter');
    await expect
      .poll(() => page.getByRole('button', { name: 'Undo' }).getAttribute('title'))
      .toContain('leave out ranges');
    expectQuiet(app!);
  });
});

describe('a sheet from the beginning', () => {
  it('is made from dropped exports, typed numbers and nothing else', async () => {
    const { page } = await opened();
    await page.getByRole('button', { name: 'Begin a new sheet' }).click();
    await page.getByText('Still needs a standard of').waitFor();
    await dropFiles(page, '#standards', [
      sample('standards/mono-A1.csv'),
      sample('standards/arm-A1.dat'),
      sample('standards/bis.csv'),
    ]);
    await page.getByText('Read 5 traces from 3 files.').waitFor();
    await dropFiles(page, '#aliquots', [sample('crude/core-into-arm.txt')]);
    await page.getByLabel('Dilution of a1', { exact: true }).waitFor();
    for (const [id, text] of [
      ['S1', '20'],
      ['S2', '50 µM'],
      ['S3', '1.1e-5 M'],
      ['S4', '0,02 mM'],
      ['S5', '30'],
    ] as const) {
      const field = page.getByLabel(`Concentration of ${id}`, { exact: true });
      await field.fill(text);
      await field.press('Enter');
    }
    expect(await page.getByLabel('Concentration of S4').inputValue()).toBe('20');
    await page.locator('.answer-head').waitFor();
    const dilution = page.getByLabel('Dilution of a1', { exact: true });
    await dilution.fill('1 -> 100; 5 -> 200');
    await dilution.press('Enter');
    expect(await dilution.inputValue()).toBe('1 → 100; 5 → 200');
    // the by-product has no standard here, and no uncertainty was typed: both are said
    await page.getByText('Uncertainty not given').waitFor();
    expectQuiet(app!);
  });

  it('asks where exports belong that are dropped beside the sections', async () => {
    const { page } = await opened();
    await dropFiles(page, '.drop-here', [sample('crude/arm-into-core.csv')]);
    await page.getByText('What are these 3 spectra?').waitFor();
    expect(await violations(page)).toEqual([]);
    await page.getByRole('button', { name: 'Aliquots of a crude' }).click();
    await page.getByLabel('Dilution of a3', { exact: true }).waitFor();
    expectQuiet(app!);
  });
});

describe('files', () => {
  it('a sheet is saved whole, opened again with the same answer, and exported', async () => {
    const { page } = await opened();
    await openTheSample(page);
    const before = await answer(page);
    // a picker cannot be driven from outside; without it the browser downloads
    await page.evaluate(() => Reflect.deleteProperty(window, 'showSaveFilePicker'));
    const saved = await downloaded(page, () =>
      page.getByRole('button', { name: 'Save', exact: true }).click(),
    );
    expect(saved.name).toBe('piperazine.sheet.json');
    const { sheet, warnings } = openSheet(saved.text);
    expect(warnings).toEqual([]);
    // one file to mail: every spectrum is in it
    expect(sheet.aliquots?.every(({ spectrum }) => spectrum.embedded !== undefined)).toBe(true);

    await page.getByRole('button', { name: 'New sheet' }).click();
    await page.getByText('Still needs a standard of').waitFor();
    const again = path.join(folder, 'again.sheet.json');
    await writeFile(again, saved.text);
    await dropFiles(page, 'main', [again]);
    await expect.poll(() => answer(page)).toBe(before);

    await page.getByRole('button', { name: 'Export', exact: true }).click();
    const csv = await downloaded(page, () =>
      page.getByRole('button', { name: 'Results as CSV' }).click(),
    );
    expect(csv.text).toContain('fraction of products');
    await page.getByRole('button', { name: 'Export', exact: true }).click();
    const html = await downloaded(page, () =>
      page.getByRole('button', { name: 'Report as HTML' }).click(),
    );
    expect(html.text).toContain('Provenance');
    expect(html.text).toContain(before);
    expectQuiet(app!);
  });

  it('a save that ends after another sheet was opened does not lend that one its file', async () => {
    const { page } = await opened();
    await openTheSample(page);
    await page.evaluate(() => {
      const taken = { name: 'first.sheet.json', ends: () => {} };
      const close = () =>
        new Promise<void>((resolve) => {
          taken.ends = resolve;
        });
      const createWritable = async () => ({ write: async () => {}, close });
      const showSaveFilePicker = async () => ({ name: taken.name, createWritable });
      Object.assign(window, { showSaveFilePicker, endTheSave: () => taken.ends() });
    });
    await page.getByRole('button', { name: 'Save', exact: true }).click();
    await page.getByRole('button', { name: 'New sheet' }).click();
    await page.getByText('not saved yet').waitFor();
    await page.evaluate(() => (window as { endTheSave?: () => void }).endTheSave?.());
    await page.getByText('Saved as first.sheet.json.').waitFor();
    expect(await page.locator('.page-title').textContent()).toContain('not saved yet');
    expectQuiet(app!);
  });

  it('the report opens to be printed, in its own style, with nothing the policy forbids', async () => {
    const { page, context } = await opened();
    await context.addInitScript(() => {
      window.print = () => {};
    });
    await openTheSample(page);
    await page.getByRole('button', { name: 'Export', exact: true }).click();
    const [report] = await Promise.all([
      context.waitForEvent('page'),
      page.getByRole('button', { name: 'Report to print or PDF' }).click(),
    ]);
    await report.getByText('Provenance').first().waitFor();
    const rules = await report.evaluate(() => document.adoptedStyleSheets[0]?.cssRules.length ?? 0);
    expect(rules).toBeGreaterThan(5);
    expectQuiet(app!);
  });

  it('says in words what is wrong with each strange file, and keeps the sheet', async () => {
    const strange: [string, Buffer | string, RegExp][] = [
      ['empty.csv', '', /empty/],
      [
        'photo.csv',
        Buffer.from([0xff, 0xd8, 0xff, 0xe0, 0, 16, 0x4a, 0x46, 0x49, 0x46, 0]),
        /picture/,
      ],
      [
        'binary.dat',
        Buffer.from(Array.from({ length: 3000 }, (_, i) => (i * 7919) % 251)),
        /no text|not text|text/i,
      ],
      [
        'wrong.sheet.json',
        '{"format": "monobis-sheet", "version": 1, "reaction": 5}',
        /"reaction"/,
      ],
      ['half.sheet.json', '{"format": "monobis-sheet",', /not a whole JSON/],
    ];
    const { page } = await opened();
    await openTheSample(page);
    const before = await answer(page);
    for (const [name, content, words] of strange) {
      const file = path.join(folder, name);
      await writeFile(file, content);
      await dropFiles(page, '#aliquots', [file]);
      await page.getByText(words).first().waitFor();
      for (const button of await page.getByRole('button', { name: 'Dismiss' }).all())
        await button.click();
    }
    const huge = path.join(folder, 'huge.csv');
    await writeFile(huge, '');
    await truncate(huge, 100 * 1024 * 1024);
    await dropFiles(page, '#aliquots', [huge]);
    await page.getByText(/more than 64 MiB are not read/).waitFor();
    expect(await answer(page)).toBe(before);
    expectQuiet(app!);
  });

  it('asks for the files that a sheet names, and takes them by name', async () => {
    const sheet = syntheticSheet();
    const named = { ...sheet, aliquots: [{ id: 'a1', spectrum: { file: 'crude/only.csv' } }] };
    const file = path.join(folder, 'named.sheet.json');
    await writeFile(file, sheetText(named));
    const { page } = await opened();
    await dropFiles(page, 'main', [file]);
    await page.getByText('crude/only.csv').first().waitFor();
    const crude = path.join(folder, 'only.csv');
    const { wavelengthNm = [], absorbance = [] } = sheet.aliquots?.[0]?.spectrum.embedded ?? {};
    await writeFile(
      crude,
      `wavelength (nm),absorbance\n${wavelengthNm.map((nm, i) => `${nm},${absorbance[i]?.toFixed(5)}`).join('\n')}\n`,
    );
    await dropFiles(page, 'main', [crude]);
    await page.locator('.answer-head').waitFor();
    expectQuiet(app!);
  });

  it('keeps what was not saved and offers it after the page was gone', async () => {
    const { page } = await opened();
    await page.getByRole('button', { name: 'Begin a new sheet' }).click();
    const title = page.getByLabel('Title of the sheet');
    await title.fill('Before the crash');
    await title.press('Enter');
    await page.waitForTimeout(900);
    await page.evaluate(() => {
      window.onbeforeunload = null;
    });
    await page.reload();
    await page.getByText('Before the crash').waitFor();
    await page.getByRole('button', { name: 'Take it up again' }).click();
    await expect.poll(() => title.inputValue()).toBe('Before the crash');
    expectQuiet(app!);
  });
});
