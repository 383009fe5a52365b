import { checkShape } from './check-shape.ts';
import { factorise } from './orthogonal.ts';

export interface NonNegativeSolution {
  readonly x: Float64Array;
  readonly residualNorm: number;
  /** Positions that are free or came out positive. */
  readonly passive: readonly number[];
  /** Aᵀ(b - A x): 0 on the passive positions, at most 0 on the others. */
  readonly dual: Float64Array;
}

/**
 * Minimises |A x - b| with x[k] ≥ 0, except where `free[k]`. Active-set method of Lawson and Hanson
 * (Solving Least Squares Problems, 1974, NNLS); free columns are passive from the start and stay so.
 * RangeError for columns of unequal length and entries that are not finite.
 *
 * @param columns columns of A, all of one length
 */
export function nonNegativeLeastSquares(
  columns: readonly Float64Array[],
  rhs: Float64Array,
  free: readonly boolean[] = [],
): NonNegativeSolution {
  const size = columns.length;
  checkShape([...columns, rhs], rhs.length);
  const passive = new Set<number>([...columns.keys()].filter((k) => free[k] === true));
  let x = solveOn(columns, rhs, passive);
  const norms = columns.map(norm);
  const barred = new Set<number>();
  // each round lowers the residual, so no passive set comes back: far fewer rounds than this are needed
  for (let round = 0; round < 3 * size + 30; round++) {
    const residual = residualOf(columns, rhs, x);
    const next = steepest(columns, norms, residual, passive, barred, 1e-14 * norm(rhs));
    if (next === null) break;
    passive.add(next);
    const trial = solveOn(columns, rhs, passive);
    if (!(trial[next]! > 0)) {
      // rounding alone called for it (columns that depend on each other): pass it over from here
      passive.delete(next);
      barred.add(next);
      continue;
    }
    x = feasible(columns, rhs, { x, trial, passive, free });
    // from another place it may be called for in earnest
    barred.clear();
  }
  const residual = residualOf(columns, rhs, x);
  return {
    x,
    residualNorm: norm(residual),
    passive: [...passive].sort((a, b) => a - b),
    dual: Float64Array.from(columns, (column) => dot(column, residual)),
  };
}

interface Step {
  readonly x: Float64Array;
  readonly trial: Float64Array;
  readonly passive: Set<number>;
  readonly free: readonly boolean[];
}

/** Walks from x towards the trial, dropping what would turn negative, until the trial is feasible. */
function feasible(
  columns: readonly Float64Array[],
  rhs: Float64Array,
  { x, trial, passive, free }: Step,
): Float64Array {
  const here = x.slice();
  let aim = trial;
  for (;;) {
    let share = 1;
    let first: number | null = null;
    for (const k of passive) {
      if (free[k] === true || aim[k]! > 0) continue;
      const reach = here[k]! / (here[k]! - aim[k]!);
      if (first === null || reach < share) {
        share = Math.min(reach, 1);
        first = k;
      }
    }
    if (first === null) return aim;
    for (const k of passive) here[k]! += share * (aim[k]! - here[k]!);
    here[first] = 0;
    for (const k of [...passive]) {
      if (free[k] !== true && here[k]! <= 0) {
        here[k] = 0;
        passive.delete(k);
      }
    }
    aim = solveOn(columns, rhs, passive);
  }
}

/** Unconstrained answer on the passive columns, 0 on the others. */
function solveOn(
  columns: readonly Float64Array[],
  rhs: Float64Array,
  passive: ReadonlySet<number>,
): Float64Array {
  const x = new Float64Array(columns.length);
  const chosen = [...passive].sort((a, b) => a - b);
  if (chosen.length === 0) return x;
  const answer = factorise(chosen.map((k) => columns[k]!)).solve(rhs);
  for (const [m, k] of chosen.entries()) x[k] = answer[m]!;
  return x;
}

/** The column along which the residual falls fastest, for its length; null where none does. */
function steepest(
  columns: readonly Float64Array[],
  norms: readonly number[],
  residual: Float64Array,
  passive: ReadonlySet<number>,
  barred: ReadonlySet<number>,
  tolerance: number,
): number | null {
  let best: number | null = null;
  let slope = tolerance;
  for (const [k, column] of columns.entries()) {
    if (passive.has(k) || barred.has(k) || norms[k] === 0) continue;
    const along = dot(column, residual) / norms[k]!;
    if (along > slope) {
      slope = along;
      best = k;
    }
  }
  return best;
}

function residualOf(
  columns: readonly Float64Array[],
  rhs: Float64Array,
  x: Float64Array,
): Float64Array {
  const residual = rhs.slice();
  for (const [k, column] of columns.entries()) {
    const amount = x[k]!;
    if (amount === 0) continue;
    for (let i = 0; i < residual.length; i++) residual[i]! -= amount * column[i]!;
  }
  return residual;
}

function norm(vector: Float64Array): number {
  return Math.sqrt(dot(vector, vector));
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i]! * b[i]!;
  return sum;
}
