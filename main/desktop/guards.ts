import type { IpcMainEvent, IpcMainInvokeEvent, Session, WebContents } from 'electron';
import * as v from 'valibot';
import type { RefusalText } from '../../analysis/index.ts';
import { Refusal } from '../../analysis/index.ts';
import type { Answer } from './channels.ts';

/** The origin of the app's own pages. */
export const appOrigin = 'monobis://app';

const name = v.pipe(v.string(), v.minLength(1), v.maxLength(200));
const text = v.string();

/** What each channel takes; anything else is not acted on. */
export const argumentsOf = {
  nothing: v.strictTuple([]),
  save: v.strictTuple([
    v.strictObject({
      text,
      handle: v.nullable(v.pipe(v.string(), v.maxLength(100))),
      suggestedName: name,
    }),
  ]),
  exportText: v.strictTuple([
    v.strictObject({ text, suggestedName: name, kind: v.picklist(['csv', 'html', 'json']) }),
  ]),
  exportPdf: v.strictTuple([v.strictObject({ html: text, suggestedName: name })]),
  unsaved: v.strictTuple([v.boolean()]),
} as const;

/** Only the main frame of our own page may speak. */
export function isOurs(event: Pick<IpcMainEvent | IpcMainInvokeEvent, 'senderFrame'>): boolean {
  const frame = event.senderFrame;
  return frame !== null && frame.parent === null && originOf(frame.url) === appOrigin;
}

function originOf(url: string): string {
  try {
    const { protocol, host } = new URL(url);
    return `${protocol}//${host}`;
  } catch {
    return '';
  }
}

/** Runs a channel's work for a checked sender and checked arguments; a refusal crosses as data. */
export async function answered<S extends v.GenericSchema, T>(
  event: Pick<IpcMainInvokeEvent, 'senderFrame'>,
  schema: S,
  args: readonly unknown[],
  work: (args: v.InferOutput<S>) => Promise<T>,
): Promise<Answer<T>> {
  if (!isOurs(event)) return { ok: false, refusal: notAllowed };
  const checked = v.safeParse(schema, args);
  if (!checked.success) return { ok: false, refusal: notAllowed };
  try {
    return { ok: true, value: await work(checked.output) };
  } catch (error) {
    if (error instanceof Refusal) return { ok: false, refusal: error.toText() };
    throw error;
  }
}

const notAllowed: RefusalText = {
  code: 'not-allowed',
  message: 'The window asked for something that it may not.',
  mend: 'Start the program again; if it comes back, report it.',
};

/** No navigation away, no new windows, no embedded pages. */
export function guardContents(contents: WebContents): void {
  contents.on('will-navigate', (event) => event.preventDefault());
  contents.on('will-frame-navigate', (event) => event.preventDefault());
  contents.on('will-redirect', (event) => event.preventDefault());
  contents.on('will-attach-webview', (event) => event.preventDefault());
  contents.setWindowOpenHandler(() => ({ action: 'deny' }));
}

/**
 * All permissions are denied, asked for or checked, but one: our own page may put text on the
 * clipboard, which its Copy buttons do. Nothing is downloaded: what is written goes by a channel.
 */
export function guardSession(session: Session): void {
  const isGranted = (permission: string, url: string): boolean =>
    permission === 'clipboard-sanitized-write' && originOf(url) === appOrigin;
  session.setPermissionRequestHandler((_contents, permission, decide, details) =>
    decide(details.isMainFrame && isGranted(permission, details.requestingUrl)),
  );
  session.setPermissionCheckHandler((_contents, permission, origin, details) =>
    Boolean(details.isMainFrame && isGranted(permission, origin)),
  );
  session.setDevicePermissionHandler(() => false);
  session.on('will-download', (event) => event.preventDefault());
}
