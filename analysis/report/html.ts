/** Text as HTML text or a quoted attribute: no character of the user's is ever markup. */
export function escaped(text: string): string {
  return text.replace(/[&<>"']/g, (sign) => `&#${sign.charCodeAt(0)};`);
}

const longestPiece = 28;

/** Text as `escaped` has it, with places where it may break: after joints of names and paths, and within what has none. */
export function breakable(text: string): string {
  let sinceBreak = 0;
  const pieces = Array.from(text, (sign) => {
    sinceBreak = sign === ' ' ? 0 : sinceBreak + 1;
    const isJoint = /[/\\_.,;:)-]/.test(sign) && sinceBreak > 8;
    if (!isJoint && sinceBreak < longestPiece) return escaped(sign);
    sinceBreak = 0;
    return `${escaped(sign)}<wbr>`;
  });
  return pieces.join('');
}

const longestLine = 44;

/** A short text that is to stay on one line of its cell; a long one may break. */
export function oneLine(text: string): string {
  return text.length > longestLine ? breakable(text) : `<span class="line">${escaped(text)}</span>`;
}

/** Text as a string of a style sheet: all but plain letters, digits and spaces by number, so that it cannot end the string or the sheet. */
export function cssString(text: string): string {
  const signs = Array.from(text, (sign) =>
    /[a-zA-Z0-9 ]/.test(sign) ? sign : `\\${(sign.codePointAt(0) ?? 32).toString(16)} `,
  );
  return `"${signs.join('')}"`;
}

export type ColumnKind = 'left' | 'right' | 'interval';

const classOf: Readonly<Record<ColumnKind, string>> = {
  left: '',
  right: ' class="number"',
  interval: ' class="interval-cell"',
};

/** A table with a heading row; cells are HTML already. */
export function htmlTable(
  headings: readonly string[],
  align: readonly ColumnKind[],
  rows: readonly (readonly string[])[],
): string {
  const cell = (tag: 'th' | 'td', text: string, column: number): string =>
    `<${tag}${classOf[align[column] ?? 'left']}${tag === 'th' ? ' scope="col"' : ''}>${text}</${tag}>`;
  const line = (tag: 'th' | 'td', cells: readonly string[]): string =>
    `<tr>${cells.map((text, column) => cell(tag, text, column)).join('')}</tr>`;
  // a short table is kept on one page; a longer one repeats its heading
  const kind = rows.length <= 6 ? ' class="keep"' : '';
  return `<table${kind}><thead>${line('th', headings)}</thead><tbody>${rows.map((row) => line('td', row)).join('')}</tbody></table>`;
}
