import type { Results } from '../split/results.ts';

/**
 * The results as SHEET.md has them. A number that is not finite is a fault of the program (JSON
 * would turn it into null in silence): throws.
 */
export function resultsJson(results: object & (Results | Results['aliquots'][number])): string {
  return JSON.stringify(results, (key, value: unknown) => {
    if (typeof value === 'number' && !Number.isFinite(value)) {
      throw new Error(`the result "${key}" is not a finite number`);
    }
    return value;
  });
}
