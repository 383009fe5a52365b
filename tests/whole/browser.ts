import { existsSync, rmSync } from 'node:fs';
import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { type Browser, chromium } from 'playwright-core';

/** Names on the PATH, and places where an installer puts it. */
const installed: Partial<Record<NodeJS.Platform, readonly string[]>> = {
  linux: [
    'chromium',
    'chromium-browser',
    'google-chrome',
    'google-chrome-stable',
    'microsoft-edge',
    'microsoft-edge-stable',
  ],
  darwin: [
    '/Applications/Chromium.app/Contents/MacOS/Chromium',
    '/Applications/Google Chrome.app/Contents/MacOS/Google Chrome',
    '/Applications/Microsoft Edge.app/Contents/MacOS/Microsoft Edge',
  ],
  win32: [
    'C:\\Program Files\\Google\\Chrome\\Application\\chrome.exe',
    'C:\\Program Files (x86)\\Google\\Chrome\\Application\\chrome.exe',
    'C:\\Program Files (x86)\\Microsoft\\Edge\\Application\\msedge.exe',
  ],
};

const quiet = [
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
  '--disable-dev-shm-usage',
];

/** What the tests may be run with; tests of the search itself give their own. */
interface Machine {
  readonly platform: NodeJS.Platform;
  readonly arch: string;
  readonly env: Readonly<Record<string, string | undefined>>;
}

/**
 * A headless browser for the whole-app tests: MONOBIS_BROWSER if set, else one that is installed,
 * else (Linux x64) the one inside a registry package, whose unpacked copy (200 MB) is gone again
 * after `close`. Throws with what to install if none can be had.
 */
export async function launchBrowser(): Promise<Browser> {
  const found = findBrowser(process);
  const { executable, clear } = found
    ? { executable: found, clear: async () => {} }
    : await packagedBrowser();
  const asRoot = process.getuid?.() === 0;
  const browser = await chromium.launch({
    executablePath: executable,
    chromiumSandbox: !asRoot,
    args: quiet,
  });
  const close = browser.close.bind(browser);
  browser.close = async (options) => {
    // the packaged browser may hang on a closed pipe: what counts is over by then
    await Promise.race([close(options), new Promise((resolve) => setTimeout(resolve, 5000))]);
    await clear();
  };
  return browser;
}

/** Null where only the packaged one is left; throws where not even that can be had. */
export function findBrowser({ platform, arch, env }: Machine): string | null {
  const named = env.MONOBIS_BROWSER;
  if (named) {
    if (existsSync(named)) return named;
    throw new Error(`MONOBIS_BROWSER names "${named}", which does not exist.`);
  }
  const folders = (env.PATH ?? '').split(path.delimiter);
  const places = (installed[platform] ?? []).flatMap((place) =>
    path.win32.isAbsolute(place) ? [place] : folders.map((folder) => path.join(folder, place)),
  );
  const found = places.find((place) => existsSync(place));
  if (found) return found;
  if (platform === 'linux' && arch === 'x64') return null;
  throw new Error(
    'No browser was found for the whole-app tests. Install Chromium, Chrome or Edge, or set MONOBIS_BROWSER to one.',
  );
}

/** The package unpacks itself into TMPDIR and reuses what it finds there: give it a private one. */
async function packagedBrowser(): Promise<{ executable: string; clear: () => Promise<void> }> {
  // without this it does not unpack the libraries that a bare machine lacks
  process.env.AWS_LAMBDA_JS_RUNTIME = 'nodejs20.x';
  const before = process.env.TMPDIR;
  const own = await mkdtemp(path.join(tmpdir(), 'monobis-browser-'));
  const clear = () => rm(own, { recursive: true, force: true, maxRetries: 5 });
  // for where no one closes the browser: a run that was stopped
  process.once('exit', () => rmSync(own, { recursive: true, force: true }));
  process.env.TMPDIR = own;
  try {
    const { default: packaged } = await import('@sparticuz/chromium');
    const executable = await packaged.executablePath();
    await writeFontSettings(own);
    return { executable, clear };
  } finally {
    if (before === undefined) delete process.env.TMPDIR;
    else process.env.TMPDIR = before;
  }
}

/**
 * Its own font settings look in /tmp/fonts only: with another TMPDIR it finds no font at all and
 * stops at the first text field. Only its own: what else a machine has would change the picture.
 */
async function writeFontSettings(folder: string): Promise<void> {
  const settings = `<?xml version="1.0"?>
<!DOCTYPE fontconfig SYSTEM "fonts.dtd">
<fontconfig>
  <dir>${path.join(folder, 'fonts')}</dir>
  <cachedir>${path.join(folder, 'font-cache')}</cachedir>
</fontconfig>
`;
  await writeFile(path.join(folder, 'fonts/fonts.conf'), settings);
}
