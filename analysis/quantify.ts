import type { Reading } from './reading/reading.ts';
import type { Sheet } from './sheet/schema.ts';
import type { Quantification } from './split/results.ts';

/**
 * The whole sheet, computed. `readings` holds one reading for each file that the sheet points at
 * (`filesOf`). Throws a `Refusal` where the sheet as a whole cannot be used; an aliquot that
 * cannot be fitted is listed in `results.refused` instead.
 */
export function quantify(sheet: Sheet, readings: ReadonlyMap<string, Reading>): Quantification {
  throw new Error(`in the making: ${sheet.title} ${readings.size}`);
}
