import { Refusal } from '../../analysis/index.ts';
import type { ExportKind, OpenedFile } from '../../main/desktop/channels.ts';
import type { Platform, SheetSource } from './platform.ts';

const types: Record<ExportKind, string> = {
  csv: 'text/csv',
  html: 'text/html',
  json: 'application/json',
};

/** Where a browser can write a file that the user chose (File System Access API), as far as it is used here. */
interface WritableHandle {
  readonly name: string;
  createWritable(): Promise<{ write(text: string): Promise<void>; close(): Promise<void> }>;
}

interface FilePickers {
  showSaveFilePicker?: (options: {
    suggestedName: string;
    types: { description: string; accept: Record<string, string[]> }[];
  }) => Promise<WritableHandle>;
}

/** The page in a plain browser: file inputs, downloads, and the file picker where there is one. */
export function browserPlatform(): Platform {
  return {
    kind: 'browser',
    openSheet: async () => {
      const [file] = await askForFiles({ accept: '.json', multiple: false });
      return file ? sheetSource(file) : null;
    },
    openExports: async () => filesOrRefusal(await askForFiles({ accept: '', multiple: true })),
    saveSheet: async (text, handle, suggestedName) => {
      const target = isWritable(handle) ? handle : await askWhereToSave(suggestedName);
      if (target === null) return null;
      if (target === 'download') {
        download(text, suggestedName, 'application/json');
        return { name: suggestedName, handle: null };
      }
      await writeTo(target, text);
      return { name: target.name, handle: target };
    },
    exportText: async (text, suggestedName, kind) => {
      download(text, suggestedName, types[kind]);
      return suggestedName;
    },
    exportPdf: async (html) => {
      printPage(html);
      return null;
    },
    onCommand: () => {},
    onOpenRequested: () => {},
    setUnsaved: (unsaved) => {
      window.onbeforeunload = unsaved ? (event) => event.preventDefault() : null;
    },
  };
}

interface ReadFiles {
  readonly files: readonly OpenedFile[];
  /** Names of those that the browser could not read: a folder, or a file that is gone or locked. */
  readonly unreadable: readonly string[];
}

/** Reads files one after the other; one that cannot be read does not stop the others. */
export async function openedAll(given: readonly File[]): Promise<ReadFiles> {
  const files: OpenedFile[] = [];
  const unreadable: string[] = [];
  for (const file of given) {
    try {
      files.push(await opened(file));
    } catch (error) {
      if (!(error instanceof DOMException)) throw error;
      unreadable.push(file.name);
    }
  }
  return { files, unreadable };
}

async function filesOrRefusal(given: readonly File[]): Promise<readonly OpenedFile[]> {
  const { files, unreadable } = await openedAll(given);
  if (unreadable.length === 0) return files;
  throw new Refusal({
    code: 'cannot-read',
    message: `The browser could not read ${unreadable.join(', ')}; nothing was taken in.`,
    mend: 'Look whether the files are still there and free to be read, and choose them again.',
  });
}

async function opened(file: File): Promise<OpenedFile> {
  // past this an export is refused by its size; its first bytes are enough to say so
  const limit = 64 * 1024 * 1024 + 1;
  const part = file.size > limit ? file.slice(0, limit) : file;
  return { name: file.name, bytes: new Uint8Array(await part.arrayBuffer()) };
}

/** A sheet in a browser comes alone: its folder cannot be looked into. */
export async function sheetSource(file: File): Promise<SheetSource> {
  if (file.size > 512 * 1024 * 1024) {
    throw new Refusal({
      code: 'sheet-too-large',
      message: 'The file is larger than any sheet.',
      where: { file: file.name },
      mend: 'Choose a *.sheet.json file.',
    });
  }
  return { name: file.name, text: await file.text(), handle: null, files: [], missing: [] };
}

function askForFiles(options: { accept: string; multiple: boolean }): Promise<readonly File[]> {
  return new Promise((resolve) => {
    const input = document.createElement('input');
    input.type = 'file';
    input.accept = options.accept;
    input.multiple = options.multiple;
    input.onchange = () => resolve([...(input.files ?? [])]);
    input.oncancel = () => resolve([]);
    input.click();
  });
}

async function askWhereToSave(suggestedName: string): Promise<WritableHandle | 'download' | null> {
  const { showSaveFilePicker } = window as FilePickers;
  if (!showSaveFilePicker) return 'download';
  try {
    return await showSaveFilePicker.call(window, {
      suggestedName,
      types: [{ description: 'Sheet', accept: { 'application/json': ['.json'] } }],
    });
  } catch (error) {
    if (error instanceof DOMException && error.name === 'AbortError') return null;
    // a page without the right to the picker can still download
    return 'download';
  }
}

/** The browser writes to a temporary copy and puts it in place on `close`: whole or not at all. */
async function writeTo(handle: WritableHandle, text: string): Promise<void> {
  try {
    const stream = await handle.createWritable();
    await stream.write(text);
    await stream.close();
  } catch (error) {
    throw new Refusal({
      code: 'cannot-write',
      message: `The file could not be written (${error instanceof Error ? error.message : 'no reason given'}); what was there before is untouched.`,
      where: { file: handle.name },
      mend: 'Save it under another name.',
    });
  }
}

function isWritable(handle: unknown): handle is WritableHandle {
  return typeof handle === 'object' && handle !== null && 'createWritable' in handle;
}

function download(text: string, name: string, type: string): void {
  const url = URL.createObjectURL(new Blob([text], { type: `${type};charset=utf-8` }));
  const link = document.createElement('a');
  link.href = url;
  link.download = name;
  link.click();
  // the download has taken hold of the blob by the next turn
  setTimeout(() => URL.revokeObjectURL(url), 10_000);
}

/**
 * Shows the report in a window of its own with its print dialog, where "save as PDF" is. The page's
 * policy holds there too and allows no style element, so that the report's style goes in as a
 * constructed sheet.
 */
function printPage(html: string): void {
  const page = window.open('', '_blank');
  if (!page) {
    throw new Refusal({
      code: 'window-blocked',
      message: 'The browser did not allow the report to open in a window.',
      mend: 'Allow windows for this page, or export the report as HTML and print that.',
    });
  }
  // taken out before parsing: even a document that is never shown may hold no style element
  const inlineStyle = /<style>([\s\S]*?)<\/style>/;
  const report = new DOMParser().parseFromString(html.replace(inlineStyle, ''), 'text/html');
  const style = new (page as Window & typeof globalThis).CSSStyleSheet();
  style.replaceSync(inlineStyle.exec(html)?.[1] ?? '');
  page.document.adoptedStyleSheets = [style];
  page.document.title = report.title;
  page.document.body.replaceWith(page.document.importNode(report.body, true));
  page.print();
}
