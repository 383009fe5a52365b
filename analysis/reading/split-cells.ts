export type Delimiter = 'comma' | 'semicolon' | 'tab' | 'space';

const signs = { comma: ',', semicolon: ';', tab: '\t' } as const;

/**
 * Cells of one line, trimmed, quotes taken off (a doubled quote inside stands for one). `space`
 * means any run of spaces and tabs; words joined by a single space stay one cell ("over range").
 */
export function splitCells(line: string, delimiter: Delimiter): readonly string[] {
  if (delimiter === 'space') return splitAtSpaces(line);
  const sign = signs[delimiter];
  if (line.includes('"')) return splitQuoted(line, sign);
  const cells = line.split(sign);
  for (let i = 0; i < cells.length; i += 1) cells[i] = cells[i]?.trim() ?? '';
  return cells;
}

/**
 * A quote counts only where it opens a cell and its partner closes it. After the first one without
 * a partner all quotes of the line are plain characters: one look ahead a line, not one a cell.
 */
function splitQuoted(line: string, sign: string): readonly string[] {
  const cells: string[] = [];
  let at = 0;
  let quotesCount = true;
  for (;;) {
    const opens = firstSolid(line, at, sign);
    const isQuote: boolean = quotesCount && line[opens] === '"';
    const quoted = isQuote ? readQuoted(line, opens) : null;
    const end = quoted ? firstSolid(line, quoted.end, sign) : 0;
    if (quoted && (end >= line.length || line[end] === sign)) {
      cells.push(quoted.cell);
      at = end;
    } else {
      quotesCount &&= !isQuote;
      const next = line.indexOf(sign, at);
      const stop = next === -1 ? line.length : next;
      cells.push(line.slice(at, stop).trim());
      at = stop;
    }
    if (at >= line.length) return cells;
    at += 1;
  }
}

function firstSolid(line: string, from: number, sign: string): number {
  let at = from;
  while (at < line.length && line[at] !== sign && isSpace(line, at)) at += 1;
  return at;
}

const isSpace = (line: string, at: number) => line[at] === ' ' || line[at] === '\t';

/** `end` is the place after the closing quote; null where none closes. */
function readQuoted(line: string, opens: number): { cell: string; end: number } | null {
  let cell = '';
  let at = opens + 1;
  for (;;) {
    const closes = line.indexOf('"', at);
    if (closes === -1) return null;
    cell += line.slice(at, closes);
    if (line[closes + 1] !== '"') return { cell: cell.trim(), end: closes + 1 };
    cell += '"';
    at = closes + 2;
  }
}

function splitAtSpaces(line: string): readonly string[] {
  if (line.includes('"')) return splitQuotedAtSpaces(line);
  const parts = line.trim().split(/\s+/);
  const cells: string[] = [];
  let at = 0;
  let wordEnd = -2;
  for (const part of parts) {
    if (part === '') continue;
    const start = line.indexOf(part, at);
    at = start + part.length;
    const isJoined: boolean = isWord(part) && start === wordEnd + 1;
    if (isJoined) cells[cells.length - 1] += ` ${part}`;
    else cells.push(part);
    wordEnd = isWord(part) ? at : -2;
  }
  return cells;
}

function splitQuotedAtSpaces(line: string): readonly string[] {
  const cells: string[] = [];
  let at = 0;
  let quotesCount = true;
  for (;;) {
    while (at < line.length && isSpace(line, at)) at += 1;
    if (at >= line.length) return cells;
    const isQuote: boolean = quotesCount && line[at] === '"';
    const quoted = isQuote ? readQuoted(line, at) : null;
    if (quoted && (quoted.end >= line.length || isSpace(line, quoted.end))) {
      cells.push(quoted.cell);
      at = quoted.end;
      continue;
    }
    quotesCount &&= !isQuote;
    const start = at;
    while (at < line.length && !isSpace(line, at)) at += 1;
    cells.push(line.slice(start, at));
  }
}

/** Numbers begin with a digit or a sign, so that only words pay for the look at their letters. */
function isWord(part: string): boolean {
  const code = part.charCodeAt(0) | 32;
  return code >= 97 && code <= 122 && /^[a-z -]+$/i.test(part);
}
