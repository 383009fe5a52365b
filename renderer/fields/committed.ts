import type { Entry } from './parse-entry.ts';

/** A commit that parses, then hands the number on. */
export function committed(
  parse: (text: string) => Entry,
  take: (value: number | undefined) => void,
): (text: string) => string | null {
  return (text) => {
    const entry = parse(text);
    if (!entry.ok) return entry.message;
    take(entry.value);
    return null;
  };
}
