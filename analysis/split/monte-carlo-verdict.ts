import type { DrawnDistribution, DrawnInterval } from './monte-carlo-interval.ts';
import type { Quantified } from './results.ts';

/**
 * How an interval by redraws stands to the one by the fit. `near-bound`: the two mean different
 * things there, and only the redraws' scatter is shown.
 */
export type Verdict = 'agree' | 'differ' | 'near-bound' | 'unbounded';

export interface Comparison {
  readonly verdict: Verdict;
  /** The interval of the redraws to hold against the fit's: the shortest near a bound, else the symmetric. */
  readonly interval: DrawnInterval;
  /** Width by redraws over width by the fit; null where either has none. */
  readonly widths: number | null;
}

/** Within so many standard uncertainties of a bound the fit's interval is Feldman and Cousins'. */
const nearBound = 4;
/** Monte Carlo errors by which an end may be off by chance: 1 in 370 for each. */
const chance = 3;
/** Share of the fit's interval below which a difference is of no consequence. */
const noConsequence = 0.02;

/** @param upper bound above: 1 for a fraction, Infinity for an amount or a ratio */
export function compared(
  byFit: Quantified,
  { symmetric95, shortest95 }: DrawnDistribution,
  upper: number,
): Comparison {
  const [low, high] = byFit.interval95;
  if (low === null || high === null || !Number.isFinite(symmetric95.high)) {
    return { verdict: 'unbounded', interval: symmetric95, widths: null };
  }
  const reach = nearBound * (byFit.standardUncertainty ?? Number.POSITIVE_INFINITY);
  const value = byFit.value ?? 0;
  if (low <= 0 || high >= upper || value < reach || value > upper - reach) {
    return { verdict: 'near-bound', interval: shortest95, widths: null };
  }
  const allowed = noConsequence * (high - low);
  const isClose =
    Math.abs(symmetric95.low - low) <= allowed + chance * symmetric95.lowError &&
    Math.abs(symmetric95.high - high) <= allowed + chance * symmetric95.highError;
  return {
    verdict: isClose ? 'agree' : 'differ',
    interval: symmetric95,
    widths: (symmetric95.high - symmetric95.low) / (high - low),
  };
}

/** What the comparison comes to, in a sentence or a few. */
export function verdictText(
  comparisons: readonly { readonly name: string; readonly comparison: Comparison }[],
  draws: number,
): string {
  const named = (verdict: Verdict): string =>
    comparisons
      .filter(({ comparison }) => comparison.verdict === verdict)
      .map(({ name }) => name)
      .join(', ');
  const differing = comparisons.filter(({ comparison }) => comparison.verdict === 'differ');
  const sentences: string[] = [];
  if (named('agree') !== '' && differing.length === 0) {
    sentences.push(
      `Where they can be compared, the intervals by the fit and by ${draws} redraws agree within the chance of the draws.`,
    );
  }
  if (differing.length > 0) {
    const list = differing.map(({ name, comparison }) => `${name} (${widthText(comparison)})`);
    sentences.push(
      `The redraws differ by more than chance from the fit for ${list.join('; ')}. The fit carries errors on as if their effects were straight lines; where the two differ, take the wider one and look at the doubts.`,
    );
  }
  if (named('near-bound') !== '') {
    sentences.push(
      `Near a bound (${named('near-bound')}) the two intervals answer different questions: the fit's is made to hold the true value in 95 % of repeated measurements (Feldman and Cousins), the redraws show where 95 % of repeated answers fall. They need not be equal there.`,
    );
  }
  if (named('unbounded') !== '') {
    sentences.push(`Not bounded, and so not compared: ${named('unbounded')}.`);
  }
  return sentences.join(' ');
}

function widthText({ widths }: Comparison): string {
  if (widths === null) return 'no width to compare';
  const percent = Math.round(100 * Math.abs(widths - 1));
  if (percent < 2) return 'of the same width, but displaced';
  return `${percent} % ${widths > 1 ? 'wider' : 'narrower'}`;
}
