import { asideNamed, axisNamed } from './column-words.ts';
import type { DataBlock } from './data-block.ts';
import { quantityNamed } from './quantity-words.ts';
import { type Delimiter, splitCells } from './split-cells.ts';
import type { DataRow, TextLine } from './table.ts';

export interface Headings {
  readonly rows: readonly DataRow[];
  readonly loose: TextLine | null;
  /** Index of the first heading line; that of the first data line where there is none. */
  readonly from: number;
  readonly assumptions: readonly string[];
}

/** Names, quantities and units may each have a line of their own. */
const MOST_HEADING_LINES = 3;

/**
 * Headings of a block: lines right above it (blank lines apart) that divide into its columns and
 * name an axis, a quantity or, from three columns on, at least as many things as there are columns.
 */
export function findHeadings(lines: readonly string[], block: DataBlock): Headings {
  const first = block.rows[0] ?? 0;
  const rows: DataRow[] = [];
  let loose: TextLine | null = null;
  let at = lineAbove(lines, first);
  let from = first;
  while (at >= 0 && rows.length < MOST_HEADING_LINES) {
    const text = lines[at] ?? '';
    const cells = headingCells(text, block);
    const fits = cells !== null && isHeading(cells, block.cells, rows.length > 0);
    if (fits) rows.unshift({ line: at + 1, cells: padded(cells, block.cells) });
    else if (rows.length === 0 && namesSomething(text)) loose = { line: at + 1, text };
    if (!fits && loose === null) break;
    from = at;
    if (loose) break;
    // Only blank lines right above the data are skipped: a header block further up is no heading.
    at -= 1;
  }
  return { rows, loose, from, assumptions: [] };
}

function lineAbove(lines: readonly string[], first: number): number {
  let at = first - 1;
  while (at >= 0 && (lines[at] ?? '').trim() === '') at -= 1;
  return at;
}

const padded = (cells: readonly string[], columns: number): readonly string[] =>
  cells.length >= columns
    ? cells.slice(0, columns)
    : [...cells, ...new Array<string>(columns - cells.length).fill('')];

/** Null where the line does not divide into at least two and at most as many cells as the data. */
function headingCells(text: string, block: DataBlock): readonly string[] | null {
  for (const cells of divisions(text, block)) {
    const count = cells.findLastIndex((cell) => cell !== '') + 1;
    if (count >= 2 && count <= block.cells) return cells.slice(0, count);
  }
  return null;
}

const otherDelimiters: readonly Delimiter[] = ['tab', 'semicolon', 'comma'];

function* divisions(text: string, { delimiter, cells }: DataBlock): Generator<readonly string[]> {
  if (delimiter !== 'space') {
    const own = splitCells(text, delimiter);
    yield own;
    if (own.filter(Boolean).length > 1) return;
  }
  // A heading may be set with another delimiter than its data, but then it must fit exactly.
  const attempts = [
    ...(text.includes('"') ? [splitCells(text, 'space')] : []),
    ...otherDelimiters.map((other) => splitCells(text, other)),
    text.trim().split(/ {2,}|\t+/),
    text.trim().split(/\s+/),
    unitsJoined(text.trim().split(/\s+/)),
  ];
  for (const attempt of attempts) if (attempt.length === cells) yield attempt;
}

/** "Wavelength (nm) Abs" -> "Wavelength (nm)", "Abs". */
function unitsJoined(words: readonly string[]): readonly string[] {
  const joined: string[] = [];
  for (const word of words) {
    const last = joined.at(-1);
    if (last !== undefined && /^(?:[([/]|%$)/.test(word))
      joined[joined.length - 1] = `${last} ${word}`;
    else joined.push(word);
  }
  return joined;
}

function isHeading(cells: readonly string[], columns: number, hasRowBelow: boolean): boolean {
  if (cells.some((cell) => cell.endsWith(':'))) return false;
  const first = cells[0] ?? '';
  const namesColumn = axisNamed(first) !== null || asideNamed(first) === 'index' || first === '';
  if (hasRowBelow) return namesColumn || (columns > 2 && cells.length === columns);
  const namesAny =
    cells.some((cell) => axisNamed(cell) !== null) ||
    cells.slice(1).some((cell) => quantityNamed(cell) !== null);
  return namesAny || first === '' || (columns > 2 && cells.length === columns);
}

function namesSomething(text: string): boolean {
  return text.length < 1000 && axisNamed(text) !== null;
}
