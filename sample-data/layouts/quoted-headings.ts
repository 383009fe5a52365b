import { rowsOf, type Trace } from '../trace.ts';
import { utf8WithByteOrderMark } from './encodings.ts';

/**
 * Comma-delimited, decimal point, headings in quotation marks that hold commas themselves, several
 * traces a file, ascending, UTF-8 with its byte-order mark, CRLF. Absorbance to five decimals.
 */
export function quotedHeadings(traces: readonly Trace[], note: string): Uint8Array {
  const lines = [
    quoted(note),
    ['Wavelength, nm', ...traces.map((trace) => `Absorbance, ${trace.label}`)]
      .map(quoted)
      .join(','),
    ...rowsOf(traces).map(([nm, values]) =>
      [nm.toFixed(1), ...values.map((value) => value.toFixed(5))].join(','),
    ),
  ];
  return utf8WithByteOrderMark(`${lines.join('\r\n')}\r\n`);
}

function quoted(text: string): string {
  return `"${text.replaceAll('"', '""')}"`;
}
