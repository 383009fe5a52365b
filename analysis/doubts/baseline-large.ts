import type { DoubtTest } from './evidence.ts';
import { percentText } from './wording.ts';

/** The baseline reaches this share of the largest absorbance fitted. */
const shareOfNote = 0.1;

/** A baseline that carries a large part of the signal. */
export const baselineLarge: DoubtTest = ({ unmixing, crude }) => {
  const { at, fit, baseline } = unmixing;
  const size = unmixing.species.length;
  let largestBaseline = 0;
  let largestSignal = 0;
  for (const [j, i] of at.entries()) {
    let sum = 0;
    for (const [m, { value }] of baseline.entries()) {
      sum += value * fit.whitened[size + m]![j]! * Math.sqrt(fit.variance[j]!);
    }
    largestBaseline = Math.max(largestBaseline, Math.abs(sum));
    largestSignal = Math.max(largestSignal, crude.values[i]!);
  }
  const share = largestBaseline / largestSignal;
  if (!(share > shareOfNote)) return [];
  return [
    {
      code: 'baseline-large',
      message:
        `The baseline reaches ${percentText(share)} of the largest absorbance. ` +
        'A baseline of the wrong form takes from one species or gives to another, most of all to the small ones. ' +
        'Record the blank again with the same cuvette and solvent, filter a turbid solution, or choose the form of baseline that suits (scatter for turbidity).',
    },
  ];
};
