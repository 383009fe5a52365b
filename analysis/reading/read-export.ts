import { sha256 } from '@noble/hashes/sha2.js';
import { Refusal, type RefusalText } from '../refusal.ts';
import { decodeText } from './decode-text.ts';
import { findTable } from './find-table.ts';
import type { RawTrace, TracesFound } from './layouts/layout.ts';
import { layouts } from './layouts/registered.ts';
import { recogniseOtherText } from './not-an-export.ts';
import { recogniseBinary } from './not-text.ts';
import type { Quantity, Reading, ReadSpectrum, RefusedPart } from './reading.ts';
import { spectrumOfTrace } from './spectrum-of-trace.ts';
import { splitLines } from './split-lines.ts';
import type { Table } from './table.ts';
import { tooLargeReading } from './too-large.ts';

/** What is known of a file from outside it. */
export interface ReadOptions {
  /** The quantity of columns that the file does not name: what the sheet says it is. */
  readonly unnamedIs?: Quantity;
}

/**
 * Reads one export: bytes -> text -> lines -> table -> layout -> spectra. Never throws for what a
 * file holds: what cannot be used stands in `refused`, with line and mend. `file` is the name to
 * show; its extension is not looked at. `sha256` is of the bytes as they are; it is empty for a file
 * above `MAX_EXPORT_BYTES`, of which not one byte is looked at.
 */
export function readExport(bytes: Uint8Array, file: string, options: ReadOptions = {}): Reading {
  const refused = tooLargeReading(bytes.length, file);
  if (refused) return refused;
  const known = { file, sha256: hex(sha256(bytes)), encoding: '' };
  try {
    return readBytes(bytes, known, options);
  } catch (error) {
    if (error instanceof Refusal) return refusedWhole(known, error.toText());
    throw error;
  }
}

interface Known {
  readonly file: string;
  readonly sha256: string;
  encoding: string;
}

function readBytes(bytes: Uint8Array, known: Known, { unnamedIs }: ReadOptions): Reading {
  if (bytes.length === 0) return refusedWhole(known, emptyFile);
  const binary = recogniseBinary(bytes);
  if (binary) return refusedWhole(known, binary);
  const decoded = decodeText(bytes);
  known.encoding = decoded.encoding;
  const other = recogniseOtherText(decoded.text);
  if (other) return refusedWhole(known, other);
  const table = findTable(splitLines(decoded.text));
  const found = readLayout(table);
  const cut = decoded.endsInsideCharacter
    ? ['The file ends in the middle of a character: it seems to have been cut.']
    : [];
  const { spectra, refused } = spectraOf(found, cut, unnamedIs);
  const isRead = spectra.length > 0;
  return {
    format: 'monobis-reading',
    version: 1,
    ...known,
    delimiter: isRead ? table.delimiter : '',
    decimal: isRead ? table.decimal : '',
    spectra,
    refused,
  };
}

function readLayout(table: Table): TracesFound {
  for (const layout of layouts) {
    const found = layout.read(table);
    if (found) return found;
  }
  throw new Refusal({
    code: 'unknown-layout',
    message: 'The numbers in this file are not laid out in a way that is known here.',
    where: { line: table.rows[0]?.line ?? 1 },
    mend: 'Export with one wavelength column and one column for each trace.',
  });
}

function spectraOf(
  found: TracesFound,
  assumptions: readonly string[],
  unnamedIs: Quantity | undefined,
) {
  const spectra: ReadSpectrum[] = [];
  const refused: RefusedPart[] = [...found.refused];
  for (const trace of found.traces) {
    const outcome = trySpectrum(trace, unnamedIs);
    if (outcome instanceof Refusal) {
      const text = outcome.toText();
      // A fault of the shared axis is one fault, however many traces stand on it.
      if (!text.where?.what) return { spectra: [], refused: [refusedPart(text)] };
      refused.push(refusedPart(text));
    } else {
      spectra.push({ ...outcome, assumptions: [...outcome.assumptions, ...assumptions] });
    }
  }
  if (spectra.length === 0 && refused.length === 0) refused.push(refusedPart(noTraces));
  return { spectra, refused };
}

function trySpectrum(trace: RawTrace, unnamedIs: Quantity | undefined): ReadSpectrum | Refusal {
  try {
    return spectrumOfTrace(trace, unnamedIs);
  } catch (error) {
    if (error instanceof Refusal) return error;
    throw error;
  }
}

function refusedPart(text: RefusalText): RefusedPart {
  return {
    what: text.where?.what ?? 'the file',
    why: `${text.message} ${text.mend}`,
    line: text.where?.line ?? null,
    code: text.code,
    mend: text.mend,
  };
}

function refusedWhole(known: Known, text: RefusalText): Reading {
  return {
    format: 'monobis-reading',
    version: 1,
    ...known,
    delimiter: '',
    decimal: '',
    spectra: [],
    refused: [refusedPart(text)],
  };
}

const emptyFile: RefusalText = {
  code: 'empty-file',
  message: 'The file is empty: it has no bytes.',
  mend: 'Export the spectrum again; the copying may have failed.',
};

const noTraces: RefusalText = {
  code: 'no-traces',
  message: 'The file has a wavelength column, but no column of values beside it.',
  mend: 'Export the spectrum with its values beside the wavelengths.',
};

function hex(bytes: Uint8Array): string {
  return Array.from(bytes, (byte) => byte.toString(16).padStart(2, '0')).join('');
}
