import { Refusal } from '../refusal.ts';
import { MAX_COLUMNS } from './limits.ts';

export type Delimiter = 'comma' | 'semicolon' | 'tab' | 'space';

const signs = { comma: ',', semicolon: ';', tab: '\t' } as const;

/**
 * Cells of one line, trimmed, quotes taken off (a doubled quote inside stands for one). `space`
 * means any run of spaces and tabs; words joined by a single space stay one cell ("over range").
 * Throws `Refusal` (`too-many-columns`).
 */
export function splitCells(line: string, delimiter: Delimiter): readonly string[] {
  const cells = split(line, delimiter);
  if (cells.length > MAX_COLUMNS) {
    throw new Refusal({
      code: 'too-many-columns',
      message: `A line has more than ${MAX_COLUMNS} columns.`,
      mend: 'Export fewer traces a file, one wavelength a line.',
    });
  }
  return cells;
}

function split(line: string, delimiter: Delimiter): readonly string[] {
  if (delimiter === 'space') return splitAtSpaces(line);
  const sign = signs[delimiter];
  if (line.includes('"')) return splitQuoted(line, sign);
  const cells = line.split(sign);
  for (let i = 0; i < cells.length; i += 1) cells[i] = cells[i]?.trim() ?? '';
  return cells;
}

/** A cell is quoted only where the quote opens it and another closes it before the next delimiter. */
function splitQuoted(line: string, sign: string): readonly string[] {
  const cells: string[] = [];
  let at = 0;
  // Beyond the last quote of the line no cell is quoted: keeps an unclosed quote from costing a scan each.
  const lastQuote = line.lastIndexOf('"');
  for (;;) {
    const opens = firstSolid(line, at, sign);
    const quoted = opens < lastQuote && line[opens] === '"' ? readQuoted(line, opens, sign) : null;
    if (quoted) {
      cells.push(quoted.cell);
      at = quoted.end;
    } else {
      const end = line.indexOf(sign, at);
      cells.push(line.slice(at, end === -1 ? line.length : end).trim());
      at = end === -1 ? line.length : end;
    }
    if (at >= line.length) return cells;
    at += sign.length;
  }
}

function firstSolid(line: string, from: number, sign: string): number {
  let at = from;
  while (at < line.length && line[at] !== sign && (line[at] === ' ' || line[at] === '\t')) at += 1;
  return at;
}

/** `end` is where the delimiter after the quoted cell stands, or the end of the line. */
function readQuoted(line: string, opens: number, sign: string) {
  let cell = '';
  let at = opens + 1;
  for (;;) {
    const closes = line.indexOf('"', at);
    if (closes === -1) return null;
    cell += line.slice(at, closes);
    if (line[closes + 1] !== '"') {
      const next = firstSolid(line, closes + 1, sign);
      const ends = next >= line.length || line[next] === sign;
      return ends ? { cell: cell.trim(), end: next } : null;
    }
    cell += '"';
    at = closes + 2;
  }
}

function splitAtSpaces(line: string): readonly string[] {
  const cells: string[] = [];
  const parts = line.includes('"')
    ? (line.match(/"[^"]*"|[^\s"]+/g) ?? []).map((part) => part.replaceAll('"', ''))
    : line.trim().split(/\s+/);
  let at = 0;
  let previousEnd = -1;
  for (const part of parts) {
    if (part === '') continue;
    const start = line.indexOf(part, at);
    at = start + part.length;
    const last = cells.at(-1);
    // Only lines with words pay for the look at letters: numbers begin with a digit or a sign.
    const joins = last !== undefined && start === previousEnd + 1 && isWord(part) && isWord(last);
    if (joins) cells[cells.length - 1] = `${last} ${part}`;
    else cells.push(part);
    previousEnd = at;
  }
  return cells;
}

function isWord(part: string): boolean {
  const code = part.charCodeAt(0);
  const isLetter = (code | 32) >= 97 && (code | 32) <= 122;
  return isLetter && /^[a-z -]+$/i.test(part);
}
