import type { ReadingUnit } from './numbers.ts';

const units = [
  ['molar', 1],
  ['millimolar', 1e-3],
  ['micromolar', 1e-6],
] as const;

/**
 * The unit for a whole column of concentrations in mol/L: the largest one in which the largest of
 * them is 1 or more, nmol/L below that. µmol/L where there is nothing to go by.
 */
export function concentrationUnit(valuesMolPerL: readonly (number | null)[]): ReadingUnit {
  let largest = 0;
  for (const value of valuesMolPerL) {
    if (value !== null && Number.isFinite(value)) largest = Math.max(largest, Math.abs(value));
  }
  if (largest === 0) return 'micromolar';
  return units.find(([, size]) => largest >= size)?.[0] ?? 'nanomolar';
}
