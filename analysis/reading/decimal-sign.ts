import { Refusal } from '../refusal.ts';
import { type DecimalSign, looksGrouped, numberKind } from './number-cell.ts';
import type { DataRow } from './table.ts';

export interface SettledDecimal {
  readonly decimal: DecimalSign;
  /**
   * `settled`: the numbers leave one reading. `open`: every number with a sign looks like "1,234",
   * which may also be a whole number with its thousands marked off; the quantity must decide.
   */
  readonly evidence: 'settled' | 'open';
  readonly assumptions: readonly string[];
}

interface Seen {
  /** The first cell of each kind, with its line; looks-grouped ones apart. */
  readonly first: Map<Sort, { readonly cell: string; readonly line: number }>;
  readonly counts: Map<Sort, number>;
}

type Sort =
  | 'point'
  | 'comma'
  | 'point-or-thousands'
  | 'comma-or-thousands'
  | 'grouped-by-comma'
  | 'grouped-by-point';

/**
 * Settles the decimal sign from all numbers of the table, never from one line.
 * Throws `Refusal` (`mixed-decimals`, `ambiguous-number`) where they do not agree.
 */
export function settleDecimalSign(rows: readonly DataRow[]): SettledDecimal {
  const seen = look(rows);
  const has = (sort: Sort) => seen.first.has(sort);
  const point = has('point') || has('grouped-by-comma');
  const comma = has('comma') || has('grouped-by-point');
  if (point && comma) throw mixed(seen);
  if (point) return oneSign(seen, 'point');
  if (comma) return oneSign(seen, 'comma');
  const openPoint = has('point-or-thousands');
  const openComma = has('comma-or-thousands');
  if (openPoint && openComma) throw ambiguousSigns(seen);
  if (openPoint) return { decimal: 'point', evidence: 'open', assumptions: [] };
  if (openComma) return { decimal: 'comma', evidence: 'open', assumptions: [] };
  return { decimal: 'point', evidence: 'settled', assumptions: [] };
}

function look(rows: readonly DataRow[]): Seen {
  const seen: Seen = { first: new Map(), counts: new Map() };
  // nearly all numbers of a file are of one sort: runs of it are counted beside the map
  let last: Sort | null = null;
  let run = 0;
  const count = () => {
    if (last !== null) seen.counts.set(last, (seen.counts.get(last) ?? 0) + run);
  };
  for (const { cells, line } of rows) {
    for (const cell of cells) {
      const kind = numberKind(cell);
      if (kind === 'none' || kind === 'integer') continue;
      const isOpen = (kind === 'point' || kind === 'comma') && looksGrouped(cell);
      const sort: Sort = isOpen ? `${kind}-or-thousands` : kind;
      if (sort !== last) {
        count();
        last = sort;
        run = 0;
        if (!seen.first.has(sort)) seen.first.set(sort, { cell, line });
      }
      run += 1;
    }
  }
  count();
  return seen;
}

function oneSign(seen: Seen, decimal: DecimalSign): SettledDecimal {
  const other = decimal === 'point' ? 'comma' : 'point';
  const grouped = seen.first.get(`grouped-by-${other}`);
  const stray = seen.first.get(`${other}-or-thousands`);
  // "1,234" beside "0.5" may be thousands or a slip; only a number such as "1,234.5" shows which.
  if (stray && !grouped) throw mixed(seen);
  const assumptions = grouped
    ? [
        `Thousands are marked off with a ${other} (line ${grouped.line}: "${grouped.cell}"); the decimal sign is the ${decimal}.`,
      ]
    : [];
  return { decimal, evidence: 'settled', assumptions };
}

const byPoint: readonly Sort[] = ['point', 'grouped-by-comma', 'point-or-thousands'];
const byComma: readonly Sort[] = ['comma', 'grouped-by-point', 'comma-or-thousands'];

function mixed(seen: Seen): Refusal {
  const count = (sorts: readonly Sort[]) =>
    sorts.reduce((sum, sort) => sum + (seen.counts.get(sort) ?? 0), 0);
  const [rare, usual] = count(byPoint) < count(byComma) ? [byPoint, byComma] : [byComma, byPoint];
  const odd = rare.map((sort) => seen.first.get(sort)).find(Boolean);
  const plain = usual.map((sort) => seen.first.get(sort)).find(Boolean);
  return new Refusal({
    code: 'mixed-decimals',
    message: `Some numbers have a decimal point and others a decimal comma ("${odd?.cell}" here, "${plain?.cell}" in line ${plain?.line}).`,
    where: odd ? { line: odd.line } : {},
    mend: 'Export again with one decimal sign throughout.',
  });
}

function ambiguousSigns(seen: Seen): Refusal {
  const comma = seen.first.get('comma-or-thousands');
  const point = seen.first.get('point-or-thousands');
  return ambiguousNumber(
    `"${comma?.cell}" and "${point?.cell}" stand side by side, and each may be a decimal number or thousands marked off.`,
    comma?.line,
  );
}

/** Code `ambiguous-number`: nothing in the file says whether "1,234" is about one or over a thousand. */
export function ambiguousNumber(message: string, line: number | undefined): Refusal {
  return new Refusal({
    code: 'ambiguous-number',
    message,
    where: line === undefined ? {} : { line },
    mend: 'Export with a decimal point, without thousands marks, or with more decimals.',
  });
}
