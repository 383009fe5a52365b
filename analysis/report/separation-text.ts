import { speciesLabel } from '../sheet/defaults.ts';
import type { Sheet } from '../sheet/schema.ts';
import type { AliquotResult } from '../split/results.ts';
import { figuresText } from './numbers.ts';

/** "mono 2.9 times, bis 2.7 times": by how much likeness of the standards in the window inflates each uncertainty. */
export function separationText(sheet: Sheet, { separation }: AliquotResult['fit']): string {
  return separation
    .map(({ species, inflation }) => {
      const times = inflation === null ? 'without bound' : `${figuresText(inflation)} times`;
      return `${speciesLabel(sheet, species)} ${times}`;
    })
    .join(', ');
}
