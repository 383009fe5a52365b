import { cutShortNote, readColumn } from '../column-values.ts';
import { asideNamed, axisNamed } from '../column-words.ts';
import { quantityAround, quantityOfColumn } from '../quantity-of-column.ts';
import type { RefusedPart } from '../reading.ts';
import type { Table } from '../table.ts';
import { type Axis, findAxis, headingsOf } from './axis-column.ts';
import type { Layout, RawTrace, TracesFound } from './layout.ts';

/** One wavelength column, then one column for each trace; a running number may come first. */
export const oneAxisManyTraces: Layout = {
  name: 'one wavelength column, one or many traces',
  read,
};

function read(table: Table): TracesFound | null {
  const axis = findAxis(table);
  const traces: RawTrace[] = [];
  const refused: RefusedPart[] = [];
  const aside: string[] = [];
  const around = quantityAround(table);
  for (let column = 0; column < table.columns; column += 1) {
    if (column === axis.column) continue;
    const headings = headingsOf(table, column);
    const isEmpty = table.rows.every((row) => (row.cells[column] ?? '') === '');
    if (isEmpty && headings.length === 0) continue;
    const beside = besideTraces(axis, column, headings);
    if (beside) {
      aside.push(beside);
      continue;
    }
    const position = traces.length + refused.length;
    const number = position + 1;
    const name = traceName(headings, number);
    const what = `trace ${number}${headings.length > 0 ? ` ("${name}")` : ''}`;
    if (isEmpty) refused.push(emptyColumn(what));
    else traces.push(traceOf(table, axis, column, { what, name, position, headings, around }));
  }
  const withAside = traces.map((trace) => ({
    ...trace,
    assumptions: [...trace.assumptions, ...aside],
  }));
  return { traces: withAside, refused };
}

/** A sentence on why a column is no trace, or null where it is one. */
function besideTraces(axis: Axis, column: number, headings: readonly string[]): string | null {
  if (axis.indexColumn === column)
    return `Column ${column + 1} holds a running number and was left out.`;
  const kind = headings.map(asideNamed).find((found) => found !== null);
  if (!kind) {
    // What stands before the wavelengths (a cell's number, say) is no trace unless it says so.
    const isBefore = column < axis.column && quantityOfColumn(headings) === null;
    return isBefore
      ? `Column ${column + 1}${headings[0] ? ` ("${headings[0]}")` : ''} stands before the wavelengths, names no quantity and was left out.`
      : null;
  }
  const meaning = kind === 'index' ? 'a running number' : 'times or temperatures';
  return `Column ${column + 1} ("${headings[0]}") holds ${meaning} and was left out.`;
}

function emptyColumn(what: string): RefusedPart {
  const mend = 'Export the trace again if it should hold values.';
  return {
    what,
    why: `The column has a heading but no values. ${mend}`,
    line: null,
    code: 'no-values',
    mend,
  };
}

/** The uppermost heading that is more than a quantity or a unit; else the uppermost. */
function traceName(headings: readonly string[], number: number): string {
  const own = headings.find(
    (heading) => quantityOfColumn([heading]) === null && !axisNamed(heading),
  );
  return (own ?? headings[0] ?? `trace ${number}`).slice(0, 200);
}

interface TraceWords {
  readonly what: string;
  readonly name: string;
  readonly position: number;
  readonly headings: readonly string[];
  readonly around: ReturnType<typeof quantityAround>;
}

function traceOf(table: Table, axis: Axis, column: number, words: TraceWords): RawTrace {
  const { y, assumptions, hasDecimalSign } = readColumn(table, column);
  const cut = cutShortNote(table, column);
  if (cut?.isLost) y[y.length - 1] = Number.NaN;
  const own = quantityOfColumn(words.headings);
  const quantity = own ?? words.around?.quantity ?? null;
  const open = table.decimalEvidence === 'open' && hasDecimalSign && !axis.settlesDecimal;
  return {
    what: words.what,
    name: words.name,
    position: words.position,
    unit: axis.unit,
    x: axis.x,
    y,
    lines: axis.lines,
    quantity,
    decimal: open ? `open-${table.decimal}` : 'settled',
    assumptions: [
      ...table.assumptions,
      ...axis.assumptions,
      ...(own === null && words.around ? [words.around.assumption] : []),
      ...assumptions,
      ...(cut ? [cut.note] : []),
    ],
  };
}
