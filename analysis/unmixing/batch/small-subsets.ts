import { householder } from '../householder.ts';

/** More constrained unknowns would make too many subsets to look through for each spectrum. */
export const mostConstrained = 3;

/**
 * A small triangular least-squares problem |R x - z| of which the last unknowns may not be negative,
 * made ready for many z: the answer on every subset of the constrained unknowns is one small matrix.
 */
export interface SmallSubsets {
  readonly size: number;
  /** For each subset (bit m: the constrained unknown m is held at 0) the map from z to x, size × size by rows. */
  readonly maps: readonly Float64Array[];
  /** Of subset 0 first: fewest held at 0 first. */
  readonly order: readonly number[];
}

/**
 * @param upper R by rows, of full rank
 * @param constrained how many of the last unknowns must not be negative, at most `mostConstrained`
 */
export function smallSubsets(upper: readonly Float64Array[], constrained: number): SmallSubsets {
  const size = upper.length;
  const free = size - constrained;
  const maps = Array.from({ length: 1 << constrained }, (_, held) => {
    const kept = upper.map((__, k) => k).filter((k) => k < free || !(held & (1 << (k - free))));
    return mapOnto(upper, kept);
  });
  const count = (held: number) => [0, 1, 2].filter((m) => held & (1 << m)).length;
  const order = [...maps.keys()].sort((a, b) => count(a) - count(b));
  return { size, maps, order };
}

/** The pseudo-inverse of the kept columns of R, spread to all rows of x. */
function mapOnto(upper: readonly Float64Array[], kept: readonly number[]): Float64Array {
  const size = upper.length;
  const map = new Float64Array(size * size);
  if (kept.length === 0) return map;
  const factors = householder(kept.map((k) => Float64Array.from(upper, (row) => row[k]!)));
  const inverse = factors.upperInverse();
  for (let column = 0; column < size; column++) {
    const unit = new Float64Array(size);
    unit[column] = 1;
    const turned = factors.rotated(unit);
    for (const [m, k] of kept.entries()) {
      let sum = 0;
      for (let l = m; l < kept.length; l++) sum += inverse[m]![l]! * turned[l]!;
      map[k * size + column] = sum;
    }
  }
  return map;
}

/**
 * Writes the non-negative answer for z into x: of the subsets whose answer is feasible the one with
 * the least residual, which is the one that fits z best within the bounds. The subset with nothing held
 * is tried first and, where it is feasible, is the answer.
 */
export function solveOnSubsets(
  { size, maps, order }: SmallSubsets,
  upper: readonly Float64Array[],
  constrained: number,
  z: Float64Array,
  x: Float64Array,
): void {
  const free = size - constrained;
  let least = Number.POSITIVE_INFINITY;
  const trial = new Float64Array(size);
  for (const held of order) {
    const map = maps[held]!;
    let feasible = true;
    for (let k = size - 1; k >= 0 && feasible; k--) {
      let sum = 0;
      for (let l = 0; l < size; l++) sum += map[k * size + l]! * z[l]!;
      trial[k] = sum;
      feasible = k < free || sum >= 0;
    }
    if (!feasible) continue;
    if (held === 0) {
      x.set(trial);
      return;
    }
    const squares = residualSquares(upper, trial, z);
    if (squares >= least) continue;
    least = squares;
    x.set(trial);
  }
}

function residualSquares(upper: readonly Float64Array[], x: Float64Array, z: Float64Array): number {
  let squares = 0;
  for (let k = 0; k < upper.length; k++) {
    const row = upper[k]!;
    let rest = z[k]!;
    for (let l = k; l < row.length; l++) rest -= row[l]! * x[l]!;
    squares += rest * rest;
  }
  return squares;
}
