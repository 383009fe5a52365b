import {
  type Interpolation,
  interpolated,
  interpolatedSlope,
  interpolation,
  stencil,
} from '../spectrum/interpolate.ts';
import type { SpeciesStandard } from './species-standard.ts';

/** ε of one species on a target grid, with what is needed to carry the standards' noise through a fit. */
export interface MolarAbsorptivity {
  readonly species: string;
  /** L mol⁻¹ cm⁻¹; NaN where no solution covers the point. */
  readonly epsilon: Float64Array;
  /** dε/dλ, per nm. */
  readonly slope: Float64Array;
  /** Standard deviation of the point noise of `epsilon`. */
  readonly sd: Float64Array;
  readonly parts: readonly SolutionPart[];
}

interface SolutionPart {
  readonly map: Interpolation;
  /** Share of this solution in ε at each target point, times its factor. */
  readonly share: Float64Array;
  /** Share times interpolation: what each of the solution's own points gives to each target point. */
  readonly gives: Gives;
  /** Noise of the solution's own points, L mol⁻¹ cm⁻¹. */
  readonly sd: Float64Array;
}

/** One species on one grid, as it was asked for before. */
interface Known {
  /** A copy: a grid that is changed in place is another grid. */
  readonly targetNm: Float64Array;
  readonly found: MolarAbsorptivity;
}

/** The crude's grid and those of a few tried shifts; a batch of spectra on one grid asks for the first only. */
const mostGrids = 4;
const knownOf = new WeakMap<SpeciesStandard, Known[]>();

/** The entries of a sparse matrix that are not 0, target point by target point. */
export interface Gives {
  /** Where each target point's entries begin; one more than there are target points. */
  readonly start: Int32Array;
  /** The solution's own point. */
  readonly point: Int32Array;
  readonly value: Float64Array;
}

function givesOf(map: Interpolation, share: Float64Array): Gives {
  const start = new Int32Array(map.points + 1);
  const point = new Int32Array(map.index.length);
  const value = new Float64Array(map.index.length);
  let count = 0;
  for (let i = 0; i < map.points; i++) {
    for (let k = i * stencil; k < (i + 1) * stencil; k++) {
      const entry = share[i]! * map.weight[k]!;
      if (entry === 0) continue;
      point[count] = map.index[k]!;
      value[count++] = entry;
    }
    start[i + 1] = count;
  }
  return { start, point: point.slice(0, count), value: value.slice(0, count) };
}

/**
 * Brings the standards of one species to the target wavelengths and joins them point by point,
 * each weighted by its noise there; never extrapolates. Spectra that share a grid share the answer,
 * which is not to be changed.
 */
export function molarAbsorptivityAt(
  standard: SpeciesStandard,
  targetNm: Float64Array,
): MolarAbsorptivity {
  const known = knownOf.get(standard) ?? [];
  const place = known.findIndex((each) => isSameGrid(each.targetNm, targetNm));
  const before = known[place];
  if (before) {
    // those asked for last are kept
    if (place > 0) known.unshift(...known.splice(place, 1));
    return before.found;
  }
  const found = joinedAt(standard, targetNm);
  known.unshift({ targetNm: targetNm.slice(), found });
  known.length = Math.min(known.length, mostGrids);
  knownOf.set(standard, known);
  return found;
}

function isSameGrid(a: Float64Array, b: Float64Array): boolean {
  if (a.length !== b.length) return false;
  for (let i = 0; i < a.length; i++) if (a[i] !== b[i]) return false;
  return true;
}

function joinedAt(standard: SpeciesStandard, targetNm: Float64Array): MolarAbsorptivity {
  const points = targetNm.length;
  const epsilon = new Float64Array(points);
  const slope = new Float64Array(points);
  const sd = new Float64Array(points);
  const total = new Float64Array(points);
  const found = standard.solutions.map((solution, s) => {
    const map = interpolation(solution.wavelengthNm, solution.usable, targetNm);
    const factor = standard.factors[s]!;
    const noise = interpolatedSd(map, solution.sd);
    const share = new Float64Array(points);
    for (let i = 0; i < points; i++) {
      if (map.covered[i] === 0) continue;
      share[i] = 1 / (factor * factor * noise[i]! * noise[i]!);
      total[i]! += share[i]!;
    }
    return { solution, map, factor, share, noise };
  });
  for (const { solution, map, factor, share, noise } of found) {
    const value = interpolated(map, solution.epsilon);
    const derivative = interpolatedSlope(map, solution.epsilon);
    for (let i = 0; i < points; i++) {
      if (map.covered[i] === 0) continue;
      share[i] = (share[i]! / total[i]!) * factor;
      epsilon[i]! += share[i]! * value[i]!;
      slope[i]! += share[i]! * derivative[i]!;
      sd[i]! += (share[i]! * noise[i]!) ** 2;
    }
  }
  for (let i = 0; i < points; i++) {
    sd[i] = Math.sqrt(sd[i]!);
    if (total[i] === 0) epsilon[i] = Number.NaN;
  }
  const parts = found.map(({ map, share, solution }) => ({
    map,
    share,
    gives: givesOf(map, share),
    sd: solution.sd,
  }));
  return { species: standard.species, epsilon, slope, sd, parts };
}

function interpolatedSd(map: Interpolation, sd: Float64Array): Float64Array {
  const out = new Float64Array(map.points);
  for (let i = 0; i < map.points; i++) {
    let variance = 0;
    for (let k = i * stencil; k < (i + 1) * stencil; k++) {
      variance += (map.weight[k]! * sd[map.index[k]!]!) ** 2;
    }
    out[i] = Math.sqrt(variance);
  }
  return out;
}
