import type { SheetDilution } from '../../analysis/index.ts';
import { type Entry, parseNumber, shown } from './parse-entry.ts';

export type DilutionEntry =
  | { readonly ok: true; readonly value: Pick<SheetDilution, 'factor' | 'steps'> | undefined }
  | { readonly ok: false; readonly message: string };

const hint = 'Type a factor ("2000" or "1:2000") or steps in mL ("1 → 100; 5 → 50").';

/** "2000", "1:2000", "1 -> 100; 5 -> 50" (millilitres taken, made up to). Empty is nothing. */
export function parseDilution(text: string): DilutionEntry {
  const trimmed = text.trim();
  if (trimmed === '') return { ok: true, value: undefined };
  if (/→|->|>/.test(trimmed)) return parseSteps(trimmed);
  const unclear = twofold(trimmed.split(':'));
  if (unclear !== null) return { ok: false, message: unclear };
  const ratio = /^(.+?)\s*:\s*(.+)$/.exec(trimmed);
  const [one, many] = ratio ? [number(ratio[1]), number(ratio[2])] : [1, number(trimmed)];
  if (one === null || many === null || !(one > 0)) return { ok: false, message: hint };
  const factor = many / one;
  return factor >= 1
    ? { ok: true, value: { factor } }
    : { ok: false, message: 'A dilution factor is 1 or more.' };
}

function parseSteps(text: string): DilutionEntry {
  const steps: { takeMl: number; toMl: number }[] = [];
  for (const part of text.split(/;|,?\s*\bthen\b/i)) {
    const volumes = part.split(/→|-?>/);
    const unclear = twofold(volumes);
    if (unclear !== null) return { ok: false, message: unclear };
    const [take, to, ...more] = volumes.map(number);
    if (typeof take !== 'number' || typeof to !== 'number' || more.length > 0) {
      return { ok: false, message: hint };
    }
    if (!(take > 0 && to >= take)) {
      return { ok: false, message: `Step ${steps.length + 1} takes more than it is made up to.` };
    }
    steps.push({ takeMl: take, toMl: to });
  }
  return { ok: true, value: { steps } };
}

function number(text: string | undefined): number | null {
  const entry = entryOf(text ?? '');
  return entry.ok ? (entry.value ?? null) : null;
}

function entryOf(text: string): Entry {
  return parseNumber(text.replace(/ml\s*$/i, ''));
}

/** What is wrong with the first of the numbers that is one, but can be read in two ways. */
function twofold(texts: readonly string[]): string | null {
  for (const text of texts) {
    const entry = entryOf(text);
    if (!entry.ok && entry.isTwofold === true) return entry.message;
  }
  return null;
}

/**
 * What was typed, with all that the cell does not show kept: the uncertainty, and the glassware of
 * every step whose volumes stay.
 */
export function keptDilution(
  before: SheetDilution | undefined,
  typed: Pick<SheetDilution, 'factor' | 'steps'> | undefined,
): SheetDilution | undefined {
  if (!before || !typed) return typed;
  const { factor: _, steps: earlier = [], ...rest } = before;
  if (!typed.steps) return { ...rest, ...typed };
  const steps = typed.steps.map((step, index) => {
    const same = earlier[index];
    return same?.takeMl === step.takeMl && same.toMl === step.toMl ? same : step;
  });
  return { ...rest, steps };
}

export function shownDilution(dilution: SheetDilution | undefined): string {
  if (!dilution) return '';
  if (dilution.factor !== undefined) return shown(dilution.factor);
  return (dilution.steps ?? [])
    .map(({ takeMl, toMl }) => `${shown(takeMl)} → ${shown(toMl)}`)
    .join('; ');
}
