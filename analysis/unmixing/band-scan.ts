import { normalCdf } from '../distributions/normal.ts';
import type { NoiseCorrelation } from '../spectrum/correlated-noise.ts';

/** A Gaussian band that the residual seems to hold. */
export interface Band {
  readonly nm: number;
  /** Standard deviation, nm. */
  readonly widthNm: number;
  /** Absorbance at its top. */
  readonly height: number;
  /** Against independent noise of unit variance. */
  readonly z: number;
}

/** Widths of the bands looked for, standard deviation in nm. */
const widthsNm = [4, 8, 15, 25] as const;
const smallestSample = 20;
const farInWidths = 4;

export interface Scan {
  /** Wavelengths of the fitted points, ascending. */
  readonly nm: Float64Array;
  /** Expected standard deviation at each. */
  readonly sd: Float64Array;
  /** Whitened residual with the basis taken out. */
  readonly residual: Float64Array;
  /** Orthonormal basis of what the whitened model can make. */
  readonly basis: readonly Float64Array[];
}

/**
 * Matched-filter scan of a whitened residual: a Gaussian band at every place and of several widths,
 * made orthogonal to the model. Null where there are too few points to look. The band returned
 * stands out most once `correlation` is allowed for.
 */
export function strongestBand(scan: Scan, correlation: NoiseCorrelation): Band | null {
  const { nm } = scan;
  if (nm.length < smallestSample) return null;
  const step = stepOf(nm);
  let best: Band | null = null;
  let bestSize = 0;
  for (const widthNm of widthsNm) {
    const stride = Math.max(1, Math.round(widthNm / 4 / step));
    const inflation = noiseInflation(correlation, step, widthNm);
    for (let centre = 0; centre < nm.length; centre += stride) {
      const { match, squares, whole } = matched(scan, nm[centre]!, widthNm);
      // what the model can make of the band itself cannot be seen
      if (!(squares > 1e-6 * whole)) continue;
      const z = match / Math.sqrt(squares);
      if (Math.abs(z) / inflation <= bestSize) continue;
      bestSize = Math.abs(z) / inflation;
      best = { nm: nm[centre]!, widthNm, z, height: match / squares };
    }
  }
  return best;
}

/** z of a band with noise that is correlated from point to point allowed for. */
export function sizeAmongNoise(
  { z, widthNm }: Pick<Band, 'z' | 'widthNm'>,
  correlation: NoiseCorrelation,
  stepNm: number,
): number {
  return z / noiseInflation(correlation, stepNm, widthNm);
}

/** By what correlated noise exceeds independent noise in the projection on a band: √Σ ρ(lag)·(band's own overlap). */
function noiseInflation({ rho }: NoiseCorrelation, stepNm: number, widthNm: number): number {
  let sum = 1;
  for (let lag = 1; lag < rho.length; lag++) {
    sum += 2 * rho[lag]! * Math.exp(-(((lag * stepNm) / widthNm) ** 2) / 4);
  }
  return Math.sqrt(Math.max(sum, 0.05));
}

/**
 * The largest |z| that noise gives in a fraction `falseAlarm` of scans over a range: expected
 * upcrossings of a Gaussian process (Rice 1944; Davies, Biometrika 64 (1977) 247), whose length is
 * range/(√2 width) for a matched Gaussian, over all widths; an upper bound, since the widths overlap.
 *
 * @param df degrees of freedom behind the noise; Infinity where known
 */
export function scanLimit(rangeNm: number, falseAlarm: number, df: number): number {
  const length = widthsNm.reduce((sum, width) => sum + rangeNm / (Math.SQRT2 * width), 0);
  let [low, high] = [2, 12];
  for (let step = 0; step < 50; step++) {
    const level = (low + high) / 2;
    const chance =
      2 * widthsNm.length * normalCdf(-level) + (length / Math.PI) * Math.exp((-level * level) / 2);
    if (chance > falseAlarm) low = level;
    else high = level;
  }
  // the noise's own uncertainty widens the tail: first term of Student's expansion (Abramowitz and Stegun, 26.7.5)
  return high + (high ** 3 + high) / (4 * df);
}

export function stepOf(nm: Float64Array): number {
  return ((nm.at(-1) ?? 0) - (nm[0] ?? 0)) / Math.max(nm.length - 1, 1);
}

/** The band on the points, whitened. */
export function bandColumn(
  { nm, sd }: Pick<Scan, 'nm' | 'sd'>,
  { nm: centre, widthNm }: Pick<Band, 'nm' | 'widthNm'>,
): Float64Array {
  return nm.map((at, i) => Math.exp(-0.5 * ((at - centre) / widthNm) ** 2) / sd[i]!);
}

/**
 * Inner product of a whitened Gaussian band with the residual, and the squared norm of the band
 * with the model taken out: |b|² - Σ (b·q)². (The residual has the model taken out already.)
 */
function matched(
  { nm, sd, residual, basis }: Scan,
  place: number,
  widthNm: number,
): { match: number; squares: number; whole: number } {
  const along = new Float64Array(basis.length);
  let match = 0;
  let whole = 0;
  for (let i = 0; i < nm.length; i++) {
    const distance = (nm[i]! - place) / widthNm;
    if (distance < -farInWidths) continue;
    if (distance > farInWidths) break;
    const value = Math.exp(-0.5 * distance * distance) / sd[i]!;
    match += value * residual[i]!;
    whole += value * value;
    for (let m = 0; m < basis.length; m++) along[m]! += value * basis[m]![i]!;
  }
  let squares = whole;
  for (const value of along) squares -= value * value;
  return { match, squares, whole };
}
