import type { DoubtTest } from './evidence.ts';
import { twoFigures } from './wording.ts';

/** How far past the strongest standard a contribution may go before it is worth a word. */
const margin = 1.1;

/** A species absorbs more in the crude than in any of its standards, where linearity was not shown. */
export const beyondStandards: DoubtTest = ({ unmixing, standards, nameOf }) =>
  standards.flatMap(({ species, solutions }, k) => {
    const shown = solutions.map(({ largestAbsorbance }) => largestAbsorbance);
    if (shown.some((absorbance) => absorbance === null)) return [];
    const strongest = Math.max(...shown.map((absorbance) => absorbance ?? 0));
    const epsilon = unmixing.molarAbsorptivity[k]!.epsilon;
    let contribution = 0;
    for (const i of unmixing.at) {
      contribution = Math.max(
        contribution,
        unmixing.pathLengthCm * unmixing.drawn[k]! * epsilon[i]!,
      );
    }
    if (contribution <= margin * strongest) return [];
    return [
      {
        code: 'beyond-standards' as const,
        message:
          `${nameOf(species)} contributes an absorbance of up to ${twoFigures(contribution)} here; its standards go up to ${twoFigures(strongest)}. ` +
          'That it still follows Beer-Lambert there was not shown, so its amount may be off. ' +
          'Dilute the aliquot further, or add a more concentrated standard.',
        species: [species],
      },
    ];
  });
