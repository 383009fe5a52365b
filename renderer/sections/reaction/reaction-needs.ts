import { productSpecies, type Sheet, speciesName } from '../../../analysis/index.ts';

/** What the section still needs; null when it is complete. */
export function reactionNeeds(sheet: Sheet): string | null {
  const { core, arm, sites } = sheet.reaction;
  if (core === arm) return 'a core and an arm that are two different species';
  const built = (id: string): string | undefined => {
    const species = sheet.species.find((each) => each.id === id);
    return species && `${species.cores}, ${species.arms}`;
  };
  if (built(core) !== '1, 0') return `1 core and 0 arms in ${speciesName(sheet, core)}, the core`;
  if (built(arm) !== '0, 1') return `0 cores and 1 arm in ${speciesName(sheet, arm)}, the arm`;
  const products = productSpecies(sheet);
  const crowded = products.find(({ cores, arms }) => arms > cores * sites);
  if (crowded) {
    return `more sites on the core, or fewer arms in ${speciesName(sheet, crowded.id)}`;
  }
  return products.length < 2
    ? 'at least two products: species with a core and one or more arms'
    : null;
}
