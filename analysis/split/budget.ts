import { correlate } from '../spectrum/correlated-noise.ts';
import { dot, quadratic } from '../spectrum/vectors.ts';
import type { ErrorSources } from '../unmixing/error-sources.ts';
import { fractionGradient } from '../unmixing/fraction-gradient.ts';
import { spreadOut } from '../unmixing/noise-of-fit.ts';
import { factorise } from '../unmixing/orthogonal.ts';
import type { Unmixing } from '../unmixing/unmix.ts';
import { withPriors } from '../unmixing/weighted-fit.ts';
import type { BudgetShare } from './results.ts';
import { projected } from './runs.ts';

/**
 * What the variance of the first split fraction is made of (GUM, first order): the fraction's
 * gradient against each source of error. The baseline and a free wavelength offset are given what
 * they add to the noise's part. Shares sum to 1; empty where there is no split.
 */
export function budgetOf(
  unmixing: Unmixing,
  sources: ErrorSources,
  products: readonly number[],
): BudgetShare[] {
  const [first] = products;
  const sum = products.reduce((total, k) => total + Math.max(unmixing.amounts[k]!, 0), 0);
  if (first === undefined || products.length < 2 || !(sum > 0)) return [];
  const gradient = fractionGradient(unmixing.amounts, first, products);
  const parts = [...pointParts(unmixing, gradient), ...standardsParts(sources, gradient)];
  const unseen = quadratic(gradient, sources.unseen);
  if (unseen > 0) parts.push({ source: 'standards of the same shape', variance: unseen });
  const total = parts.reduce((all, { variance }) => all + variance, 0);
  if (!(total > 0)) return [];
  return parts
    .filter(({ variance }) => variance > 0)
    .map(({ source, variance }) => ({ source, share: variance / total }))
    .sort((a, b) => b.share - a.share);
}

interface Part {
  readonly source: string;
  readonly variance: number;
}

function pointParts(unmixing: Unmixing, gradient: Float64Array): Part[] {
  const { baseline, species, lackOfFit, shiftNm } = unmixing;
  const size = species.length;
  const alone = noiseVariance(unmixing, size, gradient);
  const withBaseline = noiseVariance(unmixing, size + baseline.length, gradient);
  const shifts = shiftNm.sd > 0 ? 1 : 0;
  const withShift =
    shifts === 1
      ? noiseVariance(unmixing, size + baseline.length + shifts, gradient)
      : withBaseline;
  const columns = unmixing.fit.whitened.length;
  const all =
    columns > size + baseline.length + shifts
      ? noiseVariance(unmixing, columns, gradient)
      : withShift;
  const fits = 1 - lackOfFit;
  return [
    { source: 'photometric noise', variance: fits * alone },
    { source: 'baseline', variance: fits * Math.max(withBaseline - alone, 0) },
    { source: 'wavelength offset', variance: fits * Math.max(withShift - withBaseline, 0) },
    { source: 'stray light', variance: fits * Math.max(all - withShift, 0) },
    { source: 'lack of fit', variance: lackOfFit * all },
  ];
}

/** Variance of the fraction from what the points have for themselves if only these first columns were fitted. */
function noiseVariance(
  { fit, species, at, correlation, pointVariance }: Unmixing,
  columns: number,
  gradient: Float64Array,
): number {
  const priors = fit.priors.filter(({ parameter }) => parameter < columns);
  // all columns were fitted: their gain is there, else that of the first alone has to be found
  const isWhole = columns === fit.whitened.length;
  const rows = isWhole
    ? fit.gain
    : factorise(withPriors(fit.whitened.slice(0, columns), priors)).pseudoInverse();
  const points = fit.variance.length;
  const gain = new Float64Array(points);
  for (let k = 0; k < species.length; k++) {
    const row = rows[k]!;
    const weight = gradient[k]!;
    for (let i = 0; i < points; i++) gain[i]! += weight * row[i]!;
  }
  for (let i = 0; i < points; i++) {
    const unit = isWhole ? pointVariance[i]! : pointVariance[i]! / fit.variance[i]!;
    gain[i]! *= Math.sqrt(unit);
  }
  let fromPriors = 0;
  for (let m = 0; m < priors.length; m++) {
    let sum = 0;
    for (let k = 0; k < species.length; k++) {
      sum += gradient[k]! * (isWhole ? fit.priorGain[k]![m]! : rows[k]![points + m]!);
    }
    fromPriors += sum * sum;
  }
  const spread = spreadOut(at, gain);
  return dot(spread, correlate(correlation.rho, spread)) + fromPriors;
}

function standardsParts({ scale, standardsNoise }: ErrorSources, gradient: Float64Array): Part[] {
  const bySource = new Map<string, number>();
  for (const { source, effect } of scale) {
    const change = effect.reduce((sum, value, k) => sum + value * gradient[k]!, 0);
    bySource.set(source, (bySource.get(source) ?? 0) + change);
  }
  const noise = standardsNoise.reduce((sum, { effects }) => {
    return sum + projected(gradient, effects).reduce((all, value) => all + value * value, 0);
  }, 0);
  return [
    ...[...bySource].map(([source, change]) => ({ source, variance: change * change })),
    { source: 'noise of the standards', variance: noise },
  ];
}
