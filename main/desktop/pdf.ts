import { randomUUID } from 'node:crypto';
import { BrowserWindow, type Session, session } from 'electron';
import { guardSession } from './guards.ts';
import { reportOrigin, scheme } from './protocol.ts';

/** What a report may do: show its own styles and pictures, and nothing else. */
const reportPolicy =
  "default-src 'none'; style-src 'unsafe-inline'; img-src data:; font-src data:; base-uri 'none'; form-action 'none'";

const reports = new Map<string, string>();

/**
 * Prints a report to PDF bytes in a hidden window of its own: sandboxed, without script, without a
 * preload, in a session that keeps nothing and that may load nothing but the report itself. The
 * report comes over our own protocol, for an address that carried it would be cut at 2 MB.
 */
export async function printToPdf(html: string): Promise<Uint8Array> {
  const address = `${reportOrigin}/${randomUUID()}`;
  const window = new BrowserWindow({
    show: false,
    webPreferences: {
      sandbox: true,
      contextIsolation: true,
      nodeIntegration: false,
      javascript: false,
      webSecurity: true,
      session: reportSession(),
    },
  });
  reports.set(address, html);
  try {
    await window.loadURL(address);
    const pdf = await window.webContents.printToPDF({
      pageSize: 'A4',
      printBackground: true,
      preferCSSPageSize: true,
      generateTaggedPDF: true,
      generateDocumentOutline: true,
    });
    return new Uint8Array(pdf);
  } finally {
    reports.delete(address);
    window.destroy();
  }
}

/** One for all reports, in memory only. */
function reportSession(): Session {
  const own = session.fromPartition('report');
  if (own.protocol.isProtocolHandled(scheme)) return own;
  guardSession(own);
  own.protocol.handle(scheme, ({ url }) => reportAnswer(url));
  own.webRequest.onBeforeRequest(({ url }, decide) =>
    decide({ cancel: !(url.startsWith('data:') || reports.has(url)) }),
  );
  return own;
}

function reportAnswer(url: string): Response {
  const html = reports.get(url);
  if (html === undefined) return new Response(null, { status: 404 });
  return new Response(html, {
    headers: {
      'Content-Type': 'text/html; charset=utf-8',
      'Content-Security-Policy': reportPolicy,
      'X-Content-Type-Options': 'nosniff',
    },
  });
}
