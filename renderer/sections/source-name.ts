/** "bis.csv, trace name": the file where it is known, and the trace's own name where it says more. */
export function sourceName(file: string | undefined, name: string): string {
  if (file === undefined) return name;
  const last = file.split(/[\\/]/).at(-1) ?? file;
  return name === '' || last.startsWith(name) ? last : `${last}, ${name}`;
}
