export type DecimalSign = 'point' | 'comma';

/**
 * What kind of number a cell prints. `point` and `comma` have one such sign, `grouped-by-…` have
 * thousands marked off beyond doubt ("1,234.5", "1.234.567").
 */
export type NumberKind =
  | 'none'
  | 'integer'
  | 'point'
  | 'comma'
  | 'grouped-by-comma'
  | 'grouped-by-point';

/** No printed number is longer; what is longer is not one. */
const LONGEST = 400;

const isDigit = (code: number) => code >= 48 && code <= 57;
/** Plus, hyphen-minus, U+2212 minus, U+2013 en dash (word processors put it for a minus). */
const isSign = (code: number) => code === 43 || code === 45 || code === 0x2212 || code === 0x2013;
/** E, e, D, d: the last two from programs that print double precision so. */
const isExponent = (code: number) => (code | 32) === 101 || (code | 32) === 100;

/** Kind of the number that a trimmed cell holds, in one pass over its characters. */
export function numberKind(cell: string): NumberKind {
  const { length } = cell;
  if (length === 0 || length > LONGEST) return 'none';
  let at = isSign(cell.charCodeAt(0)) ? 1 : 0;
  const start = at;
  let digits = 0;
  let points = 0;
  let commas = 0;
  for (; at < length; at += 1) {
    const code = cell.charCodeAt(at);
    if (isDigit(code)) digits += 1;
    else if (code === 46) points += 1;
    else if (code === 44) commas += 1;
    else break;
  }
  if (digits === 0) return 'none';
  if (at < length && !exponentFollows(cell, at)) return 'none';
  if (points === 0 && commas === 0) return 'integer';
  if (commas === 0 && points === 1) return 'point';
  const mantissa = cell.slice(start, at);
  // ",5" and "5," are more likely a delimiter gone astray than a number.
  if (points === 0 && commas === 1) {
    return mantissa.startsWith(',') || mantissa.endsWith(',') ? 'none' : 'comma';
  }
  if (/^[1-9]\d{0,2}(?:,\d{3})+(?:\.\d*)?$/.test(mantissa)) return 'grouped-by-comma';
  if (/^[1-9]\d{0,2}(?:\.\d{3})+(?:,\d+)?$/.test(mantissa)) return 'grouped-by-point';
  return 'none';
}

function exponentFollows(cell: string, at: number): boolean {
  if (!isExponent(cell.charCodeAt(at))) return false;
  let next = at + 1;
  if (next < cell.length && isSign(cell.charCodeAt(next))) next += 1;
  if (next >= cell.length) return false;
  for (; next < cell.length; next += 1) if (!isDigit(cell.charCodeAt(next))) return false;
  return true;
}

/** "1,234" or "12.345": a decimal number, or a whole one with its thousands marked off. */
export function looksGrouped(cell: string): boolean {
  const sign = cell.charCodeAt(cell.length - 4);
  if (sign !== 44 && sign !== 46) return false;
  return /^[+\-\u2212\u2013]?[1-9]\d{0,2}[.,]\d{3}$/.test(cell);
}

/**
 * Value of a cell to the printed digit, NaN where it holds no number. With decimal point, commas
 * are thousands marks, and the other way round: what is allowed has been settled for the whole
 * file (`settleDecimalSign`).
 */
export function cellValue(cell: string, decimal: DecimalSign): number {
  const plain = plainValue(cell, decimal === 'point' ? 46 : 44);
  if (!Number.isNaN(plain)) return plain;
  const kind = numberKind(cell);
  if (kind === 'none') return Number.NaN;
  let literal = cell;
  if (kind !== 'integer') {
    if (decimal === 'comma') literal = literal.replaceAll('.', '').replace(',', '.');
    else if (kind !== 'point') literal = literal.replaceAll(',', '');
  }
  const direct = Number(literal);
  const value = Number.isNaN(direct) ? Number(asLiteral(literal)) : direct;
  // Zero has no sign here; a number beyond double precision is none.
  return Number.isFinite(value) ? value + 0 : Number.NaN;
}

/** So many digits are a whole number that a double holds exactly. */
const mostPlainDigits = 15;
const powersOfTen = Float64Array.from({ length: mostPlainDigits + 1 }, (_, k) => Number(`1e${k}`));

/**
 * Value of a cell of few digits with at most one decimal sign between them; NaN for all others. Both
 * the digits as a whole number and the power of ten are exact, so that their quotient is rounded once
 * and is the double nearest to what is printed, as `Number` gives it (Clinger, PLDI 1990).
 */
function plainValue(cell: string, sign: number): number {
  const { length } = cell;
  if (length > mostPlainDigits) return Number.NaN;
  const isNegative = cell.charCodeAt(0) === 45;
  let whole = 0;
  let signAt = -1;
  for (let at = isNegative ? 1 : 0; at < length; at += 1) {
    const code = cell.charCodeAt(at);
    if (isDigit(code)) whole = 10 * whole + (code - 48);
    else if (code === sign && signAt === -1) signAt = at;
    else return Number.NaN;
  }
  const first = isNegative ? 1 : 0;
  if (length === first || signAt === first || signAt === length - 1) return Number.NaN;
  const value = signAt === -1 ? whole : whole / powersOfTen[length - signAt - 1]!;
  return isNegative && value !== 0 ? -value : value;
}

function asLiteral(text: string): string {
  return text.replace(/[\u2212\u2013]/g, '-').replace(/[dD]/, 'e');
}

/** Characters after the decimal sign, exponent included; 0 without one. */
export function lengthAfterSign(cell: string): number {
  const at = Math.max(cell.lastIndexOf('.'), cell.lastIndexOf(','));
  return at === -1 ? 0 : cell.length - at - 1;
}
