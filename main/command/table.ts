/** A plain table for a terminal: columns padded, two spaces between, a rule under the headings. */
export function table(
  headings: readonly string[],
  rows: readonly (readonly string[])[],
  indent = '',
): string {
  const widths = headings.map((heading, column) =>
    Math.max(heading.length, ...rows.map((row) => (row[column] ?? '').length)),
  );
  const line = (cells: readonly string[]) =>
    `${indent}${cells.map((cell, column) => cell.padEnd(widths[column] ?? 0)).join('  ')}`.trimEnd();
  return [line(headings), line(widths.map((width) => '-'.repeat(width))), ...rows.map(line)].join(
    '\n',
  );
}
