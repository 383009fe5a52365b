import type { Sheet, SheetRun } from '../sheet/schema.ts';
import { quadratic } from '../spectrum/vectors.ts';
import { fractionGradient } from '../unmixing/fraction-gradient.ts';
import type { AliquotEstimate } from './aliquot-estimate.ts';
import { confidenceInterval } from './confidence-set.ts';
import { ratioFromFraction } from './fractions.ts';
import { type AliquotNumber, type PooledNumber, pooled, sumOfSquares } from './pooled.ts';
import type { Quantified, RatioResult, RunResult, SplitFraction } from './results.ts';

/** A sum of products below this many standard deviations cannot be split. */
const sumMustStand = 2.5;

/** Split, ratios and balance of one run from its aliquots. */
export function runResult(
  sheet: Sheet,
  run: SheetRun,
  aliquots: readonly AliquotEstimate[],
  products: readonly number[],
): RunResult {
  const usable = aliquots.filter((aliquot) => standsOut(aliquot, products));
  return {
    run: run.id,
    aliquots: aliquots.length,
    split: usable.length > 0 ? runSplit(usable, products) : [],
    ratios: usable.length > 0 ? runRatios(usable, products) : [],
    balance: {
      coresFound: found(sheet, run, aliquots, 'cores'),
      armsFound: found(sheet, run, aliquots, 'arms'),
    },
  };
}

function standsOut({ estimate }: AliquotEstimate, products: readonly number[]): boolean {
  const weights = new Float64Array(estimate.amounts.length);
  for (const k of products) weights[k] = 1;
  const sum = products.reduce((total, k) => total + estimate.amounts[k]!, 0);
  const variance = quadratic(weights, estimate.own) + quadratic(weights, estimate.common);
  return sum > sumMustStand * Math.sqrt(variance);
}

/** Share of species k among `among`, pooled over the aliquots. */
export function pooledFraction(
  aliquots: readonly AliquotEstimate[],
  k: number,
  among: readonly number[],
): PooledNumber {
  return pooled(
    aliquots.map(({ estimate, effects }): AliquotNumber => {
      const gradient = fractionGradient(estimate.amounts, k, among);
      const sum = among.reduce((total, l) => total + estimate.amounts[l]!, 0);
      return {
        value: estimate.amounts[k]! / sum,
        ownVariance: Math.max(quadratic(gradient, estimate.own), 0),
        df: estimate.df,
        effects: projected(gradient, effects),
      };
    }),
  );
}

/** gradientᵀ · effects, one entry a source. */
export function projected(gradient: Float64Array, effects: readonly Float64Array[]): Float64Array {
  const out = new Float64Array(effects[0]?.length ?? 0);
  for (let k = 0; k < effects.length; k++) {
    const weight = gradient[k]!;
    if (weight === 0) continue;
    const row = effects[k]!;
    for (let i = 0; i < row.length; i++) out[i]! += weight * row[i]!;
  }
  return out;
}

function runSplit(
  aliquots: readonly AliquotEstimate[],
  products: readonly number[],
): SplitFraction[] {
  const means = products.map((k) => pooledFraction(aliquots, k, products));
  const drawn = means.map(({ mean }) => Math.max(mean, 0));
  const total = drawn.reduce((sum, value) => sum + value, 0);
  return products.map((k, index) => ({
    species: aliquots[0]!.estimate.species[k]!,
    fraction: boundedFraction(means[index]!, drawn[index]! / total),
  }));
}

function runRatios(
  aliquots: readonly AliquotEstimate[],
  products: readonly number[],
): RatioResult[] {
  return products.flatMap((of, index) =>
    products.slice(index + 1).flatMap((to) => {
      const usable = aliquots.filter((aliquot) => standsOut(aliquot, [of, to]));
      const first = usable[0];
      if (!first) return [];
      const pair = pooledFraction(usable, of, [of, to]);
      const value = Math.min(Math.max(pair.mean, 0), 1);
      return [
        {
          of: first.estimate.species[of]!,
          to: first.estimate.species[to]!,
          value: ratioFromFraction(boundedFraction(pair, value)),
        },
      ];
    }),
  );
}

export function boundedFraction(number: PooledNumber, value: number): Quantified {
  const variance = number.ownVariance + sumOfSquares(number.effects);
  const sd = Math.sqrt(variance);
  const df =
    number.ownVariance > 0
      ? (variance / number.ownVariance) ** 2 * number.df
      : Number.POSITIVE_INFINITY;
  return {
    value,
    standardUncertainty: sd,
    interval95: confidenceInterval({
      estimate: number.mean,
      upper: 1,
      df,
      departure: (fraction) => (sd > 0 ? (number.mean - fraction) / sd : 0),
      sd: () => sd,
    }),
  };
}

/**
 * Cores or arms found in the flask over those charged; null where the sheet does not give charge
 * and volume. Species that do not absorb are not found this way: what they hold is missing here.
 */
function found(
  sheet: Sheet,
  run: SheetRun,
  aliquots: readonly AliquotEstimate[],
  what: 'cores' | 'arms',
): Quantified | null {
  const held = new Map(sheet.species.map((species) => [species.id, species[what]]));
  const charged = Object.entries(run.chargedMol ?? {}).reduce(
    (sum, [id, mol]) => sum + mol * (held.get(id) ?? 0),
    0,
  );
  const { volumeL } = run;
  if (!(charged > 0) || volumeL === undefined || aliquots.length === 0) return null;
  const number = pooled(
    aliquots.map(({ estimate, effects, dilution }): AliquotNumber => {
      const toShare = (dilution.factor * volumeL) / charged;
      const weights = Float64Array.from(
        estimate.species,
        (species) => (held.get(species) ?? 0) * toShare,
      );
      const value = estimate.amounts.reduce((sum, amount, k) => sum + amount * weights[k]!, 0);
      const byDilution = (value * dilution.relativeStandardUncertainty) ** 2;
      return {
        value,
        ownVariance: Math.max(quadratic(weights, estimate.own), 0) + byDilution,
        df: estimate.df,
        effects: projected(weights, effects),
      };
    }),
  );
  const variance = number.ownVariance + sumOfSquares(number.effects);
  const sd = Math.sqrt(variance);
  const interval95 = confidenceInterval({
    estimate: number.mean,
    upper: Number.POSITIVE_INFINITY,
    df: number.ownVariance > 0 ? (variance / number.ownVariance) ** 2 * number.df : Infinity,
    departure: (value) => (sd > 0 ? (number.mean - value) / sd : 0),
    sd: () => sd,
  });
  return { value: Math.max(number.mean, 0), standardUncertainty: sd, interval95 };
}
