import { absorbingSpecies, type Sheet, speciesGlyph } from '../../analysis/index.ts';

/** The class that gives an element the species' colour, by light and dark. */
export function lookClass(sheet: Sheet, id: string): string {
  const index = absorbingSpecies(sheet).findIndex((species) => species.id === id);
  return index === -1 ? 'look-none' : `look-${index % 8}`;
}

/** Our glyph: a ring with a stub for each site and a bead on each stub that carries an arm. */
export function SpeciesGlyph({ sheet, id }: { readonly sheet: Sheet; readonly id: string }) {
  const species = sheet.species.find((each) => each.id === id);
  if (!species) return null;
  return (
    <span
      class={`glyph ${lookClass(sheet, id)}`}
      // made by us from numbers alone, no text of the user in it
      dangerouslySetInnerHTML={{ __html: speciesGlyph(sheet, species) }}
    />
  );
}
