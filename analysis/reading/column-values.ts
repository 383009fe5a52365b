import { isMissingMark } from './missing-mark.ts';
import { cellValue, lengthAfterSign, numberKind } from './number-cell.ts';
import type { Table } from './table.ts';

export interface ColumnValues {
  /** NaN where the cell gives no value. */
  readonly y: Float64Array;
  readonly hasDecimalSign: boolean;
  /** How many cells gave no value, in which words, from which line on. */
  readonly assumptions: readonly string[];
}

interface Missing {
  count: number;
  readonly firstLine: number;
}

/** Values of one column; what is no number becomes a missing point and is told. */
export function readColumn(table: Table, column: number): ColumnValues {
  const y = new Float64Array(table.rows.length);
  const marks = new Map<string, Missing>();
  const others = new Map<string, Missing>();
  let hasDecimalSign = false;
  table.rows.forEach((row, index) => {
    const cell = row.cells[column] ?? '';
    const value = cellValue(cell, table.decimal);
    y[index] = value;
    if (Number.isNaN(value)) {
      const known = isMissingMark(cell) || numberKind(cell) !== 'none';
      count(known ? marks : others, cell, row.line);
    } else if (!hasDecimalSign) {
      hasDecimalSign = cell.includes('.') || cell.includes(',');
    }
  });
  return { y, hasDecimalSign, assumptions: [...missingNotes(marks), ...textNotes(others)] };
}

/** More wordings than this are counted together: a column of remarks must not fill the memory. */
const MOST_WORDINGS = 4;
/** No cell holds it: cells come from text without zero characters. */
const REST = '\u0000';

function count(wordings: Map<string, Missing>, cell: string, line: number): void {
  const key = wordings.has(cell) || wordings.size < MOST_WORDINGS ? cell : REST;
  const known = wordings.get(key);
  if (known) known.count += 1;
  else wordings.set(key, { count: 1, firstLine: line });
}

const points = (count: number) => (count === 1 ? '1 point' : `${count} points`);
const were = (count: number) => (count === 1 ? 'was' : 'were');

function wording(cell: string): string {
  if (cell === '') return 'left empty';
  return cell === REST ? 'marked in other ways' : `marked "${cell.slice(0, 40)}"`;
}

function missingNotes(marks: ReadonlyMap<string, Missing>): string[] {
  return [...marks].map(
    ([cell, { count, firstLine }]) =>
      `${points(count)} ${wording(cell)} (first in line ${firstLine}) ${were(count)} taken as missing.`,
  );
}

function textNotes(others: ReadonlyMap<string, Missing>): string[] {
  return [...others].map(([cell, { count, firstLine }]) => {
    const text = cell === REST ? 'other text' : `"${cell.slice(0, 40)}"`;
    return `${points(count)} with ${text} in place of a number (first in line ${firstLine}) ${were(count)} taken as missing.`;
  });
}

export interface CutShort {
  /** The last value is not to be trusted and must be taken as missing. */
  readonly isLost: boolean;
  readonly note: string;
}

/**
 * Whether the last number of a file without a last line end may have lost its last digits, as
 * happens when a file is copied while it is written: it has fewer decimals than all others.
 */
export function cutShortNote(table: Table, column: number): CutShort | null {
  const last = table.rows.at(-1);
  if (!table.lastRowIsOpen || !last || column !== lastSolidColumn(table)) return null;
  const cell = last.cells[column] ?? '';
  if (numberKind(cell) === 'none') return null;
  const others = table.rows
    .slice(0, -1)
    .map((row) => row.cells[column] ?? '')
    .filter((other) => numberKind(other) !== 'none');
  const decimals = others.map(lengthAfterSign);
  const [usual] = decimals;
  if (usual === undefined) return null;
  const isFixed = usual > 0 && decimals.every((length) => length === usual);
  if (isFixed && lengthAfterSign(cell) >= usual) return null;
  if (isFixed) {
    return {
      isLost: true,
      note: `Line ${last.line}, the last, has no line end and its last number ("${cell}") has fewer decimals than all others: the file seems to have been cut, and the point was taken as missing.`,
    };
  }
  const longest = others.reduce((most, other) => Math.max(most, other.length), 0);
  if (cell.length >= longest) return null;
  return {
    isLost: false,
    note: `Line ${last.line}, the last, has no line end: if the file was cut, its last number ("${cell}") may have lost digits.`,
  };
}

function lastSolidColumn(table: Table): number {
  return table.rows.reduce(
    (most, row) =>
      Math.max(
        most,
        row.cells.findLastIndex((cell) => cell !== ''),
      ),
    0,
  );
}
