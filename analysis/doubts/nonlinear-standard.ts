import type { DoubtTest } from './evidence.ts';
import { percentText } from './wording.ts';

/** Solutions of one species whose ε disagree by more than their uncertainties allow (χ², 1 % false alarms). */
export const nonlinearStandard: DoubtTest = ({ standards, nameOf }) =>
  standards.flatMap(({ species, agreement, factors }) => {
    if (!agreement || agreement.chiSquare <= agreement.limit) return [];
    const spread = Math.max(...factors) / Math.min(...factors) - 1;
    return [
      {
        code: 'nonlinear-standard' as const,
        message:
          `The solutions of ${nameOf(species)} give molar absorptivities that differ by up to ${percentText(spread)}, more than their uncertainties allow: they do not follow Beer-Lambert together. ` +
          `The amount of ${nameOf(species)} may be off by as much; the scatter has been added to its uncertainty. ` +
          'Check the concentrations and path lengths typed in, and make the solution that stands apart again.',
        species: [species],
      },
    ];
  });
