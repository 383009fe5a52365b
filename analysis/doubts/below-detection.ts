import type { DoubtTest } from './evidence.ts';
import { amountText } from './wording.ts';

/** A species whose estimate does not pass the decision limit (5 % false alarms, ISO 11843). */
export const belowDetection: DoubtTest = ({ unmixing, amounts, nameOf }) =>
  unmixing.species.flatMap((species, k) => {
    const amount = amounts[k];
    if (!amount || amount.detected) return [];
    const limit =
      amount.upper === null
        ? ''
        : ` It is less than ${amountText(amount.upper)} in the cuvette (95 %).`;
    return [
      {
        code: 'below-detection' as const,
        message:
          `${nameOf(species)} cannot be told from nothing in this spectrum.${limit} ` +
          'An upper limit is given in place of an amount; a ratio to it has no upper end. ' +
          'To find less of it, dilute less, average more scans, or widen the window to where it absorbs most.',
        species: [species],
      },
    ];
  });
