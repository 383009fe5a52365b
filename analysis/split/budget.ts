import type { ErrorSources } from '../unmixing/error-sources.ts';
import { factorise } from '../unmixing/orthogonal.ts';
import type { Unmixing } from '../unmixing/unmix.ts';
import { quadratic } from './amounts.ts';
import { fractionGradient } from './fractions.ts';
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
  const { fit, baseline, species, excess } = unmixing;
  const columns = fit.whitened;
  const size = species.length;
  const all = noiseVariance(unmixing, columns, gradient);
  const withBaseline = noiseVariance(unmixing, columns.slice(0, size + baseline.length), gradient);
  const alone = noiseVariance(unmixing, columns.slice(0, size), gradient);
  return [
    { source: 'photometric noise', variance: alone * Math.min(excess, 1) },
    { source: 'baseline', variance: Math.max(withBaseline - alone, 0) * Math.min(excess, 1) },
    {
      source: 'wavelength offset',
      variance: Math.max(all - withBaseline, 0) * Math.min(excess, 1),
    },
    { source: 'lack of fit', variance: all * Math.max(excess - 1, 0) },
  ];
}

/** Variance of the fraction from photometric noise if only these whitened columns were fitted. */
function noiseVariance(
  { fit, species }: Unmixing,
  whitened: readonly Float64Array[],
  gradient: Float64Array,
): number {
  const rows = factorise(whitened).pseudoInverse();
  let sum = 0;
  for (const [i, variance] of fit.variance.entries()) {
    let gain = 0;
    for (let k = 0; k < species.length; k++) gain += gradient[k]! * rows[k]![i]!;
    sum += gain * gain * (fit.noiseVariance[i]! / variance);
  }
  return sum;
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
