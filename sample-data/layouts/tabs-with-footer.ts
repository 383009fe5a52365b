import { rowsOf, type Trace } from '../trace.ts';
import { utf16LittleEndian } from './encodings.ts';

/**
 * Tab-delimited, decimal point, several traces a file, ascending, a row of names above a row of
 * units, a foot with the settings, UTF-16 low byte first with its byte-order mark, CRLF.
 * Absorbance to five decimals.
 */
export function tabsWithFooter(traces: readonly Trace[], note: string): Uint8Array {
  const lines = [
    note,
    ['Wavelength', ...traces.map((trace) => trace.label)].join('\t'),
    ['nm', ...traces.map(() => 'Abs')].join('\t'),
    ...rowsOf(traces).map(([nm, values]) =>
      [nm.toFixed(2), ...values.map((value) => value.toFixed(5))].join('\t'),
    ),
    '',
    'Settings',
    'Spectral bandwidth\t1.5 nm',
    'Scan speed\t120 nm/min',
    'Lamp change\t340.0 nm',
    'Blank\tsolvent in the same cuvette',
  ];
  return utf16LittleEndian(`${lines.join('\r\n')}\r\n`);
}
