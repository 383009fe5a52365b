import { existsSync, mkdtempSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { type Browser, chromium } from 'playwright-core';

const installed: Partial<Record<NodeJS.Platform, readonly string[]>> = {
  linux: [
    '/usr/bin/chromium',
    '/usr/bin/chromium-browser',
    '/usr/bin/google-chrome',
    '/usr/bin/google-chrome-stable',
    '/usr/bin/microsoft-edge',
  ],
  darwin: [
    '/Applications/Google Chrome.app/Contents/MacOS/Google Chrome',
    '/Applications/Chromium.app/Contents/MacOS/Chromium',
    '/Applications/Microsoft Edge.app/Contents/MacOS/Microsoft Edge',
  ],
  win32: [
    'C:\\Program Files\\Google\\Chrome\\Application\\chrome.exe',
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

/**
 * A headless browser for the whole-app tests: MONOBIS_BROWSER if set, else one that is installed,
 * else (Linux x64) the one inside a registry package. Throws with what to install if none can be had.
 */
export async function launchBrowser(): Promise<Browser> {
  const executablePath = await findBrowser();
  const asRoot = process.getuid?.() === 0;
  return chromium.launch({ executablePath, chromiumSandbox: !asRoot, args: quiet });
}

async function findBrowser(): Promise<string> {
  const named = process.env.MONOBIS_BROWSER;
  if (named) {
    if (existsSync(named)) return named;
    throw new Error(`MONOBIS_BROWSER names "${named}", which does not exist.`);
  }
  const found = installed[process.platform]?.find((file) => existsSync(file));
  if (found) return found;
  if (process.platform === 'linux' && process.arch === 'x64') return packagedBrowser();
  throw new Error(
    'No browser was found for the whole-app tests. Install Chromium, Chrome or Edge, or set MONOBIS_BROWSER to one.',
  );
}

/** The package unpacks itself into TMPDIR and reuses what it finds there: give it a private one. */
async function packagedBrowser(): Promise<string> {
  // without this it does not unpack the libraries that a bare machine lacks
  process.env.AWS_LAMBDA_JS_RUNTIME = 'nodejs20.x';
  const before = process.env.TMPDIR;
  const own = mkdtempSync(path.join(tmpdir(), 'monobis-browser-'));
  process.env.TMPDIR = own;
  try {
    const { default: packaged } = await import('@sparticuz/chromium');
    const executable = await packaged.executablePath();
    writeFontSettings(own);
    return executable;
  } finally {
    if (before === undefined) delete process.env.TMPDIR;
    else process.env.TMPDIR = before;
  }
}

/**
 * Its own font settings look in /tmp/fonts only: with another TMPDIR it finds no font at all and
 * stops at the first text field. Only its own: what else a machine has would change the picture.
 */
function writeFontSettings(folder: string): void {
  const settings = `<?xml version="1.0"?>
<!DOCTYPE fontconfig SYSTEM "fonts.dtd">
<fontconfig>
  <dir>${path.join(folder, 'fonts')}</dir>
  <cachedir>${path.join(folder, 'font-cache')}</cachedir>
</fontconfig>
`;
  writeFileSync(path.join(folder, 'fonts/fonts.conf'), settings);
}
