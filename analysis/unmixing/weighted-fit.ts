import { absorbanceVariance, type NoiseModel } from '../spectrum/noise.ts';
import { divided, rooted } from '../spectrum/vectors.ts';
import { settledFit } from './batch/settled-fit.ts';
import { factorise, type OrthogonalFactors } from './orthogonal.ts';

/** A weighted linear fit. Parameters are in the order of the columns. */
export interface WeightedFit {
  readonly parameters: Float64Array;
  readonly fitted: Float64Array;
  readonly residual: Float64Array;
  /** Variance of each point that the weights were taken from: noise and the standards' noise. */
  readonly variance: Float64Array;
  /** Photometric noise alone. */
  readonly noiseVariance: Float64Array;
  /** Parameters by points: parameters = gain · measured (+ priorGain · what the priors suppose). */
  readonly gain: readonly Float64Array[];
  /** Parameters by priors, per standard deviation of each prior. */
  readonly priorGain: readonly Float64Array[];
  readonly priors: readonly Prior[];
  /** Of the whitened, column-scaled matrix. */
  readonly condition: number;
  /** Directions in the parameters that the data do not see at all; [] where all are seen. */
  readonly unseen: readonly Float64Array[];
  /** Whitened columns; kept for doubts and sub-models. */
  readonly whitened: readonly Float64Array[];
  /** Σ residual²/variance over points - rank. */
  readonly reducedChiSquare: number;
  readonly df: number;
}

/** What is known of one parameter beforehand: an observation of it. */
export interface Prior {
  /** Position of the parameter. */
  readonly parameter: number;
  readonly value: number;
  readonly sd: number;
}

const mostRounds = 20;
/** A change of the fitted absorbance that moves a weight by less than a millionth. */
const settledAbsorbance = 1e-7;
/** Up to this condition the plain orthogonal solution is good to ten digits; beyond it is refined. */
const plainCondition = 1e4;
/** Columns as like as this are the same within what any standard's digits carry. */
const likeOthers = 1e-7;

/**
 * Weighted least squares with weights from the *fitted* absorbance, repeated until they stand
 * (weights from the measured one would favour points that happen to read low).
 *
 * @param columns model columns, one entry a point
 * @param measured absorbance
 * @param noise photometric noise model
 * @param standardsVariance variance that the standards' own noise adds at each point, for given parameters
 * @param priors observations of single parameters, joined to the points
 */
export function weightedFit(
  columns: readonly Float64Array[],
  measured: Float64Array,
  noise: NoiseModel,
  standardsVariance: (parameters: Float64Array) => Float64Array,
  priors: readonly Prior[] = [],
): WeightedFit {
  const start =
    priors.length === 0 ? settledFit(columns, measured, noise, standardsVariance) : null;
  let fitted = start?.fitted ?? measured;
  let extra = start?.extra ?? new Float64Array(measured.length);
  let settled = start !== null;
  for (let round = 0; ; round++) {
    const noiseVariance = new Float64Array(measured.length);
    const variance = new Float64Array(measured.length);
    for (let i = 0; i < variance.length; i++) {
      noiseVariance[i] = absorbanceVariance(noise, fitted[i]!);
      variance[i] = noiseVariance[i]! + extra[i]!;
    }
    const sd = rooted(variance);
    const whitened = columns.map((column) => divided(column, sd));
    const factors = factorise(withPriors(whitened, priors), undefined, likeOthers);
    const right = withPriorValues(divided(measured, sd), priors);
    const parameters =
      factors.condition < plainCondition ? factors.solvePlain(right) : factors.solve(right);
    const before = fitted;
    fitted = modelled(columns, parameters);
    if (settled || round >= mostRounds) {
      return finished(measured, fitted, parameters, {
        variance,
        noiseVariance,
        sd,
        whitened,
        factors,
        priors,
      });
    }
    settled = round > 0 && largestChange(before, fitted) <= settledAbsorbance;
    extra = new Float64Array(standardsVariance(parameters));
  }
}

/** The columns with one more row for each prior. */
export function withPriors(
  columns: readonly Float64Array[],
  priors: readonly Prior[],
): readonly Float64Array[] {
  if (priors.length === 0) return columns;
  return columns.map((column, k) =>
    extended(
      column,
      priors.map(({ parameter, sd }) => (parameter === k ? 1 / sd : 0)),
    ),
  );
}

function withPriorValues(vector: Float64Array, priors: readonly Prior[]): Float64Array {
  return priors.length === 0
    ? vector
    : extended(
        vector,
        priors.map(({ value, sd }) => value / sd),
      );
}

function extended(vector: Float64Array, more: readonly number[]): Float64Array {
  const out = new Float64Array(vector.length + more.length);
  out.set(vector);
  out.set(more, vector.length);
  return out;
}

/** Σ columns · parameters, one entry a point. */
export function modelled(columns: readonly Float64Array[], parameters: Float64Array): Float64Array {
  const sum = new Float64Array(columns[0]?.length ?? 0);
  for (let k = 0; k < columns.length; k++) {
    const column = columns[k]!;
    const parameter = parameters[k]!;
    for (let i = 0; i < sum.length; i++) sum[i]! += parameter * column[i]!;
  }
  return sum;
}

function largestChange(before: Float64Array, after: Float64Array): number {
  let largest = 0;
  for (let i = 0; i < after.length; i++) {
    largest = Math.max(largest, Math.abs(after[i]! - before[i]!));
  }
  return largest;
}

interface Solved {
  readonly variance: Float64Array;
  readonly noiseVariance: Float64Array;
  readonly sd: Float64Array;
  readonly whitened: readonly Float64Array[];
  readonly factors: OrthogonalFactors;
  readonly priors: readonly Prior[];
}

function finished(
  measured: Float64Array,
  fitted: Float64Array,
  parameters: Float64Array,
  { variance, noiseVariance, sd, whitened, factors, priors }: Solved,
): WeightedFit {
  const residual = new Float64Array(measured.length);
  for (let i = 0; i < residual.length; i++) residual[i] = measured[i]! - fitted[i]!;
  const points = measured.length;
  const df = points + priors.length - factors.rank;
  const inverse = factors.pseudoInverse();
  let chiSquare = 0;
  for (let i = 0; i < points; i++) chiSquare += (residual[i]! * residual[i]!) / variance[i]!;
  return {
    parameters,
    fitted,
    residual,
    variance,
    noiseVariance,
    gain: inverse.map((row) => divided(row.subarray(0, points), sd)),
    priorGain: inverse.map((row) => row.subarray(points)),
    priors,
    condition: factors.condition,
    unseen: factors.nullSpace(),
    whitened,
    reducedChiSquare: df > 0 ? chiSquare / df : Number.NaN,
    df,
  };
}
