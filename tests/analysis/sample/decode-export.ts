/**
 * A plain reading of the sample's exports, written for these tests alone: it knows each layout in
 * advance and shares nothing with analysis/reading, so that neither can excuse the other.
 */
export interface DecodedTrace {
  readonly wavelengthNm: readonly number[];
  /** Absorbance as printed; NaN where the file marks over range. */
  readonly absorbance: readonly number[];
}

interface Layout {
  readonly encoding: string;
  readonly delimiter: RegExp;
  readonly decimal: '.' | ',';
  readonly quantity: 'absorbance' | 'percent-transmittance';
}

const layouts: readonly (readonly [RegExp, Layout])[] = [
  [/standards\/mono-/, { encoding: 'utf-8', delimiter: /,/, decimal: '.', quantity: 'absorbance' }],
  [
    /standards\/hydrolysis/,
    { encoding: 'utf-8', delimiter: /,/, decimal: '.', quantity: 'absorbance' },
  ],
  [
    /standards\/arm-/,
    { encoding: 'utf-8', delimiter: / +/, decimal: '.', quantity: 'percent-transmittance' },
  ],
  [
    /standards\/bis|crude\/arm-into-core/,
    { encoding: 'latin1', delimiter: /;/, decimal: ',', quantity: 'absorbance' },
  ],
  [
    /crude\/core-into-arm/,
    { encoding: 'utf-16le', delimiter: /\t/, decimal: '.', quantity: 'absorbance' },
  ],
];

/** Text of a file, without its byte-order mark. */
export function textOf(path: string, bytes: Uint8Array): string {
  return new TextDecoder(layoutOf(path).encoding).decode(bytes);
}

/** All traces of a file, ascending in wavelength. Rows are the lines whose first cell is a number. */
export function decodeExport(path: string, bytes: Uint8Array): readonly DecodedTrace[] {
  const { delimiter, decimal, quantity } = layoutOf(path);
  const number = (cell: string): number =>
    cell === 'OVER' ? Number.NaN : Number(cell.replace(decimal, '.'));
  const rows = textOf(path, bytes)
    .split(/\r?\n/)
    .map((line) => line.trim().split(delimiter))
    .filter((cells) => /^\d+[.,]\d+$/.test(cells[0] ?? ''))
    .map((cells) => cells.map(number))
    .sort((a, b) => (a[0] ?? 0) - (b[0] ?? 0));
  const absorbance = (value: number): number =>
    quantity === 'absorbance' ? value : -Math.log10(value / 100);
  const traces = (rows[0]?.length ?? 1) - 1;
  return Array.from({ length: traces }, (_, trace) => ({
    wavelengthNm: rows.map((row) => row[0] ?? Number.NaN),
    absorbance: rows.map((row) => absorbance(row[trace + 1] ?? Number.NaN)),
  }));
}

function layoutOf(path: string): Layout {
  const found = layouts.find(([pattern]) => pattern.test(path));
  if (found === undefined) throw new Error(`no layout is known for ${path}`);
  return found[1];
}
