import { type AliquotResult, prepare, quantifyAliquot } from '../../analysis/index.ts';
import { type Conditions, simulated } from '../analysis/simulated.ts';

const noFiles = new Map();

export interface Redraw {
  readonly result: AliquotResult;
  readonly truth: ReturnType<typeof simulated>['truth'];
}

/** Draws standards, offset and noise anew `draws` times, and measures each through the whole pipeline. */
export function* redrawn(
  draws: number,
  changes: Partial<Conditions>,
  firstSeed = 1,
): Generator<Redraw> {
  for (let draw = 0; draw < draws; draw++) {
    const { sheet, truth } = simulated({ ...changes, seed: firstSeed + draw });
    const aliquot = sheet.aliquots?.[0];
    if (!aliquot) throw new Error('no aliquot');
    yield { result: quantifyAliquot(prepare(sheet, noFiles), aliquot, noFiles).result, truth };
  }
}

export interface Coverage {
  readonly inside: number;
  readonly draws: number;
}

/** How often the interval of the mono fraction held the truth. */
export function coverageOf(draws: number, changes: Partial<Conditions>, firstSeed = 1): Coverage {
  const { fraction = 0.5 } = changes;
  let inside = 0;
  for (const { result } of redrawn(draws, changes, firstSeed)) {
    const [low, high] = result.split[0]?.fraction.interval95 ?? [null, null];
    // the ends of intervals at a bound are found by bisection
    if ((low ?? 0) <= fraction + 1e-9 && fraction - 1e-9 <= (high ?? 1)) inside++;
  }
  return { inside, draws };
}

export function percent(share: number): string {
  return `${(100 * share).toFixed(1)} %`;
}

/** Monte Carlo standard deviation of a share. */
export function shareError(share: number, draws: number): number {
  return Math.sqrt((share * (1 - share)) / draws);
}
