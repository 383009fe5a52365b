import type { RefusalText } from '../../analysis/index.ts';

/**
 * What the screen may ask of the shell: the only file of main/ that renderer/ may import. Everything
 * that crosses is plain data; paths never do, only names to show and handles that the shell gave out.
 */

/** Errors lose their fields when they cross, so that a refusal crosses as data. */
export type Answer<T> =
  | { readonly ok: true; readonly value: T }
  | { readonly ok: false; readonly refusal: RefusalText };

export interface OpenedFile {
  readonly name: string;
  readonly bytes: Uint8Array;
}

export interface OpenedSheet {
  readonly name: string;
  /** Stands for the place it came from; good for saving there again in this session. */
  readonly handle: string;
  readonly text: string;
  /** The files that the sheet names, as far as they lie within its own folder; `name` as the sheet has it. */
  readonly files: readonly OpenedFile[];
  readonly missing: readonly { readonly path: string; readonly why: string }[];
}

export interface SaveRequest {
  readonly text: string;
  /** Null asks for a place. */
  readonly handle: string | null;
  readonly suggestedName: string;
}

export interface SavedSheet {
  readonly name: string;
  readonly handle: string;
}

export type ExportKind = 'csv' | 'html' | 'json';

export interface ExportRequest {
  readonly text: string;
  readonly suggestedName: string;
  readonly kind: ExportKind;
}

export interface PdfRequest {
  readonly html: string;
  readonly suggestedName: string;
}

export const menuCommands = [
  'new-sheet',
  'open-sheet',
  'open-sample',
  'add-exports',
  'save',
  'save-as',
  'export-csv',
  'export-html',
  'export-pdf',
  'undo',
  'redo',
] as const;

export type MenuCommand = (typeof menuCommands)[number];

/** `window.monobisDesktop`. A null value means that the user closed the dialog without choosing. */
export interface DesktopApi {
  openSheet(): Promise<Answer<OpenedSheet | null>>;
  openExports(): Promise<Answer<readonly OpenedFile[]>>;
  saveSheet(request: SaveRequest): Promise<Answer<SavedSheet | null>>;
  exportText(request: ExportRequest): Promise<Answer<string | null>>;
  exportPdf(request: PdfRequest): Promise<Answer<string | null>>;
  /** Both return a function that stops listening. */
  onCommand(listener: (command: MenuCommand) => void): () => void;
  onOpenRequested(listener: (opened: Answer<OpenedSheet>) => void): () => void;
  setUnsaved(unsaved: boolean): void;
}

/** Names on the wire. */
export const channels = {
  openSheet: 'monobis:open-sheet',
  openExports: 'monobis:open-exports',
  saveSheet: 'monobis:save-sheet',
  exportText: 'monobis:export-text',
  exportPdf: 'monobis:export-pdf',
  setUnsaved: 'monobis:set-unsaved',
  command: 'monobis:command',
  openRequested: 'monobis:open-requested',
} as const;
