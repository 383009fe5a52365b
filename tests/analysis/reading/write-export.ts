import type { Quantity } from '../../../analysis/reading/reading.ts';

/**
 * Writes invented exports in many structures, so that tests know the truth of what they read.
 * Nothing here is taken from any program: a layout is a choice of each member of `ExportShape`.
 */
export interface ExportShape {
  readonly delimiter: 'comma' | 'semicolon' | 'tab' | 'space';
  readonly decimal: 'point' | 'comma';
  readonly lineEnd: '\n' | '\r\n' | '\r' | 'mixed';
  readonly encoding: WrittenEncoding;
  readonly order: 'ascending' | 'descending';
  readonly around: 'nothing' | 'header' | 'footer' | 'header and footer';
  readonly quantity: Quantity;
  readonly headings: 'one row' | 'quoted' | 'units row' | 'none';
  readonly language?: 'English' | 'German';
  readonly rows?: 'plain' | 'trailing delimiter' | 'blank lines between' | 'running number first';
  readonly lastLine?: 'closed' | 'open';
}

export type WrittenEncoding =
  | 'utf-8'
  | 'utf-8 with byte-order mark'
  | 'utf-16le'
  | 'utf-16le with byte-order mark'
  | 'utf-16be'
  | 'utf-16be with byte-order mark'
  | 'latin-1';

/** Cells as printed with a decimal point; `null` is a missing point. Wavelengths ascend. */
export interface PrintedSpectra {
  readonly wavelengths: readonly string[];
  readonly traces: readonly {
    readonly name: string;
    readonly values: readonly (string | null)[];
  }[];
}

/** What is printed for missing points, one after the other. */
const marks = ['OVER', '****', '--', 'inf', 'NaN', 'n/a', '>4.0', 'over range'] as const;

const signs = { comma: ',', semicolon: ';', tab: '\t', space: '  ' } as const;

/** A comma can be delimiter and decimal sign only where the cells are quoted. */
export function needsQuotedCells(shape: ExportShape): boolean {
  return shape.delimiter === 'comma' && shape.decimal === 'comma';
}

export function writeExport(spectra: PrintedSpectra, shape: ExportShape): Uint8Array {
  return encode(writeText(spectra, shape), shape.encoding);
}

export function writeText(spectra: PrintedSpectra, shape: ExportShape): string {
  const withHeader = shape.around.includes('header');
  const withFooter = shape.around.includes('footer');
  const lines = [
    ...(withHeader ? header(shape) : []),
    ...headings(spectra, shape),
    ...dataLines(spectra, shape),
    ...(withFooter ? footer(shape) : []),
  ];
  const ends = shape.lineEnd === 'mixed' ? ['\n', '\r\n', '\r'] : [shape.lineEnd];
  return lines
    .map((line, index) => {
      const isOpen = shape.lastLine === 'open' && index === lines.length - 1;
      return line + (isOpen ? '' : ends[index % ends.length]);
    })
    .join('');
}

function header(shape: ExportShape): string[] {
  const sign = signs[shape.delimiter];
  return [
    'Invented record for tests',
    'Date: 2026-12-01 14:22:10',
    `Scan speed${sign}600`,
    `Range${sign}200${sign}800`,
    `Opérateur: Zoé Größe`,
    `Slit width: ${shape.decimal === 'comma' ? '1,5' : '1.5'} nm`,
    '',
  ];
}

function footer(shape: ExportShape): string[] {
  const sign = signs[shape.delimiter];
  return ['', `Lamp change${sign}340`, `Lamp hours${sign}12${sign}17`, 'End of record'];
}

const words = {
  English: {
    axis: 'Wavelength (nm)',
    absorbance: 'Absorbance',
    'percent-transmittance': '%T',
    transmittance: 'Transmittance',
    'molar-absorptivity': 'ε (L mol-1 cm-1)',
  },
  German: {
    axis: 'Wellenlänge (nm)',
    absorbance: 'Extinktion',
    'percent-transmittance': 'Transmission (%)',
    transmittance: 'Transmissionsgrad',
    'molar-absorptivity': 'Molarer Extinktionskoeffizient (L/(mol cm))',
  },
} as const;

function headings({ traces }: PrintedSpectra, shape: ExportShape): string[] {
  if (shape.headings === 'none') return [];
  const word = words[shape.language ?? 'English'];
  // ε has no place in Latin-1.
  const quantity =
    shape.encoding === 'latin-1' && shape.quantity === 'molar-absorptivity'
      ? words.German['molar-absorptivity']
      : word[shape.quantity];
  const first = shape.rows === 'running number first' ? ['No.'] : [];
  const sign = signs[shape.delimiter];
  const line = (cells: readonly string[]) => [...first, ...cells].join(sign) + trailing(shape);
  if (shape.headings === 'units row') {
    const plain = word.axis.replace(' (nm)', '');
    return [
      line([plain, ...traces.map(({ name }) => name)]),
      [...first.map(() => '#'), 'nm', ...traces.map(() => quantity)].join(sign) + trailing(shape),
    ];
  }
  if (shape.headings === 'quoted') {
    const quoted = traces.map(({ name }) => `"${name}${signs[shape.delimiter]}""x"" ${quantity}"`);
    return [line([`"${word.axis}"`, ...quoted])];
  }
  return [line([word.axis, ...traces.map(({ name }) => `${name} ${quantity}`)])];
}

function trailing(shape: ExportShape): string {
  return shape.rows === 'trailing delimiter' ? signs[shape.delimiter] : '';
}

function dataLines({ wavelengths, traces }: PrintedSpectra, shape: ExportShape): string[] {
  const order = wavelengths.map((_, index) => index);
  if (shape.order === 'descending') order.reverse();
  let missing = 0;
  const cell = (printed: string | null) => {
    if (printed === null) {
      missing += 1;
      return marks[missing % marks.length] ?? '';
    }
    const text = shape.decimal === 'comma' ? printed.replace('.', ',') : printed;
    return needsQuotedCells(shape) ? `"${text}"` : text;
  };
  return order.flatMap((index, row) => {
    const cells = [wavelengths[index] ?? '', ...traces.map(({ values }) => values[index] ?? null)];
    const number = shape.rows === 'running number first' ? [String(row + 1)] : [];
    const line = [...number, ...cells.map(cell)].join(signs[shape.delimiter]) + trailing(shape);
    return shape.rows === 'blank lines between' ? [line, ''] : [line];
  });
}

/** Characters that Latin-1 has not become a question mark. */
export function encode(text: string, encoding: WrittenEncoding): Uint8Array {
  if (encoding === 'utf-8') return new TextEncoder().encode(text);
  if (encoding === 'utf-8 with byte-order mark') return new TextEncoder().encode(`\uFEFF${text}`);
  if (encoding === 'latin-1') {
    return Uint8Array.from(text, (letter) => {
      const code = letter.charCodeAt(0);
      return code > 0xff ? 0x3f : code;
    });
  }
  const marked = encoding.includes('mark') ? `\uFEFF${text}` : text;
  const bytes = new Uint8Array(2 * marked.length);
  const view = new DataView(bytes.buffer);
  const isLittle = encoding.startsWith('utf-16le');
  for (let i = 0; i < marked.length; i += 1) view.setUint16(2 * i, marked.charCodeAt(i), isLittle);
  return bytes;
}
