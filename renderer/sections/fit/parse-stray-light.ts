import { type Entry, parsePercent } from '../../fields/parse-entry.ts';

/** What the sheet takes: above it there is hardly a spectrum left. */
const mostStrayLight = 0.05;

/** Stray light typed as a percentage of the light, "0.05" or "0,05 %", as a fraction. */
export function parseStrayLight(text: string): Entry {
  const entry = parsePercent(text);
  if (!entry.ok || entry.value === undefined || entry.value <= mostStrayLight) return entry;
  return { ok: false, message: 'At most 5 %; instruments have 0.001 to 1 %.' };
}
