import { speciesLabel, speciesName } from '../sheet/defaults.ts';
import type { Sheet } from '../sheet/schema.ts';
import { breakable } from './html.ts';
import { speciesGlyph } from './species-glyph.ts';
import { lookCount, lookIndex } from './species-look.ts';

/** A species for a cell of a table: its glyph in its colour, its name, and a remark that is HTML already. */
export function speciesCell(
  sheet: Sheet,
  id: string,
  {
    name = 'full',
    remark = '',
  }: { readonly name?: 'full' | 'short'; readonly remark?: string } = {},
): string {
  const species = sheet.species.find((each) => each.id === id);
  const index = lookIndex(sheet, id);
  const look = index === null ? '' : ` look-${index % lookCount}`;
  const text = name === 'short' ? speciesLabel(sheet, id) : speciesName(sheet, id);
  const glyph = species
    ? `<span class="glyph${look}">${speciesGlyph(sheet, species)}</span>`
    : '<span class="glyph"></span>';
  return `<span class="species">${glyph}<span>${breakable(text)}${remark}</span></span>`;
}
