import { absorbanceVariance, type NoiseModel } from '../spectrum/noise.ts';
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
  /** Parameters by points: parameters = gain · measured. */
  readonly gain: readonly Float64Array[];
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

const mostRounds = 20;
/** Far below what any instrument prints. */
const settledAbsorbance = 1e-9;

/**
 * Weighted least squares with weights from the *fitted* absorbance, repeated until they stand
 * (weights from the measured one would favour points that happen to read low).
 *
 * @param columns model columns, one entry a point
 * @param measured absorbance
 * @param noise photometric noise model
 * @param standardsVariance variance that the standards' own noise adds at each point, for given parameters
 */
export function weightedFit(
  columns: readonly Float64Array[],
  measured: Float64Array,
  noise: NoiseModel,
  standardsVariance: (parameters: Float64Array) => Float64Array,
): WeightedFit {
  let fitted = measured;
  let extra = new Float64Array(measured.length);
  let settled = false;
  for (let round = 0; ; round++) {
    const noiseVariance = fitted.map((absorbance) => absorbanceVariance(noise, absorbance));
    const variance = noiseVariance.map((value, i) => value + extra[i]!);
    const sd = variance.map(Math.sqrt);
    const whitened = columns.map((column) => column.map((value, i) => value / sd[i]!));
    const factors = factorise(whitened);
    const parameters = factors.solve(measured.map((value, i) => value / sd[i]!));
    const before = fitted;
    fitted = modelled(columns, parameters);
    if (settled || round >= mostRounds) {
      return finished(measured, fitted, parameters, {
        variance,
        noiseVariance,
        sd,
        whitened,
        factors,
      });
    }
    settled = round > 0 && largestChange(before, fitted) <= settledAbsorbance;
    extra = new Float64Array(standardsVariance(parameters));
  }
}

/** Σ columns · parameters, one entry a point. */
export function modelled(columns: readonly Float64Array[], parameters: Float64Array): Float64Array {
  const sum = new Float64Array(columns[0]?.length ?? 0);
  for (const [k, column] of columns.entries()) {
    const parameter = parameters[k]!;
    for (let i = 0; i < sum.length; i++) sum[i]! += parameter * column[i]!;
  }
  return sum;
}

function largestChange(before: Float64Array, after: Float64Array): number {
  let largest = 0;
  for (const [i, value] of after.entries()) {
    largest = Math.max(largest, Math.abs(value - before[i]!));
  }
  return largest;
}

interface Solved {
  readonly variance: Float64Array;
  readonly noiseVariance: Float64Array;
  readonly sd: Float64Array;
  readonly whitened: readonly Float64Array[];
  readonly factors: OrthogonalFactors;
}

function finished(
  measured: Float64Array,
  fitted: Float64Array,
  parameters: Float64Array,
  { variance, noiseVariance, sd, whitened, factors }: Solved,
): WeightedFit {
  const residual = measured.map((value, i) => value - fitted[i]!);
  const df = measured.length - factors.rank;
  let chiSquare = 0;
  for (const [i, value] of residual.entries()) chiSquare += (value * value) / variance[i]!;
  return {
    parameters,
    fitted,
    residual,
    variance,
    noiseVariance,
    gain: factors.pseudoInverse().map((row) => row.map((value, i) => value / sd[i]!)),
    condition: factors.condition,
    unseen: factors.nullSpace(),
    whitened,
    reducedChiSquare: df > 0 ? chiSquare / df : Number.NaN,
    df,
  };
}
