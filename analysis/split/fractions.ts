import { quadratic } from '../spectrum/vectors.ts';
import { type AmountEstimate, varianceOf } from './amounts.ts';
import { confidenceInterval } from './confidence-set.ts';
import type { UncertainRatio } from './fieller.ts';
import type { Quantified, RatioResult, SplitFraction } from './results.ts';

/** Below this many standard deviations the sum cannot be told from nothing, and no fraction bounded. */
const sumMustStand = 2.5;

/** Share of each product among all products; `products` are positions in the estimate. */
export function splitOf(estimate: AmountEstimate, products: readonly number[]): SplitFraction[] {
  const total = products.reduce((sum, k) => sum + estimate.drawn[k]!, 0);
  return products.map((k) => ({
    species: estimate.species[k]!,
    fraction: fractionAmong(estimate, k, products, total),
  }));
}

/** Ratio of every pair of products, in the order of the species. */
export function ratiosOf(estimate: AmountEstimate, products: readonly number[]): RatioResult[] {
  return products.flatMap((of, index) =>
    products.slice(index + 1).map((to) => ({
      of: estimate.species[of]!,
      to: estimate.species[to]!,
      value: ratioOf(estimate, of, to),
    })),
  );
}

/**
 * k over the sum of `among`, with Fieller's interval kept within [0, 1]: the test of a supposed
 * fraction f is on T(f) = c_k - f Σc, whose variance is exact; near 0 and 1 Feldman and Cousins'.
 */
export function fractionAmong(
  estimate: AmountEstimate,
  k: number,
  among: readonly number[],
  drawnTotal: number,
): Quantified {
  const sumWeights = weightsOf(estimate, among);
  const sum = dot(sumWeights, estimate.amounts);
  const spread = Math.sqrt(varianceOf(estimate, sumWeights).variance);
  const value = drawnTotal > 0 ? estimate.drawn[k]! / drawnTotal : null;
  if (!(sum > sumMustStand * spread) || value === null) {
    return { value, standardUncertainty: null, interval95: [0, 1] };
  }
  const test = testOf(estimate, k, sumWeights);
  const raw = estimate.amounts[k]! / sum;
  const at = test(raw);
  const interval95 = confidenceInterval({
    estimate: raw,
    upper: 1,
    df: at.df,
    departure: (fraction) => {
      const { distance, variance } = test(fraction);
      return variance > 0 ? distance / Math.sqrt(variance) : 0;
    },
    sd: (fraction) => Math.sqrt(test(fraction).variance) / sum,
    ratio: ratioOver(estimate, k, sumWeights),
  });
  return { value, standardUncertainty: Math.sqrt(at.variance) / sum, interval95 };
}

/** T(f) = c_k - f Σc with its variance, a parabola in f, and the degrees of freedom behind it. */
function testOf(estimate: AmountEstimate, k: number, sumWeights: Float64Array) {
  const unit = new Float64Array(sumWeights.length);
  unit[k] = 1;
  const parabola = (matrix: readonly Float64Array[]) => {
    const square = quadratic(unit, matrix);
    const cross = quadratic(unit, matrix, sumWeights);
    const plain = quadratic(sumWeights, matrix);
    return (f: number) => Math.max(square - f * (2 * cross - f * plain), 0);
  };
  const [own, common] = [parabola(estimate.own), parabola(estimate.common)];
  const [amount, sum] = [estimate.amounts[k]!, dot(sumWeights, estimate.amounts)];
  return (fraction: number) => {
    const ofPoints = own(fraction);
    const variance = ofPoints + common(fraction);
    const isKnown = ofPoints === 0 || estimate.df === Number.POSITIVE_INFINITY;
    return {
      distance: amount - fraction * sum,
      variance,
      df: isKnown ? Number.POSITIVE_INFINITY : (variance / ofPoints) ** 2 * estimate.df,
    };
  };
}

/** Amount k over a sum of amounts. */
function ratioOver(estimate: AmountEstimate, k: number, sumWeights: Float64Array): UncertainRatio {
  const { amounts, own, common } = estimate;
  const unit = new Float64Array(amounts.length);
  unit[k] = 1;
  const covarianceOf = (a: Float64Array, b: Float64Array): number =>
    quadratic(a, own, b) + quadratic(a, common, b);
  return {
    numerator: amounts[k]!,
    denominator: dot(sumWeights, amounts),
    numeratorVariance: covarianceOf(unit, unit),
    denominatorVariance: covarianceOf(sumWeights, sumWeights),
    covariance: covarianceOf(unit, sumWeights),
  };
}

function ratioOf(estimate: AmountEstimate, of: number, to: number): Quantified {
  const drawnTotal = estimate.drawn[of]! + estimate.drawn[to]!;
  const fraction = fractionAmong(estimate, of, [of, to], drawnTotal);
  return ratioFromFraction(fraction);
}

/** f / (1 - f) is monotone, so the ends of the interval go over as they are; 1 becomes no bound. */
export function ratioFromFraction({
  value,
  standardUncertainty,
  interval95,
}: Quantified): Quantified {
  const odds = (fraction: number | null): number | null =>
    fraction === null || fraction >= 1 ? null : fraction / (1 - fraction);
  const ratio = odds(value);
  return {
    value: ratio,
    standardUncertainty:
      ratio === null || value === null || standardUncertainty === null
        ? null
        : standardUncertainty / (1 - value) ** 2,
    interval95: [odds(interval95[0]), odds(interval95[1])],
  };
}

function weightsOf({ amounts }: AmountEstimate, among: readonly number[]): Float64Array {
  const weights = new Float64Array(amounts.length);
  for (const k of among) weights[k] = 1;
  return weights;
}

function dot(a: Float64Array, b: Float64Array): number {
  return a.reduce((sum, value, k) => sum + value * b[k]!, 0);
}
