import { rowsOf, type Trace } from '../trace.ts';
import { utf8 } from './encodings.ts';

/**
 * Columns padded with spaces, decimal point, transmittance in percent to four decimals, one trace a
 * file, ascending, remarks behind a hash sign, plain ASCII, LF.
 */
export function spacedPercentTransmittance(trace: Trace, note: string): Uint8Array {
  const lines = [
    `# ${note}`,
    `# ${trace.label}`,
    '# cuvette 10 mm',
    `${'nm'.padStart(10)}${'%T'.padStart(14)}`,
    ...rowsOf([trace]).map(([nm, [value = Number.NaN]]) => {
      const percent = 100 * 10 ** -value;
      return `${nm.toFixed(2).padStart(10)}${percent.toFixed(4).padStart(14)}`;
    }),
  ];
  return utf8(`${lines.join('\n')}\n`);
}
