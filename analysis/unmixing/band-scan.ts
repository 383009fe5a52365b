import { normalCdf } from '../distributions/normal.ts';
import type { NoiseCorrelation } from '../spectrum/correlated-noise.ts';
import { type BandTemplates, bandTemplates, stepOf, widthsNm } from './band-templates.ts';

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

const smallestSample = 20;

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
 * stands out most once `correlation` is allowed for. Places are looked through on sums over short
 * blocks first; those that come near the strongest are then looked at point by point.
 */
export function strongestBand(scan: Scan, correlation: NoiseCorrelation): Band | null {
  const { nm } = scan;
  if (nm.length < smallestSample) return null;
  const step = stepOf(nm);
  const wholeScan = blocksOf(scan, 1);
  const looked = bandTemplates(nm).map((templates) => {
    const inflation = noiseInflation(correlation, step, templates.widthNm);
    return {
      templates,
      inflation,
      ...roughSizes(templates, blocksOf(scan, templates.points)),
    };
  });
  // no place whose most is below what some place has at least can be the strongest
  let atLeast = 0;
  for (const { least, inflation } of looked) {
    for (let c = 0; c < least.length; c++) atLeast = Math.max(atLeast, least[c]! / inflation);
  }
  let best: Band | null = null;
  let bestSize = 0;
  for (const { templates, inflation, most } of looked) {
    const { centres, widthNm } = templates;
    for (let c = 0; c < centres.length; c++) {
      if (most[c]! / inflation < atLeast) continue;
      const { match, squares, whole } = matched(scan.nm, wholeScan, templates, c);
      // what the model can make of the band itself cannot be seen
      if (!(squares > 1e-6 * whole)) continue;
      const z = match / Math.sqrt(squares);
      if (Math.abs(z) / inflation <= bestSize) continue;
      bestSize = Math.abs(z) / inflation;
      best = { nm: centres[c]!, widthNm, z, height: match / squares };
    }
  }
  return best;
}

/** By how much the squared norm of a band without the model may be off on blocks, in shares of the whole. */
const blockError = 0.01;
/** and its product with noise: three standard deviations of what a band does within its blocks. */
const blockNoise = 0.15;

/** What |z| of each template is on the blocks, at the least and at the most. */
function roughSizes({ from, start, values, squares }: BandTemplates, blocks: Blocks) {
  const least = new Float64Array(from.length);
  const most = new Float64Array(from.length);
  for (let c = 0; c < from.length; c++) {
    const [first, end, shift] = [start[c]!, start[c + 1]!, from[c]! - start[c]!];
    const match = Math.abs(dotFrom(values, first, end, blocks.residual, shift));
    const whole = dotFrom(squares, first, end, blocks.weight, shift);
    let rest = whole;
    for (let m = 0; m < blocks.basis.length; m++) {
      rest -= dotFrom(values, first, end, blocks.basis[m]!, shift) ** 2;
    }
    const slack = blockNoise * Math.sqrt(blocks.noise);
    least[c] =
      Math.max(match / Math.sqrt(whole) - slack, 0) /
      Math.sqrt(Math.max(rest, 0) / whole + blockError);
    most[c] =
      (match / Math.sqrt(whole) + slack) / Math.sqrt(Math.max(rest / whole - blockError, 1e-12));
  }
  return { least, most };
}

function dotFrom(a: Float64Array, first: number, end: number, b: Float64Array, shift: number) {
  let sum = 0;
  for (let i = first; i < end; i++) sum += a[i]! * b[i + shift]!;
  return sum;
}

/** Sums over blocks of neighbours of what a band is multiplied with. */
interface Blocks {
  /** Residual over standard deviation. */
  readonly residual: Float64Array;
  /** 1/variance. */
  readonly weight: Float64Array;
  /** Each direction of the basis over the standard deviation. */
  readonly basis: readonly Float64Array[];
  /** Mean square of the residual, in variances. */
  readonly noise: number;
}

function blocksOf({ sd, residual, basis }: Scan, points: number): Blocks {
  const summed = (vector: Float64Array | null): Float64Array => {
    const sums = new Float64Array(Math.ceil(sd.length / points));
    for (let block = 0, i = 0; block < sums.length; block++) {
      const end = Math.min(i + points, sd.length);
      let sum = 0;
      for (; i < end; i++) sum += (vector === null ? 1 / sd[i]! : vector[i]!) / sd[i]!;
      sums[block] = sum;
    }
    return sums;
  };
  return {
    residual: summed(residual),
    weight: summed(null),
    basis: basis.map(summed),
    noise: dotFrom(residual, 0, residual.length, residual, 0) / residual.length,
  };
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
  nm: Float64Array,
  { residual, weight, basis }: Blocks,
  { centres, widthNm, first: firsts, end: ends }: BandTemplates,
  c: number,
): { match: number; squares: number; whole: number } {
  const [place, first, end] = [centres[c]!, firsts[c]!, ends[c]!];
  const band = new Float64Array(end - first);
  let match = 0;
  let whole = 0;
  for (let i = first; i < end; i++) {
    const distance = (nm[i]! - place) / widthNm;
    const value = Math.exp(-0.5 * distance * distance);
    band[i - first] = value;
    match += value * residual[i]!;
    whole += value * value * weight[i]!;
  }
  let squares = whole;
  for (let m = 0; m < basis.length; m++) {
    squares -= dotFrom(band, 0, band.length, basis[m]!, first) ** 2;
  }
  return { match, squares, whole };
}
