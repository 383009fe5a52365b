import {
  independent,
  levelOf,
  type NoiseCorrelation,
  type NoiseSample,
  noiseCorrelation,
} from '../spectrum/correlated-noise.ts';
import { type KnownNoise, levelToUse } from '../spectrum/noise-level.ts';
import { divided, orthonormal, projectedOut, rooted } from '../spectrum/vectors.ts';
import type { SampledNoise } from '../standards/contrasts.ts';
import {
  type Band,
  bandColumn,
  type Scan,
  scanLimit,
  sizeAmongNoise,
  strongestBand,
} from './band-scan.ts';
import { stepOf } from './band-templates.ts';
import type { WeightedFit } from './weighted-fit.ts';

/** What the residual of a fit says of the noise. */
export interface NoiseOfFit {
  readonly correlation: NoiseCorrelation;
  /** Factor on the variance of the points: lack of fit, and the scale of an estimated noise. */
  readonly excess: number;
  /** Degrees of freedom behind `excess` and the correlation; Infinity where neither was needed. */
  readonly df: number;
  /** The same factor with any unexplained band left out: what the instrument alone does. */
  readonly instrumentLevel: number;
  /** The band that stands out most, and whether noise explains it. */
  readonly band: FoundBand | null;
}

export interface FoundBand extends Band {
  /** z with the noise's correlation and level allowed for. */
  readonly size: number;
  /** Sizes above this are not noise (1 % of scans). */
  readonly limit: number;
}

/** Chance that a scan calls noise a band. */
const falseAlarm = 0.01;

interface FittedPoints {
  /** Positions of the fitted points on the crude's own grid. */
  readonly at: Int32Array;
  readonly nm: Float64Array;
  readonly fit: WeightedFit;
  /** Further columns, not whitened, that are no noise if they are there: the slope of a wavelength offset. */
  readonly beside: readonly Float64Array[];
}

/**
 * Correlation and level of the noise from the residual together with what other measurements of the
 * sheet show (`others` on the same step). A band in the residual is taken out first if, by the noise
 * that remains without it, it is no noise.
 */
export function noiseOfFit(
  points: FittedPoints,
  others: readonly SampledNoise[],
  from: KnownNoise['from'],
): NoiseOfFit {
  const { at, nm, fit } = points;
  const step = stepOf(nm);
  const near = others
    .filter(({ stepNm }) => Math.abs(stepNm - step) < 0.02 * step)
    .map(({ sample }) => sample);
  const scan = scanOf(points);
  const plain = sampleOf(at, scan.residual, scan.basis);
  const correlation = noiseCorrelation([plain, ...near]);
  const sd = scan.sd;
  const whole = levelOf(sampleOf(at, divided(fit.residual, sd), scan.model), correlation.rho);
  const raw = levelToUse(whole.variance, whole.df, from);
  const known = { level: raw.level, df: joinedDf(raw.measured ? whole.df : Infinity, correlation) };
  const withoutBand = strongestBand(scan, correlation);
  if (!withoutBand) {
    return {
      correlation,
      excess: known.level,
      df: known.df,
      instrumentLevel: known.level,
      band: null,
    };
  }
  const size = Math.abs(sizeAmongNoise(withoutBand, correlation, step));
  const slight = size < Math.max(Math.sqrt(slightShare * at.length), sureToLook);
  const cleaned = slight
    ? withSlightBand(points, withoutBand, plain, correlation, from)
    : withBandsOut(points, scan, near, from);
  if (Math.abs(cleaned.band.size) <= cleaned.band.limit) {
    return {
      correlation,
      excess: known.level,
      df: known.df,
      instrumentLevel: known.level,
      band: cleaned.band,
    };
  }
  const lack = levelOf(plain, cleaned.correlation.rho);
  return {
    correlation: cleaned.correlation,
    excess: Math.max(lack.variance, cleaned.level),
    df: joinedDf(lack.df, cleaned.correlation),
    instrumentLevel: cleaned.level,
    band: cleaned.band,
  };
}

/** Spikes beyond this many standard deviations count as this many. */
const farthest = 4;
/** A band of this size is taken out before the noise is looked at; correlated noise may reach it too, and loses little. */
const bandOfNote = 6;

/**
 * The residual, in absorbance, without what the further columns and the strongest band could have put
 * there, and the number of directions that are missing from it.
 */
export function cleanedResidual({ nm, fit, beside }: Omit<FittedPoints, 'at'>): {
  readonly residual: Float64Array;
  readonly directions: number;
} {
  const scan = scanOf({ nm, fit, beside });
  const band = strongestBand(scan, independent);
  const basis =
    band && Math.abs(band.z) > bandOfNote
      ? orthonormal([bandColumn(scan, band)], scan.basis)
      : scan.basis;
  const whitened = projectedOut(basis, scan.residual);
  const sizes = whitened.map(Math.abs).sort();
  const limit = (farthest * (sizes[sizes.length >> 1] ?? 0)) / 0.6745;
  return {
    residual: whitened.map((value, i) => Math.max(-limit, Math.min(limit, value)) * scan.sd[i]!),
    directions: basis.length,
  };
}

/** Share of the residual up to which a band leaves the correlation of the noise as it is. */
const slightShare = 0.1;
/** Size from which a band is taken out before the noise is looked at again, however few the points. */
const sureToLook = 5;

/** The band against the noise as the whole residual shows it. */
function withSlightBand(
  { nm }: FittedPoints,
  band: Band,
  residual: NoiseSample,
  correlation: NoiseCorrelation,
  from: KnownNoise['from'],
): { correlation: NoiseCorrelation; level: number; band: FoundBand } {
  const { variance, df } = levelOf(residual, correlation.rho);
  const { level, measured } = levelToUse(variance, df, from);
  return {
    correlation,
    level,
    band: judged(nm, band, correlation, level, measured ? df : Infinity),
  };
}

/** A hidden band of another width than those looked for is several of them. */
const mostBands = 3;

/** The strongest band against the noise that is left once it, and what it leaves, are out. */
function withBandsOut(
  { at, nm }: FittedPoints,
  scan: Scan,
  near: readonly NoiseSample[],
  from: KnownNoise['from'],
): { correlation: NoiseCorrelation; level: number; band: FoundBand } {
  let rest = scan;
  for (let count = 0; count < mostBands; count++) {
    const next = strongestBand(rest, independent);
    if (!next || (count > 0 && next.z ** 2 < slightShare * at.length)) break;
    const basis = orthonormal([bandColumn(scan, next)], rest.basis);
    rest = { ...rest, basis, residual: projectedOut(basis, rest.residual) };
  }
  const residual = sampleOf(at, rest.residual, rest.basis);
  const correlation = noiseCorrelation([residual, ...near]);
  const { variance, df } = levelOf(residual, correlation.rho);
  const { level, measured } = levelToUse(variance, df, from);
  const band = strongestBand(scan, correlation) ?? { nm: nm[0] ?? 0, widthNm: 1, height: 0, z: 0 };
  return {
    correlation,
    level,
    band: judged(nm, band, correlation, level, measured ? df : Infinity),
  };
}

function judged(
  nm: Float64Array,
  band: Band,
  correlation: NoiseCorrelation,
  level: number,
  df: number,
): FoundBand {
  const range = (nm.at(-1) ?? 0) - (nm[0] ?? 0);
  return {
    ...band,
    size: sizeAmongNoise(band, correlation, stepOf(nm)) / Math.sqrt(level),
    limit: scanLimit(range, falseAlarm, joinedDf(df, correlation)),
  };
}

/** `model` is the basis of the fit alone, which `basis` begins with. */
function scanOf({ nm, fit, beside }: Omit<FittedPoints, 'at'>) {
  const sd = rooted(fit.variance);
  const model = orthonormal(fit.whitened);
  const basis = orthonormal(
    beside.map((column) => divided(column, sd)),
    model,
  );
  const residual = projectedOut(basis, divided(fit.residual, sd));
  return { nm, sd, residual, basis, model };
}

/** Laid out on the crude's own grid, so that points left out keep their neighbours apart. */
function sampleOf(
  at: Int32Array,
  values: Float64Array,
  basis: readonly Float64Array[],
): NoiseSample {
  const first = at[0] ?? 0;
  const length = (at.at(-1) ?? -1) - first + 1;
  if (length === at.length) return { values, used: new Uint8Array(length).fill(1), basis };
  const used = new Uint8Array(length);
  for (const i of at) used[i - first] = 1;
  const spread = (vector: Float64Array): Float64Array => spreadOut(at, vector);
  return { values: spread(values), used, basis: basis.map(spread) };
}

/** One entry a point of the crude's grid from the first to the last fitted one; 0 where none was fitted. */
export function spreadOut(at: Int32Array, vector: Float64Array): Float64Array {
  const first = at[0] ?? 0;
  const length = (at.at(-1) ?? -1) - first + 1;
  if (length === at.length) return vector;
  const out = new Float64Array(length);
  for (let j = 0; j < at.length; j++) out[at[j]! - first] = vector[j]!;
  return out;
}

function joinedDf(level: number, { rho, df }: NoiseCorrelation): number {
  const ofCorrelation = rho.length > 1 ? df : Number.POSITIVE_INFINITY;
  return 1 / (1 / level + 1 / ofCorrelation);
}
