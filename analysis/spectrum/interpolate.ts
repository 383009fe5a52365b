/**
 * A linear map from values on a source grid to values on a target grid: local polynomial
 * interpolation through the four nearest source points (Lagrange), exact for a cubic. Kept as a
 * sparse matrix so that noise can be carried through it.
 */
export interface Interpolation {
  /** Number of target points. */
  readonly points: number;
  /** 1 where the target lies within the source's range and not in a gap; else 0 (never extrapolated). */
  readonly covered: Uint8Array;
  /** Source index of each stencil entry, `points` × 4, row by row; weight 0 where unused. */
  readonly index: Int32Array;
  /** Weight of each stencil entry for the value, `points` × 4. */
  readonly weight: Float64Array;
  /** Weight of each stencil entry for the derivative with respect to wavelength (per nm), `points` × 4. */
  readonly slope: Float64Array;
}

export const stencil = 4;
/** A hole wider than this many median steps is a gap: nothing is interpolated across it. */
const gapInSteps = 2.5;

/**
 * @param sourceNm ascending wavelengths, nm
 * @param usable 1 where the source has a value; same length
 * @param targetNm wavelengths wanted, nm, ascending
 */
export function interpolation(
  sourceNm: Float64Array,
  usable: Uint8Array,
  targetNm: Float64Array,
): Interpolation {
  const valid = usableIndices(usable);
  const gap = gapInSteps * medianStep(sourceNm);
  const points = targetNm.length;
  const result = {
    points,
    covered: new Uint8Array(points),
    index: new Int32Array(points * stencil),
    weight: new Float64Array(points * stencil),
    slope: new Float64Array(points * stencil),
  };
  const last = valid.length - 1;
  if (last < 1) return result;
  let left = 0;
  for (let i = 0; i < points; i++) {
    const nm = targetNm[i]!;
    while (left < last - 1 && sourceNm[valid[left + 1]!]! <= nm) left++;
    while (left > 0 && sourceNm[valid[left]!]! > nm) left--;
    const low = sourceNm[valid[left]!]!;
    const high = sourceNm[valid[left + 1]!]!;
    const tolerance = 1e-9 * high;
    if (nm < low - tolerance || nm > high + tolerance) continue;
    const onPoint = Math.abs(nm - low) <= tolerance || Math.abs(nm - high) <= tolerance;
    if (!onPoint && high - low > gap) continue;
    result.covered[i] = 1;
    const size = Math.min(stencil, valid.length);
    const first = Math.min(Math.max(left - 1, 0), valid.length - size);
    lagrange(sourceNm, valid, first, size, nm, i * stencil, result);
  }
  return result;
}

/** Values on the target grid; NaN where not covered. */
export function interpolated(map: Interpolation, values: Float64Array): Float64Array {
  return applied(map, map.weight, values);
}

/** Derivative by wavelength on the target grid, per nm; NaN where not covered. */
export function interpolatedSlope(map: Interpolation, values: Float64Array): Float64Array {
  return applied(map, map.slope, values);
}

function applied(map: Interpolation, weights: Float64Array, values: Float64Array): Float64Array {
  const out = new Float64Array(map.points).fill(Number.NaN);
  for (let i = 0; i < map.points; i++) {
    if (map.covered[i] === 0) continue;
    let sum = 0;
    for (let k = i * stencil; k < (i + 1) * stencil; k++) {
      const weight = weights[k]!;
      if (weight !== 0) sum += weight * values[map.index[k]!]!;
    }
    out[i] = sum;
  }
  return out;
}

function lagrange(
  sourceNm: Float64Array,
  valid: Int32Array,
  first: number,
  size: number,
  nm: number,
  at: number,
  into: Pick<Interpolation, 'index' | 'weight' | 'slope'>,
): void {
  for (let j = 0; j < size; j++) {
    const source = valid[first + j]!;
    const xj = sourceNm[source]!;
    let weight = 1;
    let slope = 0;
    for (let m = 0; m < size; m++) {
      if (m === j) continue;
      const xm = sourceNm[valid[first + m]!]!;
      const span = xj - xm;
      slope = (slope * (nm - xm) + weight) / span;
      weight *= (nm - xm) / span;
    }
    into.index[at + j] = source;
    into.weight[at + j] = weight;
    into.slope[at + j] = slope;
  }
}

function usableIndices(usable: Uint8Array): Int32Array {
  const found = new Int32Array(usable.length);
  let count = 0;
  for (let i = 0; i < usable.length; i++) if (usable[i] === 1) found[count++] = i;
  return found.subarray(0, count);
}

/** Median distance between neighbours, nm; 0 for fewer than two points. */
export function medianStep(wavelengthNm: Float64Array): number {
  const steps = new Float64Array(Math.max(wavelengthNm.length - 1, 0));
  for (let i = 0; i < steps.length; i++) steps[i] = wavelengthNm[i + 1]! - wavelengthNm[i]!;
  steps.sort();
  return steps[steps.length >> 1] ?? 0;
}
