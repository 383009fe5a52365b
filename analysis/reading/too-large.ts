import type { RefusalText } from '../refusal.ts';
import { MAX_EXPORT_BYTES } from './limits.ts';
import type { Reading } from './reading.ts';

/** Why a file of this size is not read, or null if it is. */
function tooLarge(bytes: number): RefusalText | null {
  if (bytes <= MAX_EXPORT_BYTES) return null;
  const mebibytes = (size: number) => Math.round(size / 1024 / 1024);
  return {
    code: 'too-large',
    message: `The file has ${mebibytes(bytes)} MiB; more than ${mebibytes(MAX_EXPORT_BYTES)} MiB are not read.`,
    mend: 'Export fewer spectra a file, or split the file.',
  };
}

/** The reading of a file that is refused by its size alone, before a byte of it is in memory; else null. */
export function tooLargeReading(bytes: number, file: string): Reading | null {
  const text = tooLarge(bytes);
  if (!text) return null;
  const { code, message, mend } = text;
  return {
    format: 'monobis-reading',
    version: 1,
    file,
    sha256: '',
    encoding: '',
    delimiter: '',
    decimal: '',
    spectra: [],
    refused: [{ what: 'the file', why: `${message} ${mend}`, line: null, code, mend }],
  };
}
