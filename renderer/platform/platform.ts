import type { ExportKind, MenuCommand, OpenedFile } from '../../main/desktop/channels.ts';

/** A sheet as it was opened, with the exports that came along. */
export interface SheetSource {
  readonly name: string;
  readonly text: string;
  /** Where saving goes without asking; null if it must ask. The platform's own. */
  readonly handle: unknown;
  /** Exports that the sheet names and that were found; `name` as the sheet has it. */
  readonly files: readonly OpenedFile[];
  readonly missing: readonly { readonly path: string; readonly why: string }[];
}

/**
 * What the page needs of the world outside it: the desktop shell or a browser. Every null means that
 * the user chose nothing; a `Refusal` is thrown where something can be mended.
 */
export interface Platform {
  readonly kind: 'desktop' | 'browser';
  openSheet(): Promise<SheetSource | null>;
  openExports(): Promise<readonly OpenedFile[]>;
  /** Saves whole or not at all. Resolves to the new name and handle. */
  saveSheet(
    text: string,
    handle: unknown,
    suggestedName: string,
  ): Promise<{ readonly name: string; readonly handle: unknown } | null>;
  exportText(text: string, suggestedName: string, kind: ExportKind): Promise<string | null>;
  /** The report as PDF; in a browser through its print dialog. */
  exportPdf(html: string, suggestedName: string): Promise<string | null>;
  onCommand(listener: (command: MenuCommand) => void): void;
  onOpenRequested(listener: (source: SheetSource) => void, refused: (error: unknown) => void): void;
  setUnsaved(unsaved: boolean): void;
}
