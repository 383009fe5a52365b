import type { Sheet, SheetSpectrum } from '../sheet/schema.ts';
import type { Reading } from './reading.ts';
import { traceOf } from './trace-of.ts';

/** Where a spectrum of the sheet came from, down to the bytes. */
export interface SheetSource {
  readonly file: string;
  /** Empty where the sheet does not say. */
  readonly sha256: string;
  /** What it is in the sheet: "standard S1, aliquot a2". */
  readonly what: string;
  /** What the file left open and how it was read. */
  readonly decisions: readonly string[];
}

/** Every file behind the sheet once, in the order of the sheet, embedded ones included. */
export function sheetSources(
  sheet: Sheet,
  readings: ReadonlyMap<string, Reading>,
): readonly SheetSource[] {
  const found = new Map<string, SheetSource>();
  const owners = [
    ...(sheet.standards ?? []).map((entry) => ({ ...entry, what: `standard ${entry.id}` })),
    ...(sheet.aliquots ?? []).map((entry) => ({ ...entry, what: `aliquot ${entry.id}` })),
    ...(sheet.noiseScans ?? []).flatMap(({ id, spectra }) =>
      spectra.map((spectrum) => ({ spectrum, what: `noise scans ${id}` })),
    ),
  ];
  for (const { spectrum, what } of owners) {
    const source = sourceOf(spectrum, readings);
    const key = `${source.file}\n${source.sha256}`;
    const before = found.get(key);
    found.set(key, {
      file: source.file,
      sha256: source.sha256,
      // many scans of a group may stand in one file
      what: before && !before.what.endsWith(what) ? `${before.what}, ${what}` : what,
      decisions: [...new Set([...(before?.decisions ?? []), ...source.decisions])],
    });
  }
  return [...found.values()];
}

function sourceOf(
  spectrum: SheetSpectrum,
  readings: ReadonlyMap<string, Reading>,
): Pick<SheetSource, 'file' | 'sha256' | 'decisions'> {
  const { embedded, file = '', trace = 0 } = spectrum;
  if (embedded) {
    return {
      file: embedded.source?.file ?? `${embedded.name} (embedded)`,
      sha256: embedded.source?.sha256 ?? '',
      decisions: embedded.assumptions ?? [],
    };
  }
  const reading = readings.get(file);
  return {
    file,
    sha256: reading?.sha256 ?? '',
    decisions: (reading && traceOf(reading, trace))?.assumptions ?? [],
  };
}
