import type { Sheet } from './schema.ts';

/** The sheet as text to save: indented JSON with lists of numbers on one line, so that it reads well. */
export function sheetText(sheet: Sheet): string {
  return `${written(sheet, '')}\n`;
}

function written(value: unknown, indent: string): string {
  if (typeof value !== 'object' || value === null) return JSON.stringify(value);
  const deeper = `${indent}  `;
  if (Array.isArray(value)) {
    if (value.length === 0) return '[]';
    if (value.every((entry) => typeof entry === 'number' || entry === null)) {
      return `[${value.map((entry) => JSON.stringify(entry)).join(', ')}]`;
    }
    const entries = value.map((entry) => `${deeper}${written(entry ?? null, deeper)}`);
    return `[\n${entries.join(',\n')}\n${indent}]`;
  }
  const members = Object.entries(value)
    .filter(([, member]) => member !== undefined)
    .map(([key, member]) => `${deeper}${JSON.stringify(key)}: ${written(member, deeper)}`);
  return members.length === 0 ? '{}' : `{\n${members.join(',\n')}\n${indent}}`;
}
