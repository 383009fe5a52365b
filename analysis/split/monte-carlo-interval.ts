/** An interval read off draws, with the Monte Carlo standard error of each end. */
export interface DrawnInterval {
  readonly low: number;
  readonly high: number;
  readonly lowError: number;
  readonly highError: number;
}

/** What a sample of draws of one quantity tells. In the unit of the quantity. */
export interface DrawnDistribution {
  readonly mean: number;
  readonly standardDeviation: number;
  /** As much below as above. */
  readonly symmetric95: DrawnInterval;
  /** The narrowest of all that hold 95 %: the one to take where the distribution leans on a bound. */
  readonly shortest95: DrawnInterval;
}

const level = 0.95;
const batches = 10;

/**
 * Mean, standard deviation and 95 % coverage intervals of draws (JCGM 101:2008, 7.6 and 7.7).
 * Infinite draws (a ratio over nothing) sort to the end and make mean and deviation not finite.
 *
 * The error of an end of the symmetric interval is from the ranks that lie one standard deviation
 * of the binomial count to either side; that of the shortest from the scatter between ten batches,
 * whose ends close in with the cube root of the number of draws only (Kim and Pollard, Ann. Statist. 18
 * (1990) 191).
 *
 * @param draws 100 or more, in the order in which they were drawn
 */
export function drawnDistribution(draws: Float64Array): DrawnDistribution {
  if (draws.length < 10 * batches) throw new Error(`${draws.length} draws are too few to tell`);
  const mean = draws.reduce((sum, value) => sum + value, 0) / draws.length;
  const squares = draws.reduce((sum, value) => sum + (value - mean) ** 2, 0);
  const sorted = draws.toSorted();
  return {
    mean,
    standardDeviation: Math.sqrt(squares / (draws.length - 1)),
    symmetric95: symmetricInterval(sorted),
    shortest95: { ...shortestEnds(sorted), ...errorsOfShortest(draws) },
  };
}

function symmetricInterval(sorted: Float64Array): DrawnInterval {
  const size = sorted.length;
  const held = Math.floor(level * size + 0.5);
  const below = Math.floor((size - held + 1) / 2) - 1;
  const ranks = Math.sqrt((size * (1 - level) * (1 + level)) / 4);
  const errorAt = (rank: number): number => {
    const from = sorted[Math.max(Math.floor(rank - ranks), 0)]!;
    const to = sorted[Math.min(Math.ceil(rank + ranks), size - 1)]!;
    return to === from ? 0 : (to - from) / 2;
  };
  return {
    low: sorted[below]!,
    high: sorted[below + held]!,
    lowError: errorAt(below),
    highError: errorAt(below + held),
  };
}

function shortestEnds(sorted: Float64Array): { low: number; high: number } {
  const held = Math.floor(level * sorted.length + 0.5);
  let best = { low: sorted[0]!, high: sorted[held]! };
  for (let r = 1; r + held < sorted.length; r++) {
    const [low, high] = [sorted[r]!, sorted[r + held]!];
    if (high - low < best.high - best.low) best = { low, high };
  }
  return best;
}

function errorsOfShortest(draws: Float64Array): { lowError: number; highError: number } {
  const length = Math.floor(draws.length / batches);
  const ends = Array.from({ length: batches }, (_, batch) =>
    shortestEnds(draws.slice(batch * length, (batch + 1) * length).sort()),
  );
  const errorOf = (values: readonly number[]): number => {
    const mean = values.reduce((sum, value) => sum + value, 0) / batches;
    const squares = values.reduce((sum, value) => sum + (value - mean) ** 2, 0);
    return Math.sqrt(squares / (batches - 1)) / Math.cbrt(batches);
  };
  return {
    lowError: errorOf(ends.map(({ low }) => low)),
    highError: errorOf(ends.map(({ high }) => high)),
  };
}
