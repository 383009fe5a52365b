/** Ranges of wavelengths as typed, or what is wrong with them. */
export type RangesEntry =
  | { readonly ok: true; readonly value: readonly (readonly [number, number])[] }
  | { readonly ok: false; readonly message: string };

/** "300–304; 410-412.5": two wavelengths with a dash, ranges parted by semicolons. Empty is none. */
export function parseRanges(text: string): RangesEntry {
  const ranges: [number, number][] = [];
  for (const part of text.split(';')) {
    if (part.trim() === '') continue;
    const match = /^\s*(\d+(?:[.,]\d+)?)\s*(?:-|–|—|to)\s*(\d+(?:[.,]\d+)?)\s*(?:nm)?\s*$/.exec(
      part,
    );
    const [low, high] = [match?.[1], match?.[2]].map((number) => Number(number?.replace(',', '.')));
    if (
      low === undefined ||
      high === undefined ||
      !Number.isFinite(low) ||
      !Number.isFinite(high)
    ) {
      return { ok: false, message: `"${part.trim()}" is not a range; type "300–304; 410–412".` };
    }
    if (!(low < high)) return { ok: false, message: `"${part.trim()}" runs backwards.` };
    ranges.push([low, high]);
  }
  return { ok: true, value: ranges };
}

export function shownRanges(ranges: readonly (readonly [number, number])[] | undefined): string {
  return (ranges ?? []).map(([low, high]) => `${low}–${high}`).join('; ');
}
