import { linearityOf } from '../standards/linearity.ts';
import type { SpeciesStandard } from '../standards/species-standard.ts';
import type { DoubtTest } from './evidence.ts';
import { twoFigures } from './wording.ts';

/** How far past what was shown a contribution may go before it is worth a word. */
const margin = 1.1;

/** A species absorbs more in the crude than its standards were shown to be linear up to. */
export const beyondStandards: DoubtTest = ({ unmixing, nameOf }) =>
  unmixing.standards.flatMap((standard, k) => {
    const shown = shownUpTo(standard);
    if (shown === null) return [];
    const epsilon = unmixing.molarAbsorptivity[k]!.epsilon;
    let contribution = 0;
    for (const i of unmixing.at) {
      contribution = Math.max(
        contribution,
        unmixing.pathLengthCm * unmixing.drawn[k]! * epsilon[i]!,
      );
    }
    if (contribution <= margin * shown.absorbance) return [];
    const name = nameOf(standard.species);
    const limit = shown.isBent
      ? `its standards follow Beer-Lambert up to ${twoFigures(shown.absorbance)} and bend above`
      : `its standards go up to ${twoFigures(shown.absorbance)}`;
    const effect = shown.isBent
      ? 'Above that its readings are off, and its amount with them. '
      : 'That it still follows Beer-Lambert there was not shown, so its amount may be off. ';
    const mend = shown.isBent
      ? 'Dilute the aliquot further, or lower the upper absorbance.'
      : 'Dilute the aliquot further, or add a more concentrated standard.';
    return [
      {
        code: 'beyond-standards' as const,
        message: `${name} contributes an absorbance of up to ${twoFigures(contribution)} here; ${limit}. ${effect}${mend}`,
        species: [standard.species],
      },
    ];
  });

/** The absorbance up to which the standards are linear; null for a spectrum given as ε, which does not say. */
function shownUpTo({
  solutions,
}: SpeciesStandard): { readonly absorbance: number; readonly isBent: boolean } | null {
  let strongest = 0;
  for (const { largestAbsorbance } of solutions) {
    if (largestAbsorbance === null) return null;
    strongest = Math.max(strongest, largestAbsorbance);
  }
  const { straightUpTo } = linearityOf(solutions);
  return straightUpTo
    ? { absorbance: straightUpTo, isBent: true }
    : { absorbance: strongest, isBent: false };
}
