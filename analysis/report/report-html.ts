import type { SheetSource } from '../reading/sheet-sources.ts';
import type { Sheet } from '../sheet/schema.ts';
import type { Quantification } from '../split/results.ts';

export interface ReportOptions {
  /** ISO date and time, given by the caller: the one thing that differs between two reports of one sheet. */
  readonly madeOn: string;
  readonly program: string;
  readonly warnings?: readonly string[];
  readonly sources: readonly SheetSource[];
}

export function reportHtml(
  sheet: Sheet,
  { results }: Quantification,
  options: ReportOptions,
): string {
  return `${sheet.title} ${results.program} ${options.madeOn}`;
}
