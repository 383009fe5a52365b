import { type Linearity, linearityOf } from '../standards/linearity.ts';
import type { SpeciesStandard } from '../standards/species-standard.ts';
import type { Doubt } from './doubt.ts';
import type { DoubtTest, Evidence } from './evidence.ts';
import { listText, percentText, twoFigures } from './wording.ts';

/** With no baseline in the fit, an offset between two standards from here on is worth a word. Absorbance. */
const offsetThatMoves = 2e-3;

/**
 * Solutions of one species that do not follow Beer-Lambert together, in three ways: scales that
 * disagree by more than their uncertainties allow (χ²), absorbance that bends against
 * concentration (F; `linearityOf`), and, where no baseline is fitted, two whose offsets differ. The first two raise a false
 * alarm on 1 % of sheets with three species.
 */
export const nonlinearStandard: DoubtTest = ({ unmixing, settings, nameOf }) =>
  unmixing.standards.flatMap((standard) =>
    [
      scalesDisagree(standard, nameOf),
      isBent(standard, linearityOf(standard.solutions), nameOf),
      settings.baseline === 'none' ? offsetsDiffer(standard, nameOf) : null,
    ].flatMap((message): Doubt[] =>
      message === null
        ? []
        : [{ code: 'nonlinear-standard', message, species: [standard.species] }],
    ),
  );

type NameOf = Evidence['nameOf'];

function scalesDisagree(
  { species, solutions, agreement, factors }: SpeciesStandard,
  nameOf: NameOf,
): string | null {
  if (!agreement || agreement.chiSquare <= agreement.limit) return null;
  const name = nameOf(species);
  const effect = `The amount of ${name} may be off by as much; the scatter has been added to its uncertainty. `;
  const { apart } = agreement;
  if (apart) {
    const side = apart.relative > 0 ? 'above' : 'below';
    return (
      `The standard ${apart.standard} of ${name} stands apart: its molar absorptivity lies ${percentText(Math.abs(apart.relative))} ${side} that of the others, which agree. ` +
      effect +
      `Check the concentration and the path length typed in for ${apart.standard}, and make it again or take it out.`
    );
  }
  const spread = percentText(Math.max(...factors) / Math.min(...factors) - 1);
  if (solutions.length === 2) {
    return (
      `The standards ${listText(solutions.map(({ standard }) => standard))} of ${name} give molar absorptivities that differ by ${spread}, more than their uncertainties allow; two cannot tell which of them is off. ` +
      effect +
      'Check the concentrations and path lengths typed in, and make a third solution.'
    );
  }
  return (
    `The solutions of ${name} give molar absorptivities that differ by up to ${spread}, more than their uncertainties allow: they do not follow Beer-Lambert together. ` +
    effect +
    'Check the concentrations and path lengths typed in, and make the solutions again.'
  );
}

function isBent(
  { species, solutions }: SpeciesStandard,
  { isBent: bent, curvature, straightUpTo, largestAbsorbance }: Linearity,
  nameOf: NameOf,
): string | null {
  if (!bent || !curvature) return null;
  const name = nameOf(species);
  const isLow = curvature.relativeDeparture < 0;
  const size = percentText(Math.abs(curvature.relativeDeparture));
  const from = straightUpTo
    ? `, and it shows above an absorbance of ${twoFigures(straightUpTo)}`
    : '';
  const two = solutions.length === 2 ? ' (told from the shapes of two solutions only)' : '';
  const cause = isLow ? 'as saturation and stray light do' : 'as molecules that associate do';
  const mend = straightUpTo
    ? `Set the upper absorbance to ${twoFigures(straightUpTo)}, state the stray light or let the fit find it, or make weaker solutions.`
    : 'State the stray light or let the fit find it, and make weaker solutions.';
  return (
    `The absorbance of the standards of ${name} does not grow as their concentration does: at ${twoFigures(largestAbsorbance)} they read ${size} too ${isLow ? 'low' : 'high'}${from}${two}, ${cause}. ` +
    `Its molar absorptivity is then too ${isLow ? 'low' : 'high'} at its strongest bands, and its amount too ${isLow ? 'high' : 'low'} by up to as much. ` +
    mend
  );
}

function offsetsDiffer(
  { species, solutions, offsets }: SpeciesStandard,
  nameOf: NameOf,
): string | null {
  if (solutions.length !== 2) return null;
  const largest = Math.max(...offsets.map(Math.abs));
  if (largest < offsetThatMoves) return null;
  return (
    `The spectra of the standards ${listText(solutions.map(({ standard }) => standard))} of ${nameOf(species)} differ by a constant, of ${twoFigures(1000 * largest)} mAU or more, and two cannot tell whose it is. ` +
    `With no baseline in the fit it goes into the amount of ${nameOf(species)}. ` +
    'Fit a baseline ("offset"), or record both against the blank again.'
  );
}
