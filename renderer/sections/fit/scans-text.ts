import type { Sheet } from '../../../analysis/index.ts';
import { sourceName } from '../source-name.ts';

type Group = NonNullable<Sheet['noiseScans']>[number];

/** "5 scans: blanks.csv", "1 scan (a blank): blank.csv, lamp", "3 scans: one.csv and 2 more files". */
export function scansText({ spectra }: Group): string {
  const count = spectra.length === 1 ? '1 scan' : `${spectra.length} scans`;
  const files = new Set(
    spectra.map(({ file, embedded }) => embedded?.source?.file ?? file ?? embedded?.name ?? ''),
  );
  const [first = ''] = files;
  const [only] = spectra;
  const name =
    spectra.length === 1
      ? sourceName(only?.embedded?.source?.file ?? only?.file, only?.embedded?.name ?? '')
      : sourceName(first, '');
  const rest = files.size - 1;
  const more = rest === 0 ? '' : ` and ${rest} more ${rest === 1 ? 'file' : 'files'}`;
  return `${count}: ${name}${more}`;
}
