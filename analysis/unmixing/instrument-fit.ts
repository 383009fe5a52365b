import { levenbergMarquardt } from 'ml-levenberg-marquardt';
import { orthonormal, projectedOut } from '../spectrum/vectors.ts';
import { factorise } from './orthogonal.ts';
import { modelled, type Prior, type WeightedFit } from './weighted-fit.ts';

/** The linear model with the instrument's errors at given sizes. */
export interface LinearModel {
  /** Absorbance of the crude at the fitted points. */
  readonly measured: Float64Array;
  readonly columns: readonly Float64Array[];
}

/** One error of the instrument that the fit is to find: a wavelength offset, stray light. */
export interface InstrumentError {
  /** The largest sizes that may be tried, [low, high]. */
  readonly range: readonly [number, number];
  /** Most that one step may move. */
  readonly step: number;
  /** A step smaller than this is the end. */
  readonly settled: number;
  /** Standard deviation of what is known beforehand, of mean 0; null for nothing. */
  readonly priorSd: number | null;
}

/** What the search needs of the model. Sizes stand in the order of `errors`. */
export interface InstrumentModel {
  readonly errors: readonly InstrumentError[];
  readonly modelAt: (sizes: Float64Array) => LinearModel;
  /** ∂(model - measured)/∂size for the given linear parameters, one column an error. */
  readonly slopesAt: (sizes: Float64Array, parameters: Float64Array) => Float64Array[];
  readonly fit: (model: LinearModel, priors: readonly Prior[]) => WeightedFit;
}

const mostSteps = 50;
const smallestSingular = 1e-7;

/**
 * Errors of the instrument by variable projection: a Levenberg-Marquardt search on the whitened data
 * brings them near (general library; whitened because its own weights are wrong), Gauss-Newton steps
 * with the slopes as further columns polish them. The fit returned holds the slopes as its last
 * columns, so that its covariance carries what the free errors cost; priors are joined as
 * observations.
 */
export function fitInstrument(model: InstrumentModel): {
  readonly sizes: Float64Array;
  readonly fit: WeightedFit;
} {
  let sizes = searched(model);
  for (let round = 0; ; round++) {
    const linear = model.modelAt(sizes);
    const plain = model.fit(linear, []);
    const slopes = model.slopesAt(sizes, plain.parameters);
    const first = linear.columns.length;
    const priors = model.errors.flatMap(({ priorSd }, j) =>
      priorSd === null ? [] : [{ parameter: first + j, value: -sizes[j]!, sd: priorSd }],
    );
    const fit = model.fit({ ...linear, columns: [...linear.columns, ...slopes] }, priors);
    const moves = fit.parameters.subarray(first);
    const done = model.errors.every(({ settled }, j) => Math.abs(moves[j]!) < settled);
    if (done || round >= mostSteps) return { sizes, fit };
    sizes = sizes.map((size, j) => {
      const { step } = model.errors[j]!;
      return within(model.errors[j]!, size + Math.max(-step, Math.min(step, moves[j]!)));
    });
  }
}

/** Weights as they are without errors; the polish takes them anew. */
function searched(model: InstrumentModel): Float64Array {
  const { errors } = model;
  const nothing = new Float64Array(errors.length);
  const start = model.modelAt(nothing);
  const sd = model.fit(start, []).variance.map(Math.sqrt);
  const points = start.measured.length;
  const whitened = (column: Float64Array): Float64Array => column.map((value, i) => value / sd[i]!);
  const sizesAt = (scaled: readonly number[]): Float64Array =>
    Float64Array.from(scaled, (value, j) => within(errors[j]!, value * errors[j]!.step));
  const projected = (scaled: readonly number[]) => {
    const sizes = sizesAt(scaled);
    const linear = model.modelAt(sizes);
    const factors = factorise(linear.columns.map(whitened), undefined, smallestSingular);
    const parameters = factors.solvePlain(whitened(linear.measured));
    const fitted = modelled(linear.columns, parameters);
    const residual = whitened(linear.measured.map((value, i) => value - fitted[i]!));
    const slopes = (): Float64Array[] => {
      const basis = orthonormal(linear.columns.map(whitened));
      return model
        .slopesAt(sizes, parameters)
        .map((slope, j) =>
          projectedOut(basis, whitened(slope)).map((value) => -value * errors[j]!.step),
        );
    };
    return { residual, slopes };
  };
  const answer = levenbergMarquardt(
    { x: Float64Array.from({ length: points }, (_, i) => i), y: new Float64Array(points) },
    (scaled: number[]) => {
      const { residual } = projected(scaled);
      return (i: number) => residual[i]!;
    },
    {
      initialValues: Array.from(nothing),
      jacobianFunction: (scaled) => {
        const slopes = projected(scaled).slopes();
        return (i) => slopes.map((slope) => slope[i]!);
      },
      damping: 0.01,
      maxIterations: 6,
      errorTolerance: 1e-300,
    },
  );
  return sizesAt(answer.parameterValues);
}

function within({ range: [low, high] }: InstrumentError, size: number): number {
  return Number.isFinite(size) ? Math.max(low, Math.min(high, size)) : 0;
}
