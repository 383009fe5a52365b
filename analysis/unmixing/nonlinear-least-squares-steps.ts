import { factorise } from './orthogonal.ts';

/** A nonlinear least-squares problem: the sum of the squares of `residual` is to be least. */
export interface NonlinearProblem {
  /** One entry a point, whitened; entries that are not finite where the parameters are not allowed. */
  readonly residual: (parameters: Float64Array) => Float64Array;
  /** ∂residual/∂parameter, one column a parameter. */
  readonly jacobian: (parameters: Float64Array) => readonly Float64Array[];
}

/** A point of the search that is allowed. */
export interface SearchPoint {
  readonly parameters: Float64Array;
  readonly residual: Float64Array;
  readonly jacobian: readonly Float64Array[];
  readonly sumOfSquares: number;
}

/** A point with the proof of how far it is from the minimum. */
export interface PolishedPoint extends SearchPoint {
  /** |Qᵀr|/|r|: the part of the residual that parameters could still take away. */
  readonly orthogonality: number;
  /** Largest step still wanted, relative to the parameter. */
  readonly lastStep: number;
  readonly rank: number;
  /** (JᵀJ)⁻¹ on its diagonal, square roots. */
  readonly unitDeviations: Float64Array;
}

/**
 * What the damping acts on: `largest-slope` the largest norm that each column has had (Moré),
 * `present-slope` its norm here (Marquardt), `size` one over the parameter's size.
 */
export type DampingScale = 'largest-slope' | 'present-slope' | 'size';

const mostSteps = 400;
const mostPolishing = 80;
/** More than rounding raises the sum of squares by at a minimum, less than any barrier. */
const outOfValley = 0.01;
/** Beyond this the damped step is nothing beside any parameter. */
const mostDamping = 1e20;
/** Where rounding rules, the next steps wander about the minimum: the best of some is taken. */
const mostWandering = 4;
/** Rounding of the sum of squares, relative. */
const rounding = 1e-15;

/** The point at these parameters, or null where they are not allowed. */
export function pointAt(
  { residual, jacobian }: NonlinearProblem,
  parameters: Float64Array,
): SearchPoint | null {
  const at = residual(parameters);
  const sumOfSquares = squares(at);
  if (!Number.isFinite(sumOfSquares)) return null;
  const slopes = jacobian(parameters);
  const allowed = slopes.every((column) => Number.isFinite(squares(column)));
  return allowed ? { parameters, residual: at, jacobian: slopes, sumOfSquares } : null;
}

/**
 * Levenberg and Marquardt's search that only ever goes down: the damped step solves the Jacobian
 * with √damping · scale below it by orthogonal factors (Moré, in Numerical Analysis, Springer
 * 1978, p. 105), the damping follows how well the step kept its promise (Nielsen, IMM-REP-1999-05).
 *
 * @param cosine the end: largest cosine between the residual and a column of the Jacobian, or a step
 *   that gained less than its square
 */
export function descended(
  problem: NonlinearProblem,
  start: SearchPoint,
  [rule, firstDamping]: readonly [DampingScale, number],
  cosine: number,
): SearchPoint {
  let point = start;
  let scale = dampingScale(rule, point, null);
  let damping = firstDamping;
  let growth = 2;
  for (let step = 0; step < mostSteps && damping < mostDamping; step++) {
    if (largestCosine(point) < cosine) break;
    const move = dampedStep(point, scale, damping);
    const next = pointAt(problem, added(point.parameters, move));
    if (next === null || !(next.sumOfSquares < point.sumOfSquares)) {
      damping *= growth;
      growth *= 2;
      continue;
    }
    const gained = point.sumOfSquares - next.sumOfSquares;
    const promised = point.sumOfSquares - squares(linearised(point, move));
    const kept = promised > 0 ? Math.min(gained / promised, 1) : 1;
    damping *= Math.max(1 / 3, 1 - (2 * kept - 1) ** 3);
    growth = 2;
    const settled = gained < Math.max(cosine ** 2, rounding) * point.sumOfSquares;
    point = next;
    if (settled) break;
    scale = dampingScale(rule, point, scale);
  }
  return point;
}

/**
 * Gauss and Newton's steps while they bring residual and Jacobian nearer to orthogonal. The sum of
 * squares itself no longer shows the way there: it is flat over half the digits of the parameters.
 *
 * @param enough orthogonality that ends it
 */
export function polished(
  problem: NonlinearProblem,
  start: SearchPoint,
  enough: number,
): PolishedPoint {
  const first = measured(start);
  let best = first.point;
  let { point, move } = first;
  let wandering = 0;
  for (let round = 0; round < mostPolishing && wandering < mostWandering; round++) {
    if (best.orthogonality < enough || point.rank < point.jacobian.length) break;
    const next = pointAt(problem, added(point.parameters, move));
    // steps that leave the valley would find another minimum, or a saddle
    if (next === null || next.sumOfSquares > best.sumOfSquares * (1 + outOfValley)) break;
    ({ point, move } = measured(next));
    if (point.orthogonality < best.orthogonality) {
      best = point;
      wandering = 0;
    } else wandering += 1;
  }
  return best;
}

function measured(point: SearchPoint): { point: PolishedPoint; move: Float64Array } {
  const factors = factorise(point.jacobian);
  const move = factors.solve(point.residual.map((value) => -value));
  const norm = Math.sqrt(point.sumOfSquares);
  // J·move = -QQᵀr, which is as long as Qᵀr
  const along = Math.sqrt(squares(combined(point.jacobian, move)));
  return {
    move,
    point: {
      ...point,
      orthogonality: norm > 0 ? along / norm : 0,
      lastStep: relativeStep(move, point.parameters),
      rank: factors.rank,
      unitDeviations: Float64Array.from(factors.pseudoInverse(), (row) => Math.hypot(...row)),
    },
  };
}

function relativeStep(move: Float64Array, parameters: Float64Array): number {
  return move.reduce((most, value, k) => {
    const relative = value === 0 ? 0 : Math.abs(value / parameters[k]!);
    return Math.max(most, relative);
  }, 0);
}

function dampingScale(
  rule: DampingScale,
  { jacobian, parameters }: SearchPoint,
  before: Float64Array | null,
): Float64Array {
  const norms = Float64Array.from(jacobian, (column) => Math.sqrt(squares(column)));
  const largest = Math.max(...norms);
  return norms.map((norm, k) => {
    if (rule === 'largest-slope') return Math.max(norm, before?.[k] ?? 0) || largest || 1;
    if (rule === 'present-slope') return norm || largest || 1;
    return (largest || 1) / (Math.abs(parameters[k]!) || 1);
  });
}

function dampedStep(
  { jacobian, residual }: SearchPoint,
  scale: Float64Array,
  damping: number,
): Float64Array {
  const rows = residual.length;
  const root = Math.sqrt(damping);
  const columns = jacobian.map((column, k) => {
    const longer = new Float64Array(rows + jacobian.length);
    longer.set(column);
    longer[rows + k] = root * scale[k]!;
    return longer;
  });
  const right = new Float64Array(rows + jacobian.length);
  for (const [i, value] of residual.entries()) right[i] = -value;
  return factorise(columns).solvePlain(right);
}

function largestCosine({ jacobian, residual, sumOfSquares }: SearchPoint): number {
  if (sumOfSquares === 0) return 0;
  return jacobian.reduce((most, column) => {
    const norms = Math.sqrt(squares(column) * sumOfSquares);
    const along = column.reduce((sum, value, i) => sum + value * residual[i]!, 0);
    return norms > 0 ? Math.max(most, Math.abs(along) / norms) : most;
  }, 0);
}

function linearised({ jacobian, residual }: SearchPoint, move: Float64Array): Float64Array {
  return added(combined(jacobian, move), residual);
}

function combined(columns: readonly Float64Array[], weights: Float64Array): Float64Array {
  const sum = new Float64Array(columns[0]?.length ?? 0);
  for (const [k, column] of columns.entries()) {
    for (let i = 0; i < sum.length; i++) sum[i]! += weights[k]! * column[i]!;
  }
  return sum;
}

function added(a: Float64Array, b: Float64Array): Float64Array {
  return a.map((value, i) => value + b[i]!);
}

/** Σ v². */
export function squares(vector: Float64Array): number {
  let sum = 0;
  for (const value of vector) sum += value * value;
  return sum;
}
