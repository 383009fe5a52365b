import type { FitSettings } from '../sheet/defaults.ts';
import type { NoiseModel } from '../spectrum/noise.ts';
import type { Spectrum } from '../spectrum/spectrum.ts';
import { withoutStrayLight } from '../spectrum/stray-light.ts';
import { taken } from '../spectrum/vectors.ts';
import { type MolarAbsorptivity, molarAbsorptivityAt } from '../standards/molar-absorptivity.ts';
import type { SpeciesStandard } from '../standards/species-standard.ts';
import { type Design, designOf } from './design.ts';
import { fitInstrument, type InstrumentError, type LinearModel } from './instrument-fit.ts';
import { shiftSlope, standardsVariance } from './standards-on-points.ts';
import { modelled, type WeightedFit, weightedFit } from './weighted-fit.ts';

/** A shift beyond this is not an instrument's wavelength error but another spectrum. nm */
export const largestShiftNm = 2;
/** Stray light beyond this is a fault of the instrument, not an error to fit. */
const largestStrayLight = 0.05;
/** Step of the slope with stray light. */
const strayLightStep = 1e-5;

/** What is fitted, before the noise is known. */
export interface Measurement {
  readonly crude: Spectrum;
  /** The standards with this fraction of stray light taken out of them. */
  readonly standardsAt: (strayLight: number) => readonly SpeciesStandard[];
  readonly pathLengthCm: number;
  readonly settings: FitSettings;
}

export interface Solution {
  readonly standards: readonly SpeciesStandard[];
  /** Absorbance of the crude at the fitted points, stray light taken out. */
  readonly measured: Float64Array;
  readonly fit: WeightedFit;
  readonly sizes: { readonly shiftNm: number; readonly strayLight: number };
  readonly molarAbsorptivity: readonly MolarAbsorptivity[];
  readonly design: Design;
}

interface State extends LinearModel {
  readonly standards: readonly SpeciesStandard[];
  readonly moved: readonly MolarAbsorptivity[];
  readonly design: Design;
}

/**
 * Amounts, baseline and the instrument's errors with weights from this noise, on these points of the crude.
 *
 * @param near a solution with nearly these weights, from which the instrument's errors are only polished
 */
export function solveWith(
  input: Measurement,
  at: Int32Array,
  noise: NoiseModel,
  near?: Solution,
): Solution {
  const { crude, settings, pathLengthCm } = input;
  const states = new Map<string, State>();
  const stateAt = (shiftNm: number, strayLight: number): State => {
    const key = `${shiftNm} ${strayLight}`;
    const state = states.get(key) ?? freshState(shiftNm, strayLight);
    states.set(key, state);
    return state;
  };
  const freshState = (shiftNm: number, strayLight: number): State => {
    const standards = input.standardsAt(strayLight);
    const moved = standardsAt(standards, crude.wavelengthNm, shiftNm);
    const design = designOf(moved, crude.wavelengthNm, at, pathLengthCm, settings.baseline);
    const columns = [...design.species, ...design.baseline.map(({ column }) => column)];
    const measured = withoutStray(taken(crude.values, at), strayLight);
    return { standards, moved, design, columns, measured };
  };
  const weighing = (moved: readonly MolarAbsorptivity[]) => (parameters: Float64Array) =>
    standardsVariance(moved, at, pathLengthCm, parameters);
  const asSolution = (
    sizes: Solution['sizes'],
    { standards, measured, moved, design }: State,
    fit: WeightedFit,
  ): Solution => ({ standards, measured, fit, sizes, molarAbsorptivity: moved, design });
  const stated = { shiftNm: 0, strayLight: statedStrayLight(settings) };
  const start = stateAt(stated.shiftNm, stated.strayLight);
  if (settings.shift === 'none' && settings.strayLight !== 'fit') {
    const fit = weightedFit(start.columns, start.measured, noise, weighing(start.moved));
    return asSolution(stated, start, fit);
  }
  const sizesOf = (sizes: Float64Array): Solution['sizes'] => ({
    shiftNm: settings.shift === 'common' ? sizes[0]! : 0,
    strayLight: settings.strayLight === 'fit' ? sizes.at(-1)! : stated.strayLight,
  });
  const stateOf = (sizes: Float64Array) => {
    const { shiftNm, strayLight } = sizesOf(sizes);
    return stateAt(shiftNm, strayLight);
  };
  const found = fitInstrument(
    {
      errors: instrumentErrors(settings, start.measured),
      modelAt: stateOf,
      slopesAt: (sizes, parameters) => {
        const { shiftNm, strayLight } = sizesOf(sizes);
        const here = stateAt(shiftNm, strayLight);
        const shift =
          settings.shift === 'common' ? [shiftSlope(here.moved, at, pathLengthCm, parameters)] : [];
        if (settings.strayLight !== 'fit') return shift;
        const more = stateAt(shiftNm, strayLight + strayLightStep);
        return [...shift, strayLightSlope(here, more, parameters)];
      },
      fit: ({ columns, measured }, priors) =>
        weightedFit(columns, measured, noise, weighing(start.moved), priors),
    },
    near && sizesToFit(settings, near.sizes),
  );
  return asSolution(sizesOf(found.sizes), stateOf(found.sizes), found.fit);
}

function sizesToFit(settings: FitSettings, { shiftNm, strayLight }: Solution['sizes']) {
  return Float64Array.from([
    ...(settings.shift === 'common' ? [shiftNm] : []),
    ...(settings.strayLight === 'fit' ? [strayLight] : []),
  ]);
}

export function statedStrayLight({ strayLight }: FitSettings): number {
  return strayLight === 'fit' ? 0 : strayLight;
}

function instrumentErrors(settings: FitSettings, measured: Float64Array): InstrumentError[] {
  const shift: InstrumentError = {
    range: [-largestShiftNm, largestShiftNm],
    step: 0.5,
    settled: 1e-5,
    priorSd: settings.shiftPriorNm,
  };
  // a reading needs less stray light than reaches the detector with it
  const transmitted = 10 ** -measured.reduce((most, value) => Math.max(most, value), 0);
  const ceiling = Math.min(largestStrayLight, (0.9 * transmitted) / (1 - 0.9 * transmitted));
  const stray: InstrumentError = {
    range: [-0.1 * ceiling, ceiling],
    step: 0.2 * ceiling,
    settled: 1e-8,
    priorSd: null,
  };
  return [
    ...(settings.shift === 'common' ? [shift] : []),
    ...(settings.strayLight === 'fit' ? [stray] : []),
  ];
}

/** ∂(model - measured)/∂(stray light) by a forward difference. */
function strayLightSlope(here: LinearModel, more: LinearModel, parameters: Float64Array) {
  const departure = ({ columns, measured }: LinearModel): Float64Array => {
    const fitted = modelled(columns, parameters);
    return fitted.map((value, i) => value - measured[i]!);
  };
  const [before, after] = [departure(here), departure(more)];
  return before.map((value, i) => (after[i]! - value) / strayLightStep);
}

function withoutStray(read: Float64Array, strayLight: number): Float64Array {
  return strayLight === 0 ? read : read.map((value) => withoutStrayLight(value, strayLight));
}

/** The absorbance from which stray light can bend a reading by more than it is read. */
const strayLightShows = 0.8;

/**
 * What a little stray light (more than is stated) would add to the model less the measured, absorbance
 * per unit fraction; null where it is fitted or no point absorbs enough to show it.
 */
export function strayLightColumn(
  input: Measurement,
  at: Int32Array,
  { measured, fit, sizes, design }: Solution,
): Float64Array | null {
  const { crude, settings, pathLengthCm } = input;
  if (settings.strayLight === 'fit') return null;
  if (!measured.some((absorbance) => absorbance > strayLightShows)) return null;
  const strayLight = sizes.strayLight + strayLightStep;
  const moved = standardsAt(input.standardsAt(strayLight), crude.wavelengthNm, sizes.shiftNm);
  const changed = designOf(moved, crude.wavelengthNm, at, pathLengthCm, settings.baseline);
  const columnsOf = ({ species, baseline }: Design) => [
    ...species,
    ...baseline.map(({ column }) => column),
  ];
  return strayLightSlope(
    { columns: columnsOf(design), measured },
    {
      columns: columnsOf(changed),
      measured: withoutStray(taken(crude.values, at), strayLight),
    },
    fit.parameters,
  );
}

export function standardsAt(
  standards: readonly SpeciesStandard[],
  wavelengthNm: Float64Array,
  shiftNm: number,
): MolarAbsorptivity[] {
  const target = shiftNm === 0 ? wavelengthNm : wavelengthNm.map((nm) => nm - shiftNm);
  return standards.map((standard) => molarAbsorptivityAt(standard, target));
}
