import { Refusal } from '../refusal.ts';
import { MAX_COLUMNS } from './limits.ts';
import { isMissingMark } from './missing-mark.ts';
import { numberKind } from './number-cell.ts';
import { type Delimiter, splitCells } from './split-cells.ts';

/**
 * What the lines look like under one delimiter. `strong` lines are data: a number first, then
 * numbers or known marks of missing points. `weak` ones begin with a number but hold other text too.
 */
type LineShape = 'blank' | 'text' | 'strong' | 'weak';

export interface LineShapes {
  readonly delimiter: Delimiter;
  readonly shapes: readonly LineShape[];
  /** Number of cells of data lines, strong or weak; 0 for others. */
  readonly cells: Uint32Array;
  /** First number of data lines, roughly (for order only); NaN for others. */
  readonly leads: Float64Array;
  readonly strong: number;
}

const delimiterSigns = { comma: ',', semicolon: ';', tab: '\t' } as const;

/** Throws `Refusal` (`too-many-columns`). */
export function lineShapes(lines: readonly string[], delimiter: Delimiter): LineShapes {
  const shapes: LineShape[] = new Array<LineShape>(lines.length);
  const cells = new Uint32Array(lines.length);
  const leads = new Float64Array(lines.length).fill(Number.NaN);
  let strong = 0;
  for (let i = 0; i < lines.length; i += 1) {
    const line = lines[i] ?? '';
    const found = shapeOf(line, delimiter);
    if (found.cells > MAX_COLUMNS) throw tooManyColumns(i + 1, found.cells);
    shapes[i] = found.shape;
    cells[i] = found.cells;
    leads[i] = found.lead;
    if (found.shape === 'strong') strong += 1;
  }
  return { delimiter, shapes, cells, leads, strong };
}

function tooManyColumns(line: number, cells: number): Refusal {
  return new Refusal({
    code: 'too-many-columns',
    message: `This line has ${cells} columns; more than ${MAX_COLUMNS} are not read.`,
    where: { line },
    mend: 'Export fewer traces a file, one wavelength a line.',
  });
}

const text = { shape: 'text', cells: 0, lead: Number.NaN } as const;
const blank = { shape: 'blank', cells: 0, lead: Number.NaN } as const;

function shapeOf(
  line: string,
  delimiter: Delimiter,
): { shape: LineShape; cells: number; lead: number } {
  if (isBlank(line)) return blank;
  if (delimiter !== 'space' && !line.includes(delimiterSigns[delimiter])) return text;
  const parts = splitCells(line, delimiter);
  const first = parts.findIndex((cell) => cell !== '');
  const lead = parts[first] ?? '';
  if (parts.length < 2 || numberKind(lead) === 'none') return text;
  let solid = 0;
  let other = 0;
  for (let i = first + 1; i < parts.length; i += 1) {
    const cell = parts[i] ?? '';
    if (cell === '') continue;
    if (numberKind(cell) !== 'none' || isMissingMark(cell)) solid += 1;
    else other += 1;
  }
  const shape = solid > 0 && other === 0 ? 'strong' : 'weak';
  return { shape, cells: parts.length, lead: roughValue(lead) };
}

/** Lines of delimiters alone are blank too: spreadsheets write them for empty rows. */
function isBlank(line: string): boolean {
  for (let i = 0; i < line.length; i += 1) {
    const code = line.charCodeAt(i);
    const isSpace = code === 32 || (code >= 9 && code <= 13) || code === 0xa0 || code === 0xfeff;
    if (!isSpace && code !== 44 && code !== 59) return false;
  }
  return true;
}

/** The decimal sign is not settled yet; as a measure of order either reading does. */
function roughValue(cell: string): number {
  const direct = Number(cell);
  if (!Number.isNaN(direct)) return direct;
  return Number(
    cell
      .replace(/[\u2212\u2013]/g, '-')
      .replace(/[dD]/, 'e')
      .replace(',', '.'),
  );
}
