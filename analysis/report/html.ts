/** Text as HTML text or a quoted attribute: no character of the user's is ever markup. */
export function escaped(text: string): string {
  return text.replace(/[&<>"']/g, (sign) => `&#${sign.charCodeAt(0)};`);
}

/** A table with a heading row; cells are HTML already. A column that begins with ">" in `align` stands right. */
export function htmlTable(
  headings: readonly string[],
  align: readonly ('left' | 'right')[],
  rows: readonly (readonly string[])[],
): string {
  const cell = (tag: 'th' | 'td', text: string, column: number): string =>
    `<${tag}${align[column] === 'right' ? ' class="number"' : ''}${tag === 'th' ? ' scope="col"' : ''}>${text}</${tag}>`;
  const line = (tag: 'th' | 'td', cells: readonly string[]): string =>
    `<tr>${cells.map((text, column) => cell(tag, text, column)).join('')}</tr>`;
  return `<table><thead>${line('th', headings)}</thead><tbody>${rows.map((row) => line('td', row)).join('')}</tbody></table>`;
}
