import type { Sheet } from '../analysis/index.ts';
import { sampleExports } from './exports.ts';
import { drawAliquots, drawStandards } from './recording.ts';
import type { Trace } from './trace.ts';
import { type Truth, truthOf } from './truth.ts';
import { workingSheet } from './working-sheet.ts';

/**
 * The INVENTED scenario: a double aromatic substitution on piperazine, run in two orders of
 * addition. Names and molar masses are of ordinary chemicals; every spectrum is made up.
 */
export interface Sample {
  /** Bytes of every spectrum file, by its path relative to the sheet. */
  readonly files: ReadonlyMap<string, Uint8Array>;
  /** The traces in those files before they were rounded for print, in the files' order. */
  readonly drawn: ReadonlyMap<string, readonly Trace[]>;
  readonly sheet: Sheet;
  readonly truth: Truth;
}

/**
 * One draw of all errors (stocks, dilutions, blank levels, noise) from the stated uncertainties.
 * Compositions and the sheet are the same for every seed; files and truth are not.
 *
 * @param seed a whole number from 0 to 2³² - 1; the same seed gives the same bytes.
 */
export function makeSample(seed: number): Sample {
  const standards = drawStandards(seed);
  const aliquots = drawAliquots(seed);
  const traces = new Map([...standards, ...aliquots].map(({ trace }) => [trace.id, trace]));
  const files = new Map<string, Uint8Array>();
  const drawn = new Map<string, readonly Trace[]>();
  for (const { path, traces: ids, write } of sampleExports) {
    const held = ids.flatMap((id) => traces.get(id) ?? []);
    drawn.set(path, held);
    files.set(path, write(held));
  }
  return { files, drawn, sheet: workingSheet(), truth: truthOf(seed, standards, aliquots) };
}

/** The sheet as the text of its file. */
export function sheetFile(sample: Sample): string {
  return `${JSON.stringify(sample.sheet, null, 2)}\n`;
}

/** The truth as the text of its file: twelve figures, so that no platform's last bit shows. */
export function truthFile(sample: Sample): string {
  const twelveFigures = (_key: string, value: unknown): unknown =>
    typeof value === 'number' ? Number(value.toPrecision(12)) : value;
  return `${JSON.stringify(sample.truth, twelveFigures, 2)}\n`;
}
