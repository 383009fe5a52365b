import type { Reading } from '../reading/reading.ts';
import { resolveSpectrum } from '../reading/resolve-spectrum.ts';
import { Refusal } from '../refusal.ts';
import type { Sheet, SheetNoiseScans } from '../sheet/schema.ts';
import { levelsOfSquares, type NoiseLevelAt, twoParts } from '../spectrum/estimate-noise.ts';
import { medianStep } from '../spectrum/interpolate.ts';
import { absorbanceVariance, type NoiseModel } from '../spectrum/noise.ts';
import type { Spectrum } from '../spectrum/spectrum.ts';
import { orthonormal, projectedOut } from '../spectrum/vectors.ts';
import type { SampledNoise } from './contrasts.ts';

export interface NoiseOfScans {
  /** Null where the scans stand at one absorbance only (blanks) and cannot tell the two parts apart. */
  readonly model: NoiseModel | null;
  readonly samples: readonly SampledNoise[];
}

const fewestPoints = 24;

/**
 * Noise from scans of one and the same cuvette: the scatter of the scans of a group about each
 * other, offset and slope of each scan taken out (a lamp that drifts is a baseline, not noise). A group of one
 * scan is a blank: what is left about a line. Null where the sheet gives none. Blanks alone show the noise at
 * absorbance 0: they then join what standards and crude show, and give no model by themselves.
 */
export function noiseOfScans(
  sheet: Sheet,
  readings: ReadonlyMap<string, Reading>,
): NoiseOfScans | null {
  const departures = (sheet.noiseScans ?? []).flatMap((group) => departuresOf(group, readings));
  if (departures.length === 0) return null;
  const found = departures.map(levels);
  const model = twoParts(found.flat(), 0);
  const samples = departures.map(({ nm, level, values, basis }, index): SampledNoise => {
    const sd = level.map((absorbance) => Math.sqrt(absorbanceVariance(model, absorbance)));
    const whitened = orthonormal(basis.map((column) => column.map((value, i) => value / sd[i]!)));
    return {
      stepNm: medianStep(nm),
      levels: found[index] ?? [],
      sample: {
        values: projectedOut(
          whitened,
          values.map((value, i) => value / sd[i]!),
        ),
        used: new Uint8Array(nm.length).fill(1),
        basis: whitened,
      },
    };
  });
  return { model: tellsBothParts(found.flat()) ? model : null, samples };
}

/** Over which the transmittance part must grow (in variance) to be told from the constant part. */
const growth = 4;

function tellsBothParts(found: readonly NoiseLevelAt[]): boolean {
  const rises = found.map(({ rise }) => rise);
  return Math.max(...rises) > growth * Math.min(...rises);
}

/** One independent departure of a scan from the others of its group, scaled to the noise of one scan. */
interface Departure {
  readonly nm: Float64Array;
  /** Absorbance at which each point was read. */
  readonly level: Float64Array;
  readonly values: Float64Array;
  readonly basis: readonly Float64Array[];
}

function departuresOf(group: SheetNoiseScans, readings: ReadonlyMap<string, Reading>): Departure[] {
  const what = `noise scans ${group.id}`;
  const scans = group.spectra.map((spectrum, index) =>
    resolveSpectrum(spectrum, readings, 'absorbance', `${what}, scan ${index + 1}`),
  );
  const [first] = scans;
  if (!first) return [];
  refuseUnlike(scans, first, what);
  const nm = first.wavelengthNm;
  const basis = baselineOf(nm);
  const level = nm.map(
    (_, i) => scans.reduce((sum, { values }) => sum + values[i]!, 0) / scans.length,
  );
  const about = (values: Float64Array): Departure => ({
    nm,
    level,
    basis,
    values: projectedOut(basis, values),
  });
  if (scans.length === 1) return [about(first.values)];
  return scans.slice(1).map(({ values }, index) => {
    const before = index + 1;
    const scale = Math.sqrt(before / (before + 1));
    return about(
      values.map((value, i) => {
        let mean = 0;
        for (const scan of scans.slice(0, before)) mean += scan.values[i]! / before;
        return scale * (value - mean);
      }),
    );
  });
}

function baselineOf(nm: Float64Array): Float64Array[] {
  const middle = (nm[0]! + nm.at(-1)!) / 2;
  return orthonormal([new Float64Array(nm.length).fill(1), nm.map((at) => at - middle)]);
}

function refuseUnlike(scans: readonly Spectrum[], first: Spectrum, what: string): void {
  const unlike = scans.findIndex(
    ({ wavelengthNm, values }) =>
      wavelengthNm.length !== first.wavelengthNm.length ||
      wavelengthNm.some((nm, i) => Math.abs(nm - first.wavelengthNm[i]!) > 1e-6 * nm) ||
      values.some(Number.isNaN),
  );
  if (unlike === -1 && first.wavelengthNm.length >= fewestPoints) return;
  throw new Refusal({
    code: 'noise-scans-unlike',
    message:
      unlike === -1
        ? `The scans have ${first.wavelengthNm.length} points; at least ${fewestPoints} are needed to tell the noise.`
        : `Scan ${unlike + 1} does not have the same points as the first, or some of its points are missing.`,
    where: { what },
    mend: 'Give scans of one and the same cuvette, recorded over the same wavelengths without points over range.',
  });
}

function levels({ level, values, basis }: Departure): NoiseLevelAt[] {
  const flat = new Float64Array(values.length).fill(1);
  const rise = level.map((absorbance) => 100 ** absorbance);
  return levelsOfSquares(values, { flat, rise }, 1 - basis.length / values.length);
}
