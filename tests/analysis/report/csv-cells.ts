/** The cells of an RFC 4180 text, row by row, with whether each was quoted. Fails on what is no CSV. */
export function csvCells(text: string): { value: string; isQuoted: boolean }[][] {
  const rows: { value: string; isQuoted: boolean }[][] = [[]];
  const cell = /(?:"((?:[^"]|"")*)"|([^",\r\n]*))(,|\r\n)/gy;
  while (cell.lastIndex < text.length) {
    const at = cell.lastIndex;
    const found = cell.exec(text);
    if (!found) throw new Error(`no CSV from character ${at}: ${text.slice(at, at + 40)}`);
    const [, quoted, bare = '', end] = found;
    rows.at(-1)?.push({
      value: quoted?.replaceAll('""', '"') ?? bare,
      isQuoted: quoted !== undefined,
    });
    if (end === '\r\n') rows.push([]);
  }
  return rows.slice(0, -1);
}
