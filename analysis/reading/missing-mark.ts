const words = new Set([
  'nan',
  'na',
  'n/a',
  'n.a.',
  'n.d.',
  'nd',
  'null',
  'nil',
  'none',
  'missing',
  'fehlt',
  'inf',
  'infinity',
  '∞',
  '1.#inf',
  '1.#ind',
  '1.#qnan',
  '1.#nan',
  'over',
  'ovr',
  'ovl',
  'ovf',
  'ovrflw',
  'ovrng',
  'overflow',
  'over flow',
  'overrange',
  'over range',
  'over-range',
  'over_range',
  'overload',
  'out of range',
  'out-of-range',
  'oor',
  'sat',
  'saturated',
  'saturation',
  'underflow',
  'under range',
  'err',
  'error',
  'fehler',
  'invalid',
  'ungültig',
  'übersteuert',
  'überlauf',
  'über',
  'x',
]);

/**
 * Whether a cell is one of the known ways to say "no value here": empty, a word of the list, signs
 * without a digit ("--", "****", "###"), a spreadsheet's error, a bound (">4.0").
 * Text of any other wording also has no value, but is told with its line.
 */
export function isMissingMark(cell: string): boolean {
  if (cell === '') return true;
  if (cell.length > 40) return false;
  const first = cell.charCodeAt(0);
  // The quick way out for numbers, which nearly all cells are.
  if (first >= 48 && first <= 57 && !cell.includes('#')) return false;
  const plain = cell
    .toLowerCase()
    .replace(/\s+/g, ' ')
    .replace(/[!.]+$/, '');
  if (
    words.has(plain) ||
    words.has(`${plain}.`) ||
    words.has(plain.replace(/^[+\-\u2212]\s?/, ''))
  ) {
    return true;
  }
  if (/^[-*#?_.=<>~!\u2013\u2014\u2212]+$/.test(cell)) return true;
  if (/^#[a-z0-9/!?_ ]+$/i.test(cell)) return true;
  return /^(?:[<>≥≤≧≦]=?|over|under)\s?[+\-\u2212]?\d[\d.,]*(?:e[+-]?\d+)?$/i.test(cell);
}
