import { smoothers } from './smoothers.ts';
import { dot } from './vectors.ts';

/**
 * Noise whose points lean on each other: an instrument that smooths or oversamples. Residuals are
 * read as stationary noise of unit variance after whitening, with what the fit took out of them
 * put back by calculation, so that few points do not look less correlated than they are.
 */

/** One residual to learn from. Arrays have one entry for each point of the instrument's own grid. */
export interface NoiseSample {
  /** Whitened residual; 0 where not used. */
  readonly values: Float64Array;
  /** 1 where used. */
  readonly used: Uint8Array;
  /** Orthonormal basis of what was fitted and so is missing from the residual; 0 where not used. */
  readonly basis: readonly Float64Array[];
}

export interface NoiseCorrelation {
  /** Autocorrelation at lags 0, 1, …; [1] for independent points; 0 beyond. */
  readonly rho: Float64Array;
  /** Symmetric smoothing kernel, odd length, unit sum of squares, whose noise has that autocorrelation. */
  readonly kernel: Float64Array;
  /** How well it is known: degrees of freedom of a variance that leans on it; Infinity for none. */
  readonly df: number;
}

export const independent: NoiseCorrelation = {
  rho: Float64Array.of(1),
  kernel: Float64Array.of(1),
  df: Number.POSITIVE_INFINITY,
};

const mostLags = 64;
/** Lags that must stay within noise before the correlation is taken to have ended. */
const quietLags = 5;
const rounds = 3;
const fewestPoints = 24;

/**
 * Autocorrelation from all samples together. The lag at which it ends is found from the data and the
 * estimate tapered by a flat top beyond it (Politis, J. Nonparametric Statistics 15 (2003) 57), so
 * that white noise stays white. Negative power is cut, so the answer is a true correlation.
 */
export function noiseCorrelation(samples: readonly NoiseSample[]): NoiseCorrelation {
  const known = samples.map(knownSample).filter(({ degrees }) => degrees >= fewestPoints);
  if (known.length === 0) return independent;
  const freedom = known.reduce((sum, { degrees }) => sum + degrees, 0);
  const last = lastLag(known, freedom);
  if (last === 0) return { ...independent, df: freedom };
  let rho: Float64Array = Float64Array.of(1);
  let kernel: Float64Array = Float64Array.of(1);
  for (let round = 0; round < rounds; round++) {
    const next = pooledLags(known, rho, 2 * last);
    kernel = kernelOf(next.map((value, lag) => value * flatTop(lag, last)));
    rho = lagSums(kernel, kernel.length - 1);
  }
  const like = smootherLike(known, rho, Math.min(last + quietLags, 2 * last + 2), freedom);
  if (like) return { rho: lagSums(like, like.length - 1), kernel: like, df: freedom / (1 + last) };
  return { rho, kernel, df: freedom / (1 + (8 / 3) * last) };
}

/** By how much a smooth sum over points varies more than if they were independent: Σ ρ over all lags. */
export function inflationOf({ rho }: NoiseCorrelation): number {
  return rho.reduce((sum, value, lag) => sum + (lag === 0 ? 1 : 2) * value, 0);
}

/** R v, R the correlation matrix between the points of a grid. */
export function correlate(rho: Float64Array, vector: Float64Array): Float64Array {
  if (rho.length === 1) return vector;
  const out = vector.slice();
  for (let lag = 1; lag < rho.length && lag < vector.length; lag++) {
    const weight = rho[lag]!;
    for (let i = lag; i < vector.length; i++) {
      out[i]! += weight * vector[i - lag]!;
      out[i - lag]! += weight * vector[i]!;
    }
  }
  return out;
}

/** The vector smoothed by a symmetric kernel; what would come from beyond the ends is left out. */
export function smoothed(kernel: Float64Array, vector: Float64Array): Float64Array {
  if (kernel.length === 1) return vector;
  const half = kernel.length >> 1;
  const out = new Float64Array(vector.length);
  for (let shift = -half; shift <= half; shift++) {
    const weight = kernel[shift + half]!;
    const [from, to] = [Math.max(0, -shift), Math.min(vector.length, vector.length - shift)];
    for (let i = from; i < to; i++) out[i]! += weight * vector[i + shift]!;
  }
  return out;
}

/**
 * Variance of the whitened noise that left this residual, and its degrees of freedom
 * (Satterthwaite): Σu²/tr(MR), with 2 tr(MR)²/(2 tr(MRMR)) degrees, M what the fit leaves.
 */
export function levelOf(
  { values, used, basis }: NoiseSample,
  rho: Float64Array,
): { readonly variance: number; readonly df: number } {
  const moved = basis.map((q) => masked(correlate(rho, q), used));
  const pairs = lagPairs(used, rho.length - 1);
  let trace = pairs[0]!;
  let square = 0;
  for (const [lag, value] of rho.entries()) {
    square += (lag === 0 ? 1 : 2) * pairs[lag]! * value * value;
  }
  for (const [a, q] of basis.entries()) {
    trace -= dot(q, moved[a]!);
    square -= 2 * dot(moved[a]!, moved[a]!);
    for (const other of moved) square += dot(q, other) ** 2;
  }
  // as many directions as points leave nothing to tell the noise from
  if (!(trace > 1e-9 * pairs[0]!)) return { variance: 1, df: 0 };
  return { variance: dot(values, values) / trace, df: (trace * trace) / square };
}

const nearest = 5;

/**
 * The usual smoother (running mean, repeated running mean, local parabola, Gaussian) whose residual
 * would look like these, lag for lag, if one does within noise: with few points a shape with one width
 * is known far better than twenty lags. Null where none fits.
 */
function smootherLike(
  known: readonly KnownSample[],
  rho: Float64Array,
  lags: number,
  freedom: number,
): Float64Array | null {
  const seen = pooledRaw(known);
  const far = (found: Float64Array): number => {
    let sum = 0;
    for (let lag = 1; lag <= 3; lag++) sum += ((found[lag] ?? 0) - (rho[lag] ?? 0)) ** 2;
    return sum;
  };
  const near = smoothers()
    .map((kernel) => ({ kernel, itsRho: lagSums(kernel, kernel.length - 1) }))
    .sort((a, b) => far(a.itsRho) - far(b.itsRho))
    .slice(0, nearest);
  let best: { kernel: Float64Array; distance: number } | null = null;
  for (const { kernel, itsRho } of near) {
    const expected = expectedRaw(known, itsRho, lags);
    let squares = 0;
    for (let lag = 1; lag <= lags && lag < seen.length; lag++) {
      squares += (seen[lag]! - expected[lag]!) ** 2;
    }
    const spread = 2 * dot(itsRho, itsRho) - 1;
    const distance = (squares * freedom) / (lags * spread);
    if (distance < (best?.distance ?? likeEnough)) best = { kernel, distance };
  }
  return best?.kernel ?? null;
}

/** Mean squared departure, in what sampling would give, up to which a smoother is taken for the one at work. */
const likeEnough = 3;

function expectedRaw(known: readonly KnownSample[], rho: Float64Array, lags: number): Float64Array {
  const sum = new Float64Array(lags + 1);
  const pairs = new Float64Array(lags + 1);
  for (const each of known) {
    const reach = Math.min(lags, each.sums.length - 1);
    const expected = expectedLags(each, rho, reach);
    for (let lag = 0; lag <= reach; lag++) {
      sum[lag]! += (expected[lag]! / expected[0]!) * each.pairs[0]!;
      pairs[lag]! += each.pairs[lag]!;
    }
  }
  return sum.map((value, lag) => (pairs[lag]! > 0 ? value / pairs[lag]! : 0));
}

/** Sums of samples: those of the standards come again with every aliquot. */
const knownSums = new WeakMap<NoiseSample, KnownSample>();

function knownSample(sample: NoiseSample): KnownSample {
  const before = knownSums.get(sample);
  if (before) return before;
  const lags = Math.min(mostLags, Math.floor(sample.values.length / 4));
  const sums = lagSums(sample.values, lags);
  const pairs = lagPairs(sample.used, lags);
  const known = { sample, degrees: degreesOf(sample), sums, pairs };
  knownSums.set(sample, known);
  return known;
}

interface KnownSample {
  readonly sample: NoiseSample;
  /** Points used, less what was fitted. */
  readonly degrees: number;
  /** Σ u(i) u(i + lag). */
  readonly sums: Float64Array;
  /** Number of such pairs. */
  readonly pairs: Float64Array;
}

function degreesOf({ used, basis }: NoiseSample): number {
  let count = -basis.length;
  for (const one of used) count += one;
  return count;
}

function lagSums(values: Float64Array, lags: number): Float64Array {
  const sums = new Float64Array(lags + 1);
  for (let lag = 0; lag <= lags; lag++) {
    let sum = 0;
    for (let i = lag; i < values.length; i++) sum += values[i]! * values[i - lag]!;
    sums[lag] = sum;
  }
  return sums;
}

function lagPairs(used: Uint8Array, lags: number): Float64Array {
  if (!used.includes(0))
    return Float64Array.from({ length: lags + 1 }, (_, lag) => used.length - lag);
  return lagSums(Float64Array.from(used), lags);
}

/** The last lag before several in a row that noise alone would give. */
function lastLag(known: readonly KnownSample[], freedom: number): number {
  const rho = pooledRaw(known);
  const limit = 2 * Math.sqrt(Math.log10(freedom) / freedom);
  for (let lag = 0; lag + quietLags < rho.length; lag++) {
    const next = rho.subarray(lag + 1, lag + 1 + quietLags);
    if (next.every((value) => Math.abs(value) < limit)) return lag;
  }
  return Math.max(rho.length - 1 - quietLags, 0) >> 1;
}

function pooledRaw(known: readonly KnownSample[]): Float64Array {
  const lags = Math.min(...known.map(({ sums }) => sums.length));
  return Float64Array.from({ length: lags }, (_, lag) => {
    let [sum, pairs] = [0, 0];
    for (const each of known) {
      sum += (each.sums[lag]! / each.sums[0]!) * each.pairs[0]!;
      pairs += each.pairs[lag]!;
    }
    return pairs > 0 ? sum / pairs : 0;
  });
}

/** One round: what each residual shows, plus what its fit must have taken out of noise with this `rho`. */
function pooledLags(known: readonly KnownSample[], rho: Float64Array, lags: number): Float64Array {
  const sum = new Float64Array(lags + 1);
  const pairs = new Float64Array(lags + 1);
  for (const each of known) {
    const reach = Math.min(lags, each.sums.length - 1);
    const expected = expectedLags(each, rho, reach);
    const scale = expected[0]! / each.sums[0]!;
    for (let lag = 0; lag <= reach; lag++) {
      const supposed = each.pairs[lag]! * (rho[lag] ?? 0);
      sum[lag]! += each.sums[lag]! * scale + supposed - expected[lag]!;
      pairs[lag]! += each.pairs[lag]!;
    }
  }
  return sum.map((value, lag) =>
    pairs[lag]! > 0 ? (value / pairs[lag]!) * (pairs[0]! / sum[0]!) : 0,
  );
}

/** Expected Σ u(i) u(i + lag) of a residual of noise with autocorrelation `rho` and unit variance. */
function expectedLags(
  { sample: { basis, used }, pairs }: KnownSample,
  rho: Float64Array,
  lags: number,
): Float64Array {
  const expected = Float64Array.from(
    { length: lags + 1 },
    (_, lag) => pairs[lag]! * (rho[lag] ?? 0),
  );
  const moved = basis.map((q) => masked(correlate(rho, q), used));
  for (const [a, q] of basis.entries()) {
    // q ⊗ (½ Σ q' (q'·Rq) - Rq), taken twice for both halves of the symmetric difference
    const rest = moved[a]!.map((value) => -value);
    for (const other of basis) {
      const along = 0.5 * dot(other, moved[a]!);
      for (let i = 0; i < rest.length; i++) rest[i]! += along * other[i]!;
    }
    for (let lag = 0; lag <= lags; lag++) {
      let sum = 0;
      for (let i = lag; i < q.length; i++) sum += q[i]! * rest[i - lag]! + rest[i]! * q[i - lag]!;
      expected[lag]! += sum;
    }
  }
  return expected;
}

function masked(vector: Float64Array, used: Uint8Array): Float64Array {
  if (!used.includes(0)) return vector;
  return vector.map((value, i) => value * used[i]!);
}

function flatTop(lag: number, last: number): number {
  return lag <= last ? 1 : Math.max(0, 1 - (lag - last) / last);
}

/** Symmetric kernel whose square in the frequencies is the spectrum of `rho`, cut at 0. */
function kernelOf(rho: Float64Array): Float64Array {
  const size = 256;
  const cosine = Float64Array.from({ length: size }, (_, j) => Math.cos((2 * Math.PI * j) / size));
  const amplitude = Float64Array.from({ length: size }, (_, j) => {
    let power = rho[0]!;
    for (let lag = 1; lag < rho.length; lag++) {
      power += 2 * rho[lag]! * cosine[(j * lag) % size]!;
    }
    return Math.sqrt(Math.max(power, 0));
  });
  const half = Math.min(rho.length - 1, size / 2 - 1);
  const side = Float64Array.from({ length: half + 1 }, (_, lag) => {
    let sum = 0;
    for (let j = 0; j < size; j++) sum += amplitude[j]! * cosine[(j * lag) % size]!;
    return sum / size;
  });
  const kernel = Float64Array.from({ length: 2 * half + 1 }, (_, i) => side[Math.abs(i - half)]!);
  const length = Math.sqrt(dot(kernel, kernel));
  return kernel.map((value) => value / length);
}
