import { normalQuantile } from '../distributions/normal.ts';
import { quadratic } from '../spectrum/vectors.ts';
import { fractionGradient } from '../unmixing/fraction-gradient.ts';
import { type Narrowing, narrowedFits } from '../unmixing/narrowed-windows.ts';
import type { DoubtTest } from './evidence.ts';
import { nmText, percentText } from './wording.ts';

/** The windows tried: a fifth and two fifths off either end, a fifth off both. */
const narrowings: readonly Narrowing[] = [
  { below: 0.2, above: 0 },
  { below: 0.4, above: 0 },
  { below: 0, above: 0.2 },
  { below: 0, above: 0.4 },
  { below: 0.2, above: 0.2 },
];
/** Chance that any of them moves so far by noise alone, at most (Bonferroni; they lean on each other). */
const falseAlarm = 0.01;
const limit = normalQuantile(1 - falseAlarm / (2 * narrowings.length));
/** A change must also be of this many standard uncertainties of the answer: half its 95 % interval. */
const changeOfNote = 1.96;

/**
 * The share of the first product moves, when the window is narrowed, by more than noise lets it and by
 * more than its own uncertainty: some part of the window says something else than the rest.
 */
export const windowSensitive: DoubtTest = (evidence) => {
  const { crude, unmixing, products, nameOf } = evidence;
  const [first] = products;
  const share = products.reduce((sum, k) => sum + (unmixing.amounts[k] ?? 0), 0);
  if (first === undefined || products.length < 2 || !(share > 0)) return [];
  const gradient = fractionGradient(unmixing.amounts, first, products);
  const widening = Number.isFinite(unmixing.df) ? 1 + 2.5 / unmixing.df : 1;
  const own = Math.sqrt(quadratic(gradient, evidence.covariance));
  const moved = narrowedFits(unmixing, gradient, narrowings, changeOfNote * own)
    .filter(({ change, sd }) => Math.abs(change) > limit * widening * sd)
    .sort((a, b) => Math.abs(b.change / b.sd) - Math.abs(a.change / a.sd))[0];
  if (!moved) return [];
  const nmAt = (point: number): number => crude.wavelengthNm[unmixing.at[point] ?? 0] ?? 0;
  const whole = (unmixing.amounts[first] ?? 0) / share;
  const left = [
    ...(moved.from > 0 ? [[nmAt(0), nmAt(moved.from - 1)]] : []),
    ...(moved.to < unmixing.at.length - 1
      ? [[nmAt(moved.to + 1), nmAt(unmixing.at.length - 1)]]
      : []),
  ];
  const name = nameOf(unmixing.species[first] ?? '');
  return [
    {
      code: 'window-sensitive',
      message:
        `Fitted from ${nmText(nmAt(moved.from))} to ${nmText(nmAt(moved.to))} nm only, ${name} would be ${percentText(whole + moved.change)} of the products in place of ${percentText(whole)}, more than noise and the interval allow. ` +
        'Some part of the window does not follow the standards, and the answer depends on whether it is in. ' +
        'Look at the residual there, leave out the part that you trust least (see where the answer holds), or find what absorbs there.',
      atNm: left.flat(),
      species: [unmixing.species[first] ?? ''],
    },
  ];
};
