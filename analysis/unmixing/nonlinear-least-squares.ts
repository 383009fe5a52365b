import { levenbergMarquardt } from 'ml-levenberg-marquardt';
import {
  type DampingScale,
  descended,
  type NonlinearProblem,
  type PolishedPoint,
  pointAt,
  polished,
  type SearchPoint,
  squares,
} from './nonlinear-least-squares-steps.ts';

export type { NonlinearProblem } from './nonlinear-least-squares-steps.ts';

export interface NonlinearSettings {
  /** Searches tried at most where the first does not converge; 1 for no restarts. */
  readonly searches?: number;
  /**
   * |Qᵀr|/|r| that ends the polish; by default what rounding leaves. The distance from the minimum in
   * standard deviations is of that order (times the root of the degrees of freedom).
   */
  readonly enough?: number;
}

export interface NonlinearFit {
  readonly parameters: Float64Array;
  readonly residual: Float64Array;
  /** ∂residual/∂parameter at the parameters, one column each. */
  readonly jacobian: readonly Float64Array[];
  readonly sumOfSquares: number;
  /** |Qᵀr|/|r|, the proof of convergence: what share of the residual a further step could take. */
  readonly orthogonality: number;
  /** From what the residual scatters over points - parameters; NaN where there are no more points than parameters. */
  readonly standardDeviations: Float64Array;
  /** False where no search came to a minimum; the parameters are then the best that was seen. */
  readonly converged: boolean;
}

/**
 * A further step would be below a ten millionth of the standard deviations (relative offset, Bates
 * and Watts, Technometrics 23 (1981) 179).
 */
const orthogonal = 1e-7;
/** Of each parameter, where the residual is mostly rounding and cannot be orthogonal to anything. */
const settledStep = 1e-10;
const usual: Required<NonlinearSettings> = {
  // the one from the library's answer, and each restart once
  searches: 10,
  enough: 1e-14,
};
/** Cosine of residual and Jacobian from which on the polish is quick; a step gains its square. */
const nearlyOrthogonal = 1e-4;
const librarySteps = 6;
const libraryDamping = 0.01;

const restarts: readonly (readonly [DampingScale, number])[] = (
  ['largest-slope', 'present-slope', 'size'] as const
).flatMap((rule) => [1e-3, 1, 1e3].map((damping) => [rule, damping] as const));

/**
 * Nonlinear least squares to the last digits. A general library's search brings the parameters near
 * (scaled, with the exact Jacobian; never its weights, which are wrong), a search of our own that
 * refuses every step upwards or out of the allowed range goes on, Gauss-Newton steps polish until
 * residual and Jacobian are orthogonal. Where that does not converge, the search starts again with
 * other dampings. RangeError where the start is not allowed.
 *
 * @param start parameters to start from
 */
export function nonlinearLeastSquares(
  start: Float64Array,
  problem: NonlinearProblem,
  settings: NonlinearSettings = {},
): NonlinearFit {
  const first = pointAt(problem, start);
  if (first === null) throw new RangeError('the search starts where the model has no value');
  const { searches, enough } = { ...usual, ...settings };
  const near = byLibrary(problem, first);
  let best = searched(problem, near, ['largest-slope', 1e-3], enough);
  for (const damping of restarts.slice(0, searches - 1)) {
    if (converged(best, enough)) break;
    const found = searched(problem, first, damping, enough);
    if (converged(found, enough) || found.sumOfSquares < best.sumOfSquares) best = found;
  }
  return fitOf(best, enough);
}

/** Down until the polish should do better, and on down if it does not. */
function searched(
  problem: NonlinearProblem,
  start: SearchPoint,
  damping: readonly [DampingScale, number],
  enough: number,
): PolishedPoint {
  const near = descended(problem, start, damping, nearlyOrthogonal);
  const found = polished(problem, near, enough);
  if (converged(found, enough)) return found;
  const tight = Math.max(1e-12, enough * nearlyOrthogonal);
  return polished(problem, descended(problem, near, damping, tight), enough);
}

function converged(
  { orthogonality, lastStep, rank, jacobian }: PolishedPoint,
  enough: number,
): boolean {
  if (rank < jacobian.length) return false;
  return orthogonality < Math.max(orthogonal, enough) || lastStep < settledStep;
}

function fitOf(point: PolishedPoint, enough: number): NonlinearFit {
  const { parameters, residual, jacobian, sumOfSquares, orthogonality, unitDeviations } = point;
  const df = residual.length - parameters.length;
  const scatter = df > 0 ? Math.sqrt(sumOfSquares / df) : Number.NaN;
  return {
    parameters,
    residual,
    jacobian,
    sumOfSquares,
    orthogonality,
    standardDeviations: unitDeviations.map((value) => value * scatter),
    converged: converged(point, enough),
  };
}

/**
 * The library's search in parameters that are 0 at the start and whose columns of the Jacobian have
 * norm 1 there, since its damping knows no units. It keeps bad steps and has no test for being
 * there but NaN, so it gets few steps, and the best point it came by is taken.
 */
function byLibrary(problem: NonlinearProblem, start: SearchPoint): SearchPoint {
  const unit = Float64Array.from(start.jacobian, (column) => 1 / (Math.sqrt(squares(column)) || 1));
  const points = start.residual.length;
  let best = start;
  let there = false;
  let last: SearchPoint | null = start;
  const at = (scaled: readonly number[]): SearchPoint | null => {
    const parameters = start.parameters.map((value, k) => value + scaled[k]! * unit[k]!);
    // it asks for every point twice
    if (last?.parameters.every((value, k) => value === parameters[k])) return last;
    if (there) return null;
    last = pointAt(problem, parameters);
    if (last !== null && last.sumOfSquares < best.sumOfSquares) {
      there = last.sumOfSquares > best.sumOfSquares * (1 - nearlyOrthogonal ** 2);
      best = last;
    }
    return last;
  };
  try {
    levenbergMarquardt(
      { x: Float64Array.from({ length: points }, (_, i) => i), y: new Float64Array(points) },
      (scaled) => {
        const point = at(scaled);
        // NaN ends its search
        return (i) => point?.residual[i] ?? Number.NaN;
      },
      {
        initialValues: start.parameters.map(() => 0),
        jacobianFunction: (scaled) => {
          const point = at(scaled);
          return (i) => Array.from(unit, (size, k) => (point?.jacobian[k]?.[i] ?? 0) * size);
        },
        damping: libraryDamping,
        maxIterations: librarySteps,
        errorTolerance: 1e-300,
      },
    );
  } catch {
    // it throws for singular normal equations and for a single point: what it found before still counts
  }
  return best;
}
