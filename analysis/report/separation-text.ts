import { speciesLabel } from '../sheet/defaults.ts';
import type { Sheet } from '../sheet/schema.ts';
import type { AliquotResult } from '../split/results.ts';
import { figuresText } from './numbers.ts';

/** "mono ×2.9, bis ×2.7": by how much likeness of the standards in the window inflates each uncertainty. */
export function separationText(sheet: Sheet, { separation }: AliquotResult['fit']): string {
  return separation
    .map(({ species, inflation }) => {
      const times = inflation === null ? 'without bound' : `×${figuresText(inflation)}`;
      return `${speciesLabel(sheet, species)} ${times}`;
    })
    .join(', ');
}
