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
/** The one from the library's answer, and each restart once. */
const mostSearches = 10;
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
  let best = searched(problem, byLibrary(problem, first), 'largest-slope', 1e-3);
  for (const [rule, damping] of restarts.slice(0, (settings.searches ?? mostSearches) - 1)) {
    if (converged(best)) break;
    const found = searched(problem, first, rule, damping);
    if (converged(found) || found.sumOfSquares < best.sumOfSquares) best = found;
  }
  return fitOf(best);
}

/** Down until the polish should do better, and on down if it does not. */
function searched(
  problem: NonlinearProblem,
  start: SearchPoint,
  rule: DampingScale,
  damping: number,
): PolishedPoint {
  const near = descended(problem, start, rule, damping, 1e-4);
  const found = polished(problem, near);
  if (converged(found)) return found;
  return polished(problem, descended(problem, near, rule, damping, 1e-12));
}

function converged({ orthogonality, lastStep, rank, jacobian }: PolishedPoint): boolean {
  return rank === jacobian.length && (orthogonality < orthogonal || lastStep < settledStep);
}

function fitOf(point: PolishedPoint): NonlinearFit {
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
    converged: converged(point),
  };
}

/**
 * The library's search in parameters that are 0 at the start and whose columns of the Jacobian have
 * norm 1 there, since its damping knows no units. It keeps bad steps and has no test for being
 * there, so it gets few steps, and the best point it came by is taken.
 */
function byLibrary(problem: NonlinearProblem, start: SearchPoint): SearchPoint {
  const unit = Float64Array.from(start.jacobian, (column) => 1 / (Math.sqrt(squares(column)) || 1));
  const points = start.residual.length;
  let best = start;
  let last: SearchPoint | null = start;
  const at = (scaled: readonly number[]): SearchPoint | null => {
    const parameters = start.parameters.map((value, k) => value + scaled[k]! * unit[k]!);
    // it asks for every point twice
    if (last?.parameters.every((value, k) => value === parameters[k])) return last;
    last = pointAt(problem, parameters);
    if (last !== null && last.sumOfSquares < best.sumOfSquares) best = last;
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
