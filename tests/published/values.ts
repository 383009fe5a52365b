import { readFileSync } from 'node:fs';
import path from 'node:path';

/** A file of published or computed values, as it was handed to us (sources stand inside). */
export function published(file: string): unknown {
  return JSON.parse(readFileSync(path.join(import.meta.dirname, 'values', file), 'utf8'));
}

/** Digits that agree: the negative logarithm of the relative error, 15 at the most. */
export function digits(value: number, right: number): number {
  if (value === right) return 15;
  const error = right === 0 ? Math.abs(value) : Math.abs((value - right) / right);
  return Math.min(15, -Math.log10(error));
}

/** Columns of a matrix given by rows. */
export function columnsOf(rows: readonly (readonly number[])[]): Float64Array[] {
  return (rows[0] ?? []).map((_, k) => Float64Array.from(rows, (row) => row[k] ?? Number.NaN));
}
