import { rowsOf, type Trace } from '../trace.ts';
import { utf8 } from './encodings.ts';

/**
 * Comma-delimited, decimal point, a head of `key: value` lines, one trace a file, ascending,
 * UTF-8, LF. Absorbance to five decimals.
 */
export function keyValueCommas(trace: Trace, note: string): Uint8Array {
  const lines = [
    `note: ${note}`,
    `sample: ${trace.label}`,
    'mode: absorbance',
    'path length: 10 mm',
    `points: ${trace.wavelengthNm.length}`,
    'wavelength (nm),absorbance',
    ...rowsOf([trace]).map(([nm, [value = Number.NaN]]) => `${nm.toFixed(1)},${value.toFixed(5)}`),
  ];
  return utf8(`${lines.join('\n')}\n`);
}
