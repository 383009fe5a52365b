/** Text as HTML text or a quoted attribute: no character of the user's is ever markup. */
export function escaped(text: string): string {
  return text.replace(/[&<>"']/g, (sign) => `&#${sign.charCodeAt(0)};`);
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
  return `<table><thead>${line('th', headings)}</thead><tbody>${rows.map((row) => line('td', row)).join('')}</tbody></table>`;
}
