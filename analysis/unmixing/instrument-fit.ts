import { orthonormal, projectedOut } from '../spectrum/vectors.ts';
import { nonlinearLeastSquares } from './nonlinear-least-squares.ts';
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
const mostSearches = 3;
/** The polish takes over from a residual and slopes as orthogonal as this. */
const nearEnough = 1e-3;

/**
 * Errors of the instrument by variable projection: a Levenberg-Marquardt search on the whitened data
 * brings them near, Gauss-Newton steps with the slopes as further columns polish them. The fit returned holds the slopes as its last
 * columns, so that its covariance carries what the free errors cost; priors are joined as
 * observations.
 *
 * @param near sizes to polish, from a fit with nearly these weights; searched for unless given
 */
export function fitInstrument(
  model: InstrumentModel,
  near?: Float64Array,
): {
  readonly sizes: Float64Array;
  readonly fit: WeightedFit;
} {
  let sizes = near ?? searched(model);
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

/** By `nonlinearLeastSquares`, weights as they are without errors; the polish takes them anew. */
function searched(model: InstrumentModel): Float64Array {
  const { errors } = model;
  const nothing = new Float64Array(errors.length);
  const sd = model.fit(model.modelAt(nothing), []).variance.map(Math.sqrt);
  const whitened = (column: Float64Array): Float64Array => column.map((value, i) => value / sd[i]!);
  const projected = (sizes: Float64Array) => {
    const linear = model.modelAt(sizes);
    const columns = linear.columns.map(whitened);
    const parameters = factorise(columns, undefined, smallestSingular).solvePlain(
      whitened(linear.measured),
    );
    return { linear, columns, parameters };
  };
  const withKnown = (points: Float64Array, known: readonly number[]): Float64Array =>
    Float64Array.from([...points, ...known]);
  return nonlinearLeastSquares(
    nothing,
    {
      residual: (sizes) => {
        const known = errors.flatMap(({ priorSd }, j) => (priorSd ? [sizes[j]! / priorSd] : []));
        if (errors.some((error, j) => within(error, sizes[j]!) !== sizes[j])) {
          return withKnown(new Float64Array(sd.length).fill(Number.NaN), known);
        }
        const { linear, parameters } = projected(sizes);
        const fitted = modelled(linear.columns, parameters);
        return withKnown(whitened(linear.measured.map((value, i) => value - fitted[i]!)), known);
      },
      jacobian: (sizes) => {
        const { columns, parameters } = projected(sizes);
        const basis = orthonormal(columns);
        return model.slopesAt(sizes, parameters).map((slope, j) => {
          const known = errors.flatMap(({ priorSd }, m) =>
            priorSd ? [m === j ? 1 / priorSd : 0] : [],
          );
          const rest = projectedOut(basis, whitened(slope)).map((value) => -value);
          return withKnown(rest, known);
        });
      },
    },
    { searches: mostSearches, enough: nearEnough },
  ).parameters;
}

function within({ range: [low, high] }: InstrumentError, size: number): number {
  return Number.isFinite(size) ? Math.max(low, Math.min(high, size)) : 0;
}
