import { takesPart } from '../unmixing/error-sources.ts';
import type { Doubt } from './doubt.ts';
import type { DoubtTest, Evidence } from './evidence.ts';
import { percentText, twoFigures } from './wording.ts';

/** The uncertainty of one is at least this many times what it were with the other known. */
const inflationOfNote = 5;
/** and the share between the two is uncertain by at least this (standard uncertainty). */
const shareOfNote = 0.02;
/** A pair that holds less than this of everything found is not worth a doubt. */
const pairOfNote = 0.05;

/**
 * Two standards that the spectrum cannot tell apart at this noise: their estimates depend on each
 * other (inflation 1/√(1 - ρ²), ρ the correlation of the two amounts) *and* the share between them
 * is uncertain. A statement on the design, not a test on the data: it has no false alarms by noise.
 */
export const lookalikeStandards: DoubtTest = (evidence) => {
  const { species } = evidence.unmixing;
  return species.flatMap((_, k) =>
    species.slice(k + 1).flatMap((__, step) => pairDoubt(evidence, k, k + 1 + step)),
  );
};

function pairDoubt({ unmixing, sources, nameOf }: Evidence, k: number, l: number): Doubt[] {
  const { species, drawn, fit } = unmixing;
  const [a, b] = [species[k]!, species[l]!];
  const pair = drawn[k]! + drawn[l]!;
  const all = drawn.reduce((sum, amount) => sum + amount, 0);
  if (pair < pairOfNote * all) return [];
  const unseen = fit.unseen.some((direction) => [k, l].every((m) => takesPart(direction, m)));
  const inflation = unseen ? Number.POSITIVE_INFINITY : inflationOf(sources.points, k, l);
  const share = unseen ? 1 : shareUncertainty(sources.points, drawn, k, l);
  if (inflation < inflationOfNote || share < shareOfNote) return [];
  const [names, much] = [`${nameOf(a)} and ${nameOf(b)}`, twoFigures(inflation)];
  const seen = unseen
    ? `The standards of ${names} have the same shape in this window: the spectrum cannot say how much is which.`
    : `The standards of ${names} are so alike in this window that each amount is ${much} times as uncertain as it would be with the other known; the share between the two is uncertain by ${percentText(share)} (standard uncertainty).`;
  return [
    {
      code: 'lookalike-standards',
      message: `${seen} Their sum is still good, their ratio is not. Widen the window to where they differ, average more scans, or check that the two standards are not of the same substance.`,
      species: [a, b],
    },
  ];
}

function inflationOf(covariance: readonly Float64Array[], k: number, l: number): number {
  const squared = covariance[k]![l]! ** 2 / (covariance[k]![k]! * covariance[l]![l]!);
  return 1 / Math.sqrt(Math.max(1 - squared, 1e-16));
}

/** Standard uncertainty of c_k / (c_k + c_l) from the points alone. */
function shareUncertainty(
  covariance: readonly Float64Array[],
  drawn: Float64Array,
  k: number,
  l: number,
): number {
  const [a, b] = [drawn[k]!, drawn[l]!];
  const sum = a + b;
  const variance =
    b * b * covariance[k]![k]! - 2 * a * b * covariance[k]![l]! + a * a * covariance[l]![l]!;
  return Math.sqrt(Math.max(variance, 0)) / (sum * sum);
}
