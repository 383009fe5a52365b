import { xMean, xMedian } from 'ml-spectra-processing';
import { shiftSlope } from '../unmixing/standards-on-points.ts';
import type { DoubtTest, Evidence } from './evidence.ts';
import { listText, nmText, percentText, twoFigures } from './wording.ts';

/**
 * Largest |z| of the scan that is still taken for noise. Measured on 1000 clean aliquots of the sample,
 * the noise estimated from each: 1.3 % false alarms.
 */
const limit = 3.8;
/** Widths of the bands looked for, standard deviation in nm. */
const widthsNm = [4, 8, 15, 25] as const;
const smallestSample = 20;
/** Smaller relative changes of an amount are not worth a word. */
const shareOfNote = 0.01;
const farInWidths = 4;
const blockPoints = 8;
const fewestBlocks = 8;
/** Scale of a normal sample from its median absolute value: 1 / Φ⁻¹(3/4). */
const medianToSd = 1.482602218505602;

/**
 * Matched-filter scan of the whitened residual: a Gaussian band at every place and of several
 * widths, made orthogonal to the model and to a wavelength offset (which would else be taken for
 * a band), against the noise. Noise that is correlated from point to point is allowed for by the
 * residual's own autocorrelation.
 */
export const unexplainedBand: DoubtTest = (evidence) => {
  const best = strongestBand(evidence);
  if (!best || !(Math.abs(best.z) > limit) || Math.abs(best.height) < heightOfNote(evidence))
    return [];
  const [low, high] = [best.nm - 2 * best.widthNm, best.nm + 2 * best.widthNm];
  const over = best.height > 0;
  return [
    {
      code: 'unexplained-band',
      message:
        `The residual holds a band near ${nmText(best.nm)} nm (about ${twoFigures(Math.abs(best.height) * 1000)} mAU ${over ? 'over' : 'under'} the fit, ${twoFigures(Math.abs(best.z))} times what noise would do): ` +
        `something absorbs that has no standard here, or a standard differs from what is in the flask. ${effectText(evidence, best)} ` +
        'Add the species if you know it (a by-product, the solvent), exclude that range, or look for it by chromatography.',
      atNm: [Math.max(low, best.lowest), Math.min(high, best.highest)],
    },
  ];
};

export interface Band {
  readonly nm: number;
  readonly widthNm: number;
  /** In standard deviations, noise that is correlated from point to point allowed for. */
  readonly z: number;
  /** The same against independent noise, as other scores are. */
  readonly againstNoise: number;
  /** Absorbance at its top. */
  readonly height: number;
  readonly lowest: number;
  readonly highest: number;
}

/** What a band of that place, width and height does to the amounts: the fit's own gain on it. */
function effectText({ crude, unmixing, nameOf }: Evidence, band: Band): string {
  const { at, fit, amounts, species } = unmixing;
  const moved = species.flatMap((id, k) => {
    const gain = fit.gain[k];
    const amount = amounts[k] ?? 0;
    if (!gain || !(amount > 0)) return [];
    let bias = 0;
    for (const [j, i] of at.entries()) {
      const distance = ((crude.wavelengthNm[i] ?? 0) - band.nm) / band.widthNm;
      bias += gain[j]! * band.height * Math.exp(-0.5 * distance * distance);
    }
    const share = bias / amount;
    if (Math.abs(share) < shareOfNote) return [];
    return [
      `${nameOf(id)} ${share > 0 ? 'too high' : 'too low'} by some ${percentText(Math.abs(share))}`,
    ];
  });
  return moved.length === 0
    ? 'A band of this kind hardly moves the amounts, but another part of the same species may.'
    : `A band of this kind makes ${listText(moved)}; what else the species absorbs comes on top, so the interval does not hold.`;
}

/** What interpolation and rounding can leave behind moves no answer: a thousandth of the signal, four times the noise, or 0.1 mAU. */
function heightOfNote({ unmixing: { fit, noise } }: Evidence): number {
  const least = Math.max(1e-4, 4 * noise.constant);
  return fit.fitted.reduce((most, value) => Math.max(most, 1e-3 * value), least);
}

/** The band that stands out most from the residual; null where there are too few points to look. */
export function strongestBand({ crude, unmixing, settings }: Evidence): Band | null {
  const { at, fit } = unmixing;
  if (at.length < smallestSample || unmixing.reducedChiSquare === null) return null;
  const nm = Float64Array.from(at, (i) => crude.wavelengthNm[i]!);
  const sd = fit.variance.map(Math.sqrt);
  const basis = modelBasis(unmixing, settings.shift, sd);
  const residual = projectedOut(
    basis,
    fit.residual.map((value, i) => value / sd[i]!),
  );
  const inflation = Math.sqrt(correlationLength(residual));
  const [lowest, highest] = [nm[0]!, nm[nm.length - 1]!];
  const step = (highest - lowest) / (nm.length - 1);
  let best: Band | null = null;
  for (const widthNm of widthsNm) {
    const stride = Math.max(1, Math.round(widthNm / 4 / step));
    for (let centre = 0; centre < nm.length; centre += stride) {
      const { match, squares } = matched({ nm, sd, residual, basis }, nm[centre]!, widthNm);
      if (!(squares > 1e-12)) continue;
      const z = match / Math.sqrt(squares) / inflation;
      if (best && Math.abs(z) <= Math.abs(best.z)) continue;
      const againstNoise = z * inflation;
      best = {
        nm: nm[centre]!,
        widthNm,
        z,
        againstNoise,
        height: match / squares,
        lowest,
        highest,
      };
    }
  }
  return best;
}

interface Scan {
  readonly nm: Float64Array;
  readonly sd: Float64Array;
  /** Whitened, with the model taken out. */
  readonly residual: Float64Array;
  /** Orthonormal basis of what the model can make. */
  readonly basis: readonly Float64Array[];
}

/**
 * Inner product of a whitened Gaussian band with the residual, and the squared norm of the band
 * with the model taken out: |b|² - Σ (b·q)². (The residual has the model taken out already.)
 */
function matched(
  { nm, sd, residual, basis }: Scan,
  place: number,
  widthNm: number,
): { match: number; squares: number } {
  const along = new Float64Array(basis.length);
  let match = 0;
  let squares = 0;
  for (let i = 0; i < nm.length; i++) {
    const distance = (nm[i]! - place) / widthNm;
    if (distance < -farInWidths) continue;
    if (distance > farInWidths) break;
    const value = Math.exp(-0.5 * distance * distance) / sd[i]!;
    match += value * residual[i]!;
    squares += value * value;
    for (let m = 0; m < basis.length; m++) along[m]! += value * basis[m]![i]!;
  }
  for (const value of along) squares -= value * value;
  return { match, squares };
}

/** The whitened model with the slope of a wavelength offset beside it (else an offset passes for bands). */
function modelBasis(
  { fit, at, molarAbsorptivity, pathLengthCm }: Evidence['unmixing'],
  shift: Evidence['settings']['shift'],
  sd: Float64Array,
): Float64Array[] {
  if (shift === 'common') return orthonormal(fit.whitened);
  const slope = shiftSlope(molarAbsorptivity, at, pathLengthCm, fit.parameters);
  return orthonormal([...fit.whitened, slope.map((value, i) => value / sd[i]!)]);
}

/** Orthonormal basis of the columns' span by Gram-Schmidt, done twice (enough for these few). */
function orthonormal(columns: readonly Float64Array[]): Float64Array[] {
  const basis: Float64Array[] = [];
  for (const column of columns) {
    const start = norm(column);
    const rest = projectedOut(basis, projectedOut(basis, column));
    const length = norm(rest);
    if (length > 1e-10 * start) basis.push(rest.map((value) => value / length));
  }
  return basis;
}

function projectedOut(basis: readonly Float64Array[], vector: Float64Array): Float64Array {
  const out = vector.slice();
  for (const direction of basis) {
    let along = 0;
    for (let i = 0; i < out.length; i++) along += direction[i]! * vector[i]!;
    for (let i = 0; i < out.length; i++) out[i]! -= along * direction[i]!;
  }
  return out;
}

function norm(vector: Float64Array): number {
  return Math.sqrt(vector.reduce((sum, value) => sum + value * value, 0));
}

/**
 * How many points count as one: the variance of the means of small blocks over what white noise of
 * unit variance would give (from their second differences, by the median, so that a band does not
 * pass for correlation). 1 for white noise, more where the instrument smooths or oversamples.
 */
function correlationLength(residual: Float64Array): number {
  const blocks = Math.floor(residual.length / blockPoints);
  if (blocks < fewestBlocks) return 1;
  const means = Float64Array.from({ length: blocks }, (_, block) =>
    xMean(residual.subarray(block * blockPoints, (block + 1) * blockPoints)),
  );
  const bends = Float64Array.from({ length: blocks - 2 }, (_, block) =>
    Math.abs(means[block]! - 2 * means[block + 1]! + means[block + 2]!),
  );
  const sd = (medianToSd * xMedian(bends)) / Math.sqrt(6);
  return Math.max(1, blockPoints * sd * sd);
}
