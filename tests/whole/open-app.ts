import { readFile } from 'node:fs/promises';
import path from 'node:path';
import type { Browser, BrowserContext, Page } from 'playwright-core';
import { serveLoopback } from '../../main/desktop/loopback.mjs';

const root = path.resolve(import.meta.dirname, '../..');

export interface OpenApp {
  readonly page: Page;
  readonly context: BrowserContext;
  readonly address: string;
  /** Console errors, page errors and violations of the policy so far; [] is what it should be. */
  readonly problems: () => readonly string[];
  /** Requests that went to any other host; [] is what it should be. */
  readonly strangers: () => readonly string[];
  readonly close: () => Promise<void>;
}

interface Look {
  readonly width?: number;
  readonly height?: number;
  readonly colorScheme?: 'light' | 'dark';
}

/** Opens the built app from the loopback server in a fresh context. */
export async function openApp(browser: Browser, look: Look = {}): Promise<OpenApp> {
  const server = await serveLoopback({ folder: path.join(root, 'dist/renderer') });
  const context = await browser.newContext({
    viewport: { width: look.width ?? 1280, height: look.height ?? 800 },
    colorScheme: look.colorScheme ?? 'light',
    acceptDownloads: true,
    reducedMotion: 'reduce',
  });
  const page = await context.newPage();
  const problems: string[] = [];
  const strangers: string[] = [];
  page.on('console', (message) => {
    if (message.type() === 'error') problems.push(`console: ${message.text()}`);
  });
  page.on('pageerror', (error) => problems.push(`page: ${error.message}`));
  context.on('request', (request) => {
    const url = request.url();
    const own = url.startsWith(server.address) || /^(blob|data):/.test(url);
    if (!own) strangers.push(url);
  });
  await page.goto(server.address);
  return {
    page,
    context,
    address: server.address,
    problems: () => problems,
    strangers: () => strangers,
    close: async () => {
      await context.close();
      await server.close();
    },
  };
}

/** Drops real files on an element, through the devtools protocol, as the operating system would. */
export async function dropFiles(
  page: Page,
  selector: string,
  files: readonly string[],
): Promise<void> {
  await page.locator(selector).first().scrollIntoViewIfNeeded();
  const box = await page.locator(selector).first().boundingBox();
  if (!box) throw new Error(`there is nothing to drop on at ${selector}`);
  const session = await page.context().newCDPSession(page);
  // below the header, which stays in place
  const at = { x: box.x + box.width / 2, y: Math.max(box.y + Math.min(box.height / 2, 40), 140) };
  const data = { items: [], files: [...files], dragOperationsMask: 1 };
  for (const type of ['dragEnter', 'dragOver', 'drop'] as const) {
    await session.send('Input.dispatchDragEvent', { type, ...at, data });
  }
  await session.detach();
}

/** Clicks what starts a download and gives back its name and text. */
export async function downloaded(
  page: Page,
  start: () => Promise<void>,
): Promise<{ name: string; text: string; path: string }> {
  const [download] = await Promise.all([page.waitForEvent('download'), start()]);
  const file = await download.path();
  return { name: download.suggestedFilename(), text: await readFile(file, 'utf8'), path: file };
}
