import { normalQuantile } from '../distributions/normal.ts';
import { studentTUpper } from '../distributions/student-t.ts';
import { quadratic } from '../spectrum/vectors.ts';
import type { AliquotEstimate } from './aliquot-estimate.ts';
import { plainQuantile, studentFactor } from './confidence-set.ts';
import { type AliquotNumber, type PooledNumber, pooled, sumOfSquares } from './pooled.ts';
import type { ComparisonResult, Quantified } from './results.ts';
import { boundedFraction, pooledFraction, projected } from './runs.ts';

/** A logarithm is taken only of a ratio whose two amounts stand this many standard deviations from nothing. */
const standsForLogarithm = 4;

interface RunAliquots {
  readonly run: string;
  readonly aliquots: readonly AliquotEstimate[];
}

/**
 * Every pair of runs, every pair of products: ratio of the ratios. Welch's test on the logarithm of
 * the ratio; the standards' errors enter as the *difference* of their effects on the two runs, so
 * that what is common cancels. Where a product is near nothing no logarithm exists: the interval
 * is then made from the ends of the two runs' own (each at 97.5 %, Bonferroni), and the test is on
 * the fractions.
 */
export function comparisonsOf(
  runs: readonly RunAliquots[],
  products: readonly number[],
): ComparisonResult[] {
  const pairs = products.flatMap((of, index) =>
    products.slice(index + 1).map((to) => [of, to] as const),
  );
  return runs.flatMap((first, index) =>
    runs
      .slice(index + 1)
      .flatMap((second) => pairs.flatMap(([of, to]) => comparison(first, second, of, to))),
  );
}

function comparison(
  first: RunAliquots,
  second: RunAliquots,
  of: number,
  to: number,
): ComparisonResult[] {
  const [a, b] = [present(first, of, to), present(second, of, to)];
  const species = (first.aliquots[0] ?? second.aliquots[0])?.estimate.species;
  if (!species || a.length === 0 || b.length === 0) return [];
  const measured = [...a, ...b].every((aliquot) => canTakeLogarithm(aliquot, of, to))
    ? byLogarithm(pooledLogRatio(a, of, to), pooledLogRatio(b, of, to))
    : byFractions(pooledFraction(a, of, [of, to]), pooledFraction(b, of, [of, to]));
  return [{ runs: [first.run, second.run], of: species[of]!, to: species[to]!, ...measured }];
}

function present({ aliquots }: RunAliquots, of: number, to: number): AliquotEstimate[] {
  return aliquots.filter(({ estimate }) => estimate.amounts[of]! + estimate.amounts[to]! > 0);
}

function canTakeLogarithm({ estimate }: AliquotEstimate, of: number, to: number): boolean {
  return [of, to].every((k) => {
    const sd = Math.sqrt(estimate.own[k]![k]! + estimate.common[k]![k]!);
    return estimate.amounts[k]! > standsForLogarithm * sd;
  });
}

function pooledLogRatio(
  aliquots: readonly AliquotEstimate[],
  of: number,
  to: number,
): PooledNumber {
  return pooled(
    aliquots.map(({ estimate, effects }): AliquotNumber => {
      const gradient = new Float64Array(estimate.amounts.length);
      gradient[of] = 1 / estimate.amounts[of]!;
      gradient[to] = -1 / estimate.amounts[to]!;
      return {
        value: Math.log(estimate.amounts[of]! / estimate.amounts[to]!),
        ownVariance: Math.max(quadratic(gradient, estimate.own), 0),
        df: estimate.df,
        effects: projected(gradient, effects),
      };
    }),
  );
}

type Measured = Pick<ComparisonResult, 'ratioOfRatios' | 'pValue'>;

function byLogarithm(a: PooledNumber, b: PooledNumber): Measured {
  const difference = a.mean - b.mean;
  const { variance, df } = differenceVariance(a, b);
  const sd = Math.sqrt(variance);
  const half = studentFactor(df) * plainQuantile * sd;
  const ratio = Math.exp(difference);
  return {
    ratioOfRatios: {
      value: ratio,
      standardUncertainty: ratio * sd,
      interval95: [Math.exp(difference - half), Math.exp(difference + half)],
    },
    pValue: sd > 0 ? 2 * studentTUpper(Math.abs(difference) / sd, df) : null,
  };
}

/** Welch-Satterthwaite over what each run has for itself; what both share enters as its difference, known. */
function differenceVariance(a: PooledNumber, b: PooledNumber): { variance: number; df: number } {
  const shared = sumOfSquares(a.effects.map((effect, i) => effect - b.effects[i]!));
  const variance = a.ownVariance + b.ownVariance + shared;
  const spread = a.ownVariance ** 2 / a.df + b.ownVariance ** 2 / b.df;
  return { variance, df: spread > 0 ? variance ** 2 / spread : Number.POSITIVE_INFINITY };
}

function byFractions(a: PooledNumber, b: PooledNumber): Measured {
  const { variance, df } = differenceVariance(a, b);
  const sd = Math.sqrt(variance);
  const wide = (number: PooledNumber) => {
    const clamped = Math.min(Math.max(number.mean, 0), 1);
    // 97.5 % each in place of 95 %: a standard deviation larger by the ratio of the quantiles
    const factor = normalQuantile(1 - 0.025 / 2) / plainQuantile;
    return boundedFraction(
      {
        ...number,
        ownVariance: number.ownVariance * factor ** 2,
        effects: number.effects.map((effect) => effect * factor),
      },
      clamped,
    );
  };
  return {
    ratioOfRatios: oddsOver(wide(a), wide(b)),
    pValue: sd > 0 ? 2 * studentTUpper(Math.abs(a.mean - b.mean) / sd, df) : null,
  };
}

function oddsOver(a: Quantified, b: Quantified): Quantified {
  const odds = (fraction: number | null): number =>
    fraction === null || fraction >= 1 ? Number.POSITIVE_INFINITY : fraction / (1 - fraction);
  const bounded = (value: number): number | null => (Number.isFinite(value) ? value : null);
  const value = odds(a.value) / odds(b.value);
  return {
    value: bounded(value),
    standardUncertainty: null,
    interval95: [
      bounded(odds(a.interval95[0]) / odds(b.interval95[1])) ?? 0,
      bounded(odds(a.interval95[1]) / odds(b.interval95[0])),
    ],
  };
}
