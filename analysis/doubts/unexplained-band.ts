import { xMean, xMedian } from 'ml-spectra-processing';
import { shiftSlope } from '../unmixing/unmix.ts';
import type { DoubtTest, Evidence } from './evidence.ts';
import { nmText, twoFigures } from './wording.ts';

/** Largest |z| of the scan that white noise passes in 1 of 100 spectra or so (NUMERICS.md, 6: 3.49), with a margin. */
const limit = 3.8;
/** Widths of the bands looked for, standard deviation in nm. */
const widthsNm = [4, 8, 15, 25] as const;
const smallestSample = 20;
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
  if (!best || !(Math.abs(best.z) > limit)) return [];
  const [low, high] = [best.nm - 2 * best.widthNm, best.nm + 2 * best.widthNm];
  const over = best.height > 0;
  return [
    {
      code: 'unexplained-band',
      message:
        `The residual holds a band near ${nmText(best.nm)} nm (about ${twoFigures(Math.abs(best.height) * 1000)} mAU ${over ? 'over' : 'under'} the fit, ${twoFigures(Math.abs(best.z))} times what noise would do): ` +
        'something absorbs that has no standard here, or a standard differs from what is in the flask. A band of 2 % of the largest absorbance can move the mono : bis ratio by 3 to 6 %. ' +
        'Add the species if you know it (a by-product, the solvent), exclude that range, or look for it by chromatography.',
      atNm: [Math.max(low, best.lowest), Math.min(high, best.highest)],
    },
  ];
};

interface Band {
  readonly nm: number;
  readonly widthNm: number;
  readonly z: number;
  /** Absorbance at its top. */
  readonly height: number;
  readonly lowest: number;
  readonly highest: number;
}

function strongestBand(evidence: Evidence): Band | null {
  const { crude, unmixing } = evidence;
  const { at, fit } = unmixing;
  if (at.length < smallestSample || unmixing.reducedChiSquare === null) return null;
  const nm = Float64Array.from(at, (i) => crude.wavelengthNm[i]!);
  const sd = fit.variance.map(Math.sqrt);
  const residual = fit.residual.map((value, i) => value / sd[i]!);
  const away = awayFromModel(evidence, sd);
  const clean = away(residual);
  const inflation = Math.sqrt(correlationLength(clean));
  let best: Band | null = null;
  const step = ((nm.at(-1) ?? 0) - (nm[0] ?? 0)) / (nm.length - 1);
  for (const widthNm of widthsNm) {
    const stride = Math.max(1, Math.round(widthNm / 4 / step));
    for (const [centre, place] of nm.entries()) {
      if (centre % stride !== 0) continue;
      const band = away(nm.map((x, i) => Math.exp(-0.5 * ((x - place) / widthNm) ** 2) / sd[i]!));
      const norm = band.reduce((sum, value) => sum + value * value, 0);
      if (!(norm > 1e-12)) continue;
      const match = band.reduce((sum, value, i) => sum + value * clean[i]!, 0);
      const z = match / Math.sqrt(norm) / inflation;
      if (best && Math.abs(z) <= Math.abs(best.z)) continue;
      best = { nm: place, widthNm, z, height: match / norm, lowest: nm[0]!, highest: nm.at(-1)! };
    }
  }
  return best;
}

/** Takes out of a whitened vector what the model and a wavelength offset could have made. */
function awayFromModel(
  { unmixing, settings }: Evidence,
  sd: Float64Array,
): (vector: Float64Array) => Float64Array {
  const { fit, at, molarAbsorptivity, pathLengthCm } = unmixing;
  const columns = [...fit.whitened];
  if (settings.shift === 'none') {
    const slope = shiftSlope(molarAbsorptivity, at, pathLengthCm, fit.parameters);
    columns.push(slope.map((value, i) => value / sd[i]!));
  }
  const basis = orthonormal(columns);
  return (vector) => {
    const out = vector.slice();
    for (const direction of basis) {
      const along = direction.reduce((sum, value, i) => sum + value * vector[i]!, 0);
      for (let i = 0; i < out.length; i++) out[i]! -= along * direction[i]!;
    }
    return out;
  };
}

/** Orthonormal basis of the columns' span by Gram-Schmidt, done twice (enough for these few). */
function orthonormal(columns: readonly Float64Array[]): Float64Array[] {
  const basis: Float64Array[] = [];
  for (const column of columns) {
    const start = norm(column);
    const rest = column.slice();
    for (let pass = 0; pass < 2; pass++) {
      for (const direction of basis) {
        const along = direction.reduce((sum, value, i) => sum + value * rest[i]!, 0);
        for (let i = 0; i < rest.length; i++) rest[i]! -= along * direction[i]!;
      }
    }
    const length = norm(rest);
    if (length > 1e-10 * start) basis.push(rest.map((value) => value / length));
  }
  return basis;
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
