import { BrowserWindow } from 'electron';
import { guardContents } from './guards.ts';

/**
 * Prints a report to PDF bytes in a hidden window of its own: sandboxed, without script, without a
 * preload, in a session that keeps nothing and that may load nothing but the report itself.
 */
export async function printToPdf(html: string): Promise<Uint8Array> {
  const window = new BrowserWindow({
    show: false,
    webPreferences: {
      sandbox: true,
      contextIsolation: true,
      nodeIntegration: false,
      javascript: false,
      webSecurity: true,
      partition: 'report',
    },
  });
  try {
    const { session } = window.webContents;
    session.webRequest.onBeforeRequest((details, decide) => {
      decide({ cancel: !details.url.startsWith('data:') });
    });
    await window.loadURL(
      `data:text/html;charset=utf-8;base64,${Buffer.from(html).toString('base64')}`,
    );
    guardContents(window.webContents);
    const pdf = await window.webContents.printToPDF({
      pageSize: 'A4',
      printBackground: true,
      preferCSSPageSize: true,
    });
    return new Uint8Array(pdf);
  } finally {
    window.destroy();
  }
}
