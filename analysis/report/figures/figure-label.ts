import { speciesLabel } from '../../sheet/defaults.ts';
import type { Sheet } from '../../sheet/schema.ts';
import { escaped } from '../html.ts';

const longest = 24;

/** The name of a species for a figure, as escaped text, and about half of its width at the size used there. */
export function figureLabel(
  sheet: Sheet,
  species: string,
): { readonly text: string; readonly halfWidth: number } {
  const signs = Array.from(speciesLabel(sheet, species));
  const shown = signs.length > longest ? [...signs.slice(0, longest - 1), '…'] : signs;
  return { text: escaped(shown.join('')), halfWidth: 3.2 * shown.length };
}
