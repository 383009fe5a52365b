import { Refusal } from '../../refusal.ts';
import { gapNote } from '../axis-gaps.ts';
import { type AxisUnit, asideNamed, axisNamed, otherAxisIn } from '../column-words.ts';
import { ambiguousNumber } from '../decimal-sign.ts';
import { cellValue, numberKind } from '../number-cell.ts';
import { quantityOfColumn } from '../quantity-of-column.ts';
import type { Table } from '../table.ts';
import { isPlausibleNm } from '../wavelength.ts';

/** The column of wavelengths (or of what they are computed from). */
export interface Axis {
  readonly column: number;
  readonly unit: AxisUnit;
  /** Values in the file's unit and order, all finite. */
  readonly x: Float64Array;
  readonly lines: Uint32Array;
  /** A running number that stands before it, if any. */
  readonly indexColumn: number | null;
  /** The wavelengths make sense with one decimal sign only, which settles it for the values. */
  readonly settlesDecimal: boolean;
  readonly assumptions: readonly string[];
}

/** Headings of a column from top to bottom, empty ones left out. */
export function headingsOf(table: Table, column: number): readonly string[] {
  return table.headings.map((row) => row.cells[column] ?? '').filter((cell) => cell !== '');
}

/**
 * Finds the wavelengths: by heading, else the first column, or the second where the first is a
 * running number. Throws `Refusal` (`several-axes`, `axis-unit`, `axis-gap`, `ambiguous-number`,
 * `wavelengths-across`).
 */
export function findAxis(table: Table): Axis {
  const named = namedAxes(table);
  if (named.length > 1) throw severalAxes(named);
  const chosen = named[0] ?? unnamedAxis(table);
  const { column } = chosen;
  const x = axisValues(table, column);
  const unit = unitOf(table, column, named.length > 0);
  const settlesDecimal = checkDecimal(table, column, x, unit.unit);
  refuseSecondAxis(table, column, x);
  if (named.length === 0) refuseWavelengthsAcross(table, column);
  const gaps = gapNote(x, unit.unit);
  return {
    column,
    x,
    lines: Uint32Array.from(table.rows, (row) => row.line),
    indexColumn: chosen.indexColumn,
    settlesDecimal,
    unit: unit.unit,
    assumptions: [...unit.assumptions, ...(gaps ? [gaps] : [])],
  };
}

interface Chosen {
  readonly column: number;
  readonly indexColumn: number | null;
}

function namedAxes(table: Table): readonly Chosen[] {
  const axes: Chosen[] = [];
  for (let column = 0; column < table.columns; column += 1) {
    if (headingsOf(table, column).some((heading) => axisNamed(heading) !== null)) {
      axes.push({ column, indexColumn: null });
    }
  }
  const [only] = axes;
  if (axes.length !== 1 || only?.column !== 1) return axes;
  // A running number before a named axis needs no heading to be known for what it is.
  return [{ column: 1, indexColumn: isRunningNumber(table, 0) ? 0 : null }];
}

function unnamedAxis(table: Table): Chosen {
  const first = solidColumn(table, 0);
  const isIndex =
    headingsOf(table, first).some((heading) => asideNamed(heading) === 'index') ||
    isRunningNumber(table, first);
  const second = solidColumn(table, first + 1);
  const secondRuns = second < table.columns && runsAsWavelengths(columnValues(table, second));
  if (isIndex && secondRuns) return { column: second, indexColumn: first };
  return { column: first, indexColumn: null };
}

function solidColumn(table: Table, from: number): number {
  let column = from;
  while (column < table.columns && table.rows.every((row) => (row.cells[column] ?? '') === ''))
    column += 1;
  return column;
}

const columnValues = (table: Table, column: number) =>
  Float64Array.from(table.rows, (row) => cellValue(row.cells[column] ?? '', table.decimal));

/** 0, 1, 2 … or 1, 2, 3 … */
function isRunningNumber(table: Table, column: number): boolean {
  const values = columnValues(table, column);
  const [start] = values;
  return (start === 0 || start === 1) && values.every((value, index) => value === start + index);
}

function runsAsWavelengths(values: Float64Array): boolean {
  if (values.length < 2 || !values.every(isPlausibleNm)) return false;
  const direction = Math.sign((values[1] ?? 0) - (values[0] ?? 0));
  return (
    direction !== 0 &&
    values.every((value, i) => i === 0 || (value - (values[i - 1] ?? 0)) * direction > 0)
  );
}

function axisValues(table: Table, column: number): Float64Array {
  const x = columnValues(table, column);
  const gap = x.findIndex(Number.isNaN);
  if (gap === -1) return x;
  const row = table.rows[gap];
  const cell = row?.cells[column] ?? '';
  throw new Refusal({
    code: 'axis-gap',
    message:
      cell === '' ? 'This line has no wavelength.' : `The wavelength "${cell}" cannot be read.`,
    where: row ? { line: row.line } : {},
    mend: 'Export again, or mend or remove this line.',
  });
}

function unitOf(table: Table, column: number, isNamed: boolean) {
  const words = [
    ...headingsOf(table, column),
    ...(table.looseHeading ? [table.looseHeading.text] : []),
  ]
    .map(axisNamed)
    .filter((word) => word !== null);
  // The nearest heading is the units row, if there is one.
  const given = words.findLast((word) => word.unit !== null)?.unit ?? null;
  if (given === 'unknown') {
    throw axisUnit('The heading of the wavelengths names a unit that is not known here.', table);
  }
  if (given) return { unit: given, assumptions: [] };
  const other = otherAxisIn(table.surroundings.map(({ text }) => text));
  if (other) {
    throw axisUnit(
      `No heading names the unit of the first numbers, and "${other.slice(0, 80)}" in the header may mean that they are no nanometres.`,
      table,
    );
  }
  const hasWord = isNamed || words.length > 0;
  const assumption = hasWord
    ? 'The heading of the wavelengths gives no unit; they were read as nm.'
    : `No heading names the wavelengths; column ${column + 1} was read as wavelengths in nm.`;
  return { unit: 'nm' as const, assumptions: [assumption] };
}

function axisUnit(message: string, table: Table): Refusal {
  const line = table.headings.at(-1)?.line ?? table.rows[0]?.line ?? 1;
  return new Refusal({
    code: 'axis-unit',
    message,
    where: { line },
    mend: 'Export with wavelengths in nm, or name the unit (nm, µm, cm-1, eV) in the heading.',
  });
}

/** True where the wavelengths leave one decimal sign; throws where they, too, have two readings. */
function checkDecimal(table: Table, column: number, x: Float64Array, unit: AxisUnit): boolean {
  if (table.decimalEvidence === 'settled') return true;
  const isDecimal = (cell: string) => numberKind(cell) === table.decimal;
  const row = table.rows.find(({ cells }) => isDecimal(cells[column] ?? ''));
  if (!row) return false;
  if (unit === 'nm' && x.every(isPlausibleNm)) return true;
  throw ambiguousNumber(
    `"${row.cells[column]}" may be a decimal number or have its thousands marked off, and nothing else in the file says which.`,
    row.line,
  );
}

function severalAxes(named: readonly Chosen[]): Refusal {
  const columns = named.map(({ column }) => column + 1);
  return new Refusal({
    code: 'several-axes',
    message: `More than one column is headed as wavelengths (columns ${columns.slice(0, 6).join(', ')}${columns.length > 6 ? ' …' : ''}).`,
    mend: 'Export one spectrum a file, or all traces on one wavelength column.',
  });
}

/** A second column that runs as wavelengths do belongs to traces of its own: not to be read past. */
function refuseSecondAxis(table: Table, axisColumn: number, x: Float64Array): void {
  for (let column = 0; column < table.columns; column += 1) {
    if (column === axisColumn || quantityOfColumn(headingsOf(table, column)) !== null) continue;
    if (headingsOf(table, column).some((heading) => asideNamed(heading) !== null)) continue;
    const first = cellValue(table.rows[0]?.cells[column] ?? '', table.decimal);
    if (!isPlausibleNm(first)) continue;
    const solid = columnValues(table, column).filter((value) => !Number.isNaN(value));
    if (solid.length < 2 || solid.length < x.length / 20 || !runsAsWavelengths(solid)) continue;
    throw severalColumnsRun(axisColumn, column, table);
  }
}

function severalColumnsRun(axisColumn: number, column: number, table: Table): Refusal {
  const line = table.rows[0]?.line;
  return new Refusal({
    code: 'several-axes',
    message: `Columns ${axisColumn + 1} and ${column + 1} both run like wavelengths.`,
    where: line === undefined ? {} : { line },
    mend: 'Export one spectrum a file, or name the wavelength column and the quantity of the others in the heading.',
  });
}

/** Headings that are wavelengths themselves: each row is a spectrum then, and no column is. */
function refuseWavelengthsAcross(table: Table, axisColumn: number): void {
  const line = table.headings.find(({ cells }) => {
    const numbers = cells
      .filter((cell, column) => column !== axisColumn && cell !== '')
      .map((cell) => cellValue(cell.replace(/\s?nm$/i, ''), table.decimal));
    return numbers.length >= 3 && runsAsWavelengths(Float64Array.from(numbers));
  })?.line;
  if (line === undefined) return;
  throw new Refusal({
    code: 'wavelengths-across',
    message: 'The wavelengths seem to stand across the table, one spectrum a row.',
    where: { line },
    mend: 'Export with the wavelengths down one column.',
  });
}
