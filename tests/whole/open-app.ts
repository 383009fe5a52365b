import { readFile } from 'node:fs/promises';
import path from 'node:path';
import type { Browser, BrowserContext, Page } from 'playwright-core';
import { serveLoopback } from '../../main/desktop/loopback.mjs';

const root = path.resolve(import.meta.dirname, '../..');

export interface OpenApp {
  readonly page: Page;
  readonly context: BrowserContext;
  readonly address: string;
  /**
   * Console errors, page and worker errors, violations of the policy and own files that could not
   * be had, so far; [] is what it should be.
   */
  readonly problems: () => readonly string[];
  /** Requests that went to any other host; [] is what it should be. */
  readonly strangers: () => readonly string[];
  readonly close: () => Promise<void>;
}

interface Look {
  readonly width?: number;
  readonly height?: number;
  readonly colorScheme?: 'light' | 'dark';
  /** The built page; the app's own by default. */
  readonly folder?: string;
}

/** Opens the built app from the loopback server in a fresh context. */
export async function openApp(browser: Browser, look: Look = {}): Promise<OpenApp> {
  const server = await serveLoopback({ folder: look.folder ?? path.join(root, 'dist/renderer') });
  const context = await browser.newContext({
    viewport: { width: look.width ?? 1280, height: look.height ?? 800 },
    colorScheme: look.colorScheme ?? 'light',
    acceptDownloads: true,
    reducedMotion: 'reduce',
  });
  const page = await context.newPage();
  const problems = await listen(page, server.address);
  const strangers: string[] = [];
  const isOwn = (url: string) =>
    url.startsWith(server.address) || url === 'about:blank' || /^(blob|data):/.test(url);
  context.on('request', (request) => {
    if (!isOwn(request.url())) strangers.push(request.url());
  });
  page.on('websocket', (socket) => strangers.push(socket.url()));
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

/** Collects what goes wrong in a page from before its first script on. */
async function listen(page: Page, address: string): Promise<readonly string[]> {
  const problems: string[] = [];
  page.on('console', (message) => {
    if (message.type() === 'error') problems.push(`console: ${message.text()}`);
  });
  page.on('pageerror', (error) => problems.push(`page: ${error.message}`));
  page.on('crash', () => problems.push('page: crashed'));
  page.on('response', (response) => {
    if (response.status() >= 400) problems.push(`${response.status()}: ${response.url()}`);
  });
  page.on('requestfailed', (request) => {
    // what another page or a test cut short is no fault of the app
    const text = request.failure()?.errorText ?? '';
    if (request.url().startsWith(address) && !/ABORTED/.test(text))
      problems.push(`${text}: ${request.url()}`);
  });
  await page.exposeFunction('policyViolated', (what: string) => problems.push(`policy: ${what}`));
  await page.addInitScript(() => {
    document.addEventListener('securitypolicyviolation', (event) => {
      const { policyViolated } = window as { policyViolated?: (what: string) => void };
      policyViolated?.(`${event.effectiveDirective} ${event.blockedURI} ${event.sample}`);
    });
  });
  return problems;
}

/** Drops real files on an element, through the devtools protocol, as the operating system would. */
export async function dropFiles(
  page: Page,
  selector: string,
  files: readonly string[],
): Promise<void> {
  const at = await page.locator(selector).first().evaluate(pointOn);
  if (!at) throw new Error(`there is nothing to drop on at ${selector}, or something covers it`);
  const session = await page.context().newCDPSession(page);
  const data = { items: [], files: [...files], dragOperationsMask: 1 };
  for (const type of ['dragEnter', 'dragOver', 'drop'] as const) {
    await session.send('Input.dispatchDragEvent', { type, ...at, data });
  }
  await session.detach();
}

/** A point of the window where an element is on top. Runs in the page, which it scrolls if it must. */
function pointOn(element: Element): { x: number; y: number } | null {
  element.scrollIntoView({ block: 'nearest', behavior: 'instant' });
  const { left, top, width, height } = element.getBoundingClientRect();
  const parts = [0.5, 0.3, 0.7, 0.1, 0.9, 0.02, 0.98];
  for (const down of parts) {
    for (const across of parts) {
      const x = left + across * width;
      const y = top + down * height;
      if (element.contains(document.elementFromPoint(x, y))) return { x, y };
    }
  }
  return null;
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
