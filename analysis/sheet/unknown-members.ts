import type * as v from 'valibot';
import { type Sheet, sheetSchema } from './schema.ts';

/** "unknown member "aliquots[2].colour": kept, not used", one sentence for each. */
export function unknownMembers(sheet: Sheet): string[] {
  const found: string[] = [];
  walk(sheetSchema, sheet, '', found);
  return found.map(
    (path) => `The member "${path}" is not known here: it is kept on save and not used.`,
  );
}

function walk(schema: v.GenericSchema, value: unknown, path: string, found: string[]): void {
  const inner = unwrapped(schema);
  if (Array.isArray(value)) {
    const item = 'item' in inner ? inner.item : undefined;
    if (!isSchema(item)) return;
    for (const [index, entry] of value.entries()) walk(item, entry, `${path}[${index + 1}]`, found);
    return;
  }
  if (typeof value !== 'object' || value === null) return;
  if (!('entries' in inner) || typeof inner.entries !== 'object' || inner.entries === null) return;
  const entries = new Map<string, unknown>(Object.entries(inner.entries));
  for (const [key, entry] of Object.entries(value)) {
    const here = path === '' ? key : `${path}.${key}`;
    const known = entries.get(key);
    if (isSchema(known)) walk(known, entry, here, found);
    else found.push(here);
  }
}

function unwrapped(schema: v.GenericSchema): v.GenericSchema {
  if ('wrapped' in schema && isSchema(schema.wrapped)) return unwrapped(schema.wrapped);
  return schema;
}

function isSchema(value: unknown): value is v.GenericSchema {
  return typeof value === 'object' && value !== null && 'kind' in value && value.kind === 'schema';
}
