import { computed } from '@preact/signals';
import { filesOf } from '../../analysis/index.ts';
import { isOpen, sheet } from '../state/store.ts';

/** Files that the open sheet names and that are not in it: the page asks for them. */
export const awaited = computed<readonly string[]>(() =>
  isOpen.value ? filesOf(sheet.value) : [],
);

/** The part of a path that a dropped file still has. */
export function lastPart(path: string): string {
  return path.split(/[\\/]/).at(-1) ?? path;
}

interface Matched<T> {
  /** Path in the sheet to the file that is it. */
  readonly found: ReadonlyMap<string, T>;
  /** Names that several paths end in: which of them a file is cannot be told. */
  readonly ambiguous: readonly string[];
  readonly rest: readonly T[];
}

/** Meets files with the paths that wait for them: by the whole path, else by a last part that only one has. */
export function matchAwaited<T extends { readonly name: string }>(
  waiting: readonly string[],
  files: readonly T[],
): Matched<T> {
  const found = new Map<string, T>();
  const ambiguous = new Set<string>();
  const rest: T[] = [];
  for (const file of files) {
    const candidates = waiting.includes(file.name)
      ? [file.name]
      : waiting.filter((path) => lastPart(path) === lastPart(file.name));
    const [path, ...others] = candidates;
    if (path === undefined) rest.push(file);
    else if (others.length > 0 || found.has(path)) ambiguous.add(lastPart(file.name));
    else found.set(path, file);
  }
  return { found, ambiguous: [...ambiguous], rest };
}
