import { levenbergMarquardt } from 'ml-levenberg-marquardt';
import { modelled, type WeightedFit } from './weighted-fit.ts';

/** A shift beyond this is not an instrument's wavelength error but another spectrum. nm */
export const largestShiftNm = 2;
const mostSteps = 50;
const settledNm = 1e-7;

/** What the search needs of the model: columns and their slope at a shift, and a weighted fit of columns. */
export interface ShiftedModel {
  /** Columns of the linear model with the standards moved by `shiftNm`. */
  readonly columnsAt: (shiftNm: number) => readonly Float64Array[];
  /** ∂(model)/∂(shift) for the given parameters, absorbance per nm. */
  readonly slopeAt: (shiftNm: number, parameters: Float64Array) => Float64Array;
  readonly fit: (columns: readonly Float64Array[]) => WeightedFit;
}

/**
 * Wavelength offset between crude and standards by variable projection: a one-parameter
 * Levenberg-Marquardt search on the whitened data brings it near (published method, general
 * library; whitened because its own weights are wrong), Gauss-Newton steps with the slope as a
 * further column polish it. The returned fit holds the slope as its last column, so that its
 * covariance carries what the free offset costs.
 */
export function fitShift(
  measured: Float64Array,
  model: ShiftedModel,
): { readonly shiftNm: number; readonly fit: WeightedFit } {
  let shiftNm = searchedShift(measured, model);
  for (let step = 0; ; step++) {
    const columns = model.columnsAt(shiftNm);
    const plain = model.fit(columns);
    const fit = model.fit([...columns, model.slopeAt(shiftNm, plain.parameters)]);
    const move = fit.parameters.at(-1) ?? 0;
    if (Math.abs(move) < settledNm || step >= mostSteps) return { shiftNm, fit };
    shiftNm = within(shiftNm + Math.max(-0.5, Math.min(0.5, move)));
  }
}

function searchedShift(measured: Float64Array, model: ShiftedModel): number {
  const start = model.fit(model.columnsAt(0));
  const sd = start.variance.map(Math.sqrt);
  const projected = (shiftNm: number): Float64Array => {
    const columns = model.columnsAt(within(shiftNm));
    return modelled(columns, model.fit(columns).parameters);
  };
  const answer = levenbergMarquardt(
    {
      x: Float64Array.from(measured.keys()),
      y: measured.map((value, i) => value / sd[i]!),
    },
    ([shiftNm = 0]) => {
      const fitted = projected(shiftNm);
      return (i) => fitted[i]! / sd[i]!;
    },
    {
      initialValues: [0],
      gradientDifference: 0.05,
      centralDifference: true,
      damping: 0.01,
      maxIterations: 8,
      errorTolerance: 1e-300,
    },
  );
  return within(answer.parameterValues[0] ?? 0);
}

function within(shiftNm: number): number {
  if (!Number.isFinite(shiftNm)) return 0;
  return Math.max(-largestShiftNm, Math.min(largestShiftNm, shiftNm));
}
