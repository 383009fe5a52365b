import { Refusal } from '../refusal.ts';
import { findDataBlock } from './data-block.ts';
import { settleDecimalSign } from './decimal-sign.ts';
import { findHeadings, type Headings } from './headings.ts';
import { numberKind } from './number-cell.ts';
import { splitCells } from './split-cells.ts';
import type { Lines } from './split-lines.ts';
import type { DataRow, Table, TextLine } from './table.ts';

/**
 * Lines to a table: where the data stand, their headings, delimiter and decimal sign. Throws
 * `Refusal` where the lines hold no table or one that may be read in more than one way.
 */
export function findTable(lines: Lines): Table {
  const block = findDataBlock(lines);
  const headings = findHeadings(lines.lines, block);
  const rows = block.rows.map((index) => ({
    line: index + 1,
    cells: splitCells(lines.lines[index] ?? '', block.delimiter),
  }));
  const settled = settleDecimalSign(rows);
  // A decimal comma found under a delimiting comma stood in quotes, which keeps the two apart.
  if (block.delimiter === 'comma' && settled.decimal === 'point')
    refuseCommaForBoth(rows, headings);
  const lastRow = block.rows.at(-1) ?? 0;
  const surroundings = linesAround(lines.lines, headings.from, lastRow);
  return {
    delimiter: block.delimiter,
    decimal: settled.decimal,
    decimalEvidence: settled.evidence,
    columns: block.cells,
    rows,
    headings: headings.rows,
    looseHeading: headings.loose,
    surroundings,
    lastRowIsOpen: lines.lastIsOpen && lastRow === lines.lines.length - 1,
    assumptions: [
      ...block.assumptions,
      ...settled.assumptions,
      ...leftOut(surroundings, (block.rows[0] ?? 0) + 1),
    ],
  };
}

function linesAround(lines: readonly string[], from: number, lastRow: number): TextLine[] {
  const around: TextLine[] = [];
  lines.forEach((text, index) => {
    if ((index < from || index > lastRow) && /[^\s,;]/.test(text))
      around.push({ line: index + 1, text });
  });
  return around;
}

/** So that nothing is left out in silence: where the lines are that were not read. */
function leftOut(surroundings: readonly TextLine[], firstDataLine: number): string[] {
  const before = surroundings.filter(({ line }) => line < firstDataLine);
  const after = surroundings.filter(({ line }) => line > firstDataLine);
  const notes: string[] = [];
  if (before.length > 0) notes.push(`${span(before)} before the data taken as a header.`);
  if (after.length > 0) notes.push(`${span(after)} after the data taken as a footer.`);
  return notes;
}

function span(lines: readonly TextLine[]): string {
  const first = lines[0]?.line ?? 0;
  const last = lines.at(-1)?.line ?? 0;
  if (first !== last) return `Lines ${first} to ${last}`;
  return `Line ${first} ("${(lines[0]?.text ?? '').trim().slice(0, 60)}")`;
}

/**
 * "400,0,123" under commas is three whole numbers, or 400 and 0.123 with a comma for both. Only
 * decimal points or headings for all columns show that the comma is a delimiter alone.
 */
function refuseCommaForBoth(rows: readonly DataRow[], headings: Headings): void {
  const isNumberWithPoint = (cell: string) => cell.includes('.') && numberKind(cell) !== 'none';
  const used = usedCells(rows);
  const named = Math.max(0, ...headings.rows.map((row) => lastSolid(row.cells)));
  const pointInValues = rows.some((row) => row.cells.slice(1).some(isNumberWithPoint));
  if (pointInValues) return;
  if (used === 2 && rows.some((row) => isNumberWithPoint(row.cells[0] ?? ''))) return;
  if (named >= used && !rows.some(hasPaddedZeros)) return;
  throw new Refusal({
    code: 'comma-for-both',
    message:
      'The comma may stand both between the columns and inside the numbers, so that they cannot be told apart.',
    where: { line: rows[0]?.line ?? 1 },
    mend: 'Export with semicolons or tabs between the columns, or with a decimal point.',
  });
}

const lastSolid = (cells: readonly string[]) => cells.findLastIndex((cell) => cell !== '') + 1;

const usedCells = (rows: readonly DataRow[]) =>
  rows.reduce((most, row) => Math.max(most, lastSolid(row.cells)), 0);

const hasPaddedZeros = (row: DataRow) => row.cells.some((cell) => /^0\d/.test(cell));
