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
      const { match, squares, whole } = matched(wholeScan, templates, c);
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
  const slack = blockNoise * Math.sqrt(blocks.noise);
  const along = new Float64Array(tiled(blocks.count));
  for (let c = 0; c < from.length; c++) {
    const [first, end] = [start[c]!, start[c + 1]!];
    products(values, first, end, blocks, from[c]!, along);
    let whole = 0;
    for (let i = first, at = from[c]!; i < end; i++, at++)
      whole += squares[i]! * blocks.weight[at]!;
    const match = Math.abs(along[0]!) / Math.sqrt(whole);
    const rest = withoutModel(whole, along) / whole;
    least[c] = Math.max(match - slack, 0) / Math.sqrt(Math.max(rest, 0) + blockError);
    most[c] = (match + slack) / Math.sqrt(Math.max(rest - blockError, 1e-12));
  }
  return { least, most };
}

/** |b|² - Σ (b·q)²; the products with the basis stand behind that with the residual. */
function withoutModel(whole: number, along: Float64Array): number {
  let squares = whole;
  for (let m = 1; m < along.length; m++) squares -= along[m]! * along[m]!;
  return squares;
}

/** Sums over blocks of neighbours of what a band is multiplied with. */
interface Blocks {
  /** How many vectors: the residual and each direction of the basis. */
  readonly count: number;
  /** The residual and the directions, each over the standard deviation: four side by side, block by block. */
  readonly packed: Float64Array;
  readonly blocks: number;
  /** 1/variance. */
  readonly weight: Float64Array;
  /** Mean square of the residual, in variances. */
  readonly noise: number;
}

/** As many products as are found in one pass. */
const side = 4;
const tiled = (count: number) => side * Math.ceil(count / side);

function blocksOf({ sd, residual, basis }: Scan, points: number): Blocks {
  const blocks = Math.ceil(sd.length / points);
  const vectors = [residual, ...basis];
  const packed = new Float64Array(tiled(vectors.length) * blocks);
  for (const [m, vector] of vectors.entries()) {
    const from = Math.floor(m / side) * blocks * side + (m % side);
    for (let block = 0; block < blocks; block++) {
      const end = Math.min((block + 1) * points, sd.length);
      let sum = 0;
      for (let i = block * points; i < end; i++) sum += vector[i]! / sd[i]!;
      packed[from + block * side] = sum;
    }
  }
  const weight = new Float64Array(blocks);
  let noise = 0;
  for (let i = 0; i < sd.length; i++) {
    weight[Math.floor(i / points)]! += 1 / (sd[i]! * sd[i]!);
    noise += residual[i]! * residual[i]!;
  }
  return { count: vectors.length, packed, blocks, weight, noise: noise / sd.length };
}

/** Products of values[first…end) with each vector from block `at` on. */
function products(
  values: Float64Array,
  first: number,
  end: number,
  { count, packed, blocks }: Blocks,
  at: number,
  out: Float64Array,
): void {
  for (let m = 0; m < count; m += side) {
    let s0 = 0;
    let s1 = 0;
    let s2 = 0;
    let s3 = 0;
    for (let i = first, p = (m / side) * blocks * side + at * side; i < end; i++, p += side) {
      const value = values[i]!;
      s0 += value * packed[p]!;
      s1 += value * packed[p + 1]!;
      s2 += value * packed[p + 2]!;
      s3 += value * packed[p + 3]!;
    }
    out[m] = s0;
    out[m + 1] = s1;
    out[m + 2] = s2;
    out[m + 3] = s3;
  }
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
  blocks: Blocks,
  { bands, pointStart, first }: BandTemplates,
  c: number,
): { match: number; squares: number; whole: number } {
  const [from, to] = [pointStart[c]!, pointStart[c + 1]!];
  let whole = 0;
  for (let i = from, at = first[c]!; i < to; i++, at++) {
    whole += bands[i]! * bands[i]! * blocks.weight[at]!;
  }
  const along = new Float64Array(tiled(blocks.count));
  products(bands, from, to, blocks, first[c]!, along);
  return { match: along[0]!, squares: withoutModel(whole, along), whole };
}
