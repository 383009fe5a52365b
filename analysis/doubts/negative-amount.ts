import { normalQuantile } from '../distributions/normal.ts';
import type { DoubtTest } from './evidence.ts';
import { amountText } from './wording.ts';

const falseAlarm = 0.01;

/** An unconstrained amount below zero by more than its uncertainty allows (one-sided, 1 % false alarms). */
export const negativeAmount: DoubtTest = ({ unmixing, amounts, nameOf }) => {
  const limit = normalQuantile(1 - falseAlarm);
  return unmixing.species.flatMap((species, k) => {
    const [amount, u] = [unmixing.amounts[k]!, amounts[k]!.standardUncertainty];
    if (!(amount < -limit * u)) return [];
    return [
      {
        code: 'negative-amount' as const,
        message:
          `Left free, the amount of ${nameOf(species)} comes out negative (-${amountText(-amount)}), by ${(-amount / u).toFixed(1)} times its uncertainty. ` +
          'Something in the model is not right: a baseline, a wavelength offset, a wrong standard, or a species without one; the other amounts may be off too. ' +
          'Look at the residual, and check the standards of the species that overlap with it.',
        species: [species],
      },
    ];
  });
};
