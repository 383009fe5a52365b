import type { FitSettings } from '../sheet/defaults.ts';
import type { Sheet, SheetStandard } from '../sheet/schema.ts';
import { estimateNoise } from '../spectrum/estimate-noise.ts';
import { absorbanceVariance, type NoiseModel, noiseFloor } from '../spectrum/noise.ts';
import type { Spectrum } from '../spectrum/spectrum.ts';
import { withoutStrayLight } from '../spectrum/stray-light.ts';

/** An error common to a whole spectrum: "stock mono-A", "dilution of S1". */
export interface ScaleError {
  readonly source: string;
  /** Relative standard uncertainty; 0 where the sheet does not say. */
  readonly relative: number;
}

/** One measured standard, brought to molar absorptivity. Arrays have one entry a point. */
export interface Solution {
  readonly standard: string;
  readonly species: string;
  readonly wavelengthNm: Float64Array;
  /** L mol⁻¹ cm⁻¹; NaN where not usable. */
  readonly epsilon: Float64Array;
  /** Standard deviation of the point noise of `epsilon`. */
  readonly sd: Float64Array;
  /** 1 where the point may be used: there, and not above the upper absorbance. */
  readonly usable: Uint8Array;
  readonly scaleErrors: readonly ScaleError[];
  /** Path length times concentration, cm mol L⁻¹: absorbance over ε; null for a molar absorptivity spectrum. */
  readonly absorbancePerEpsilon: number | null;
  /** Largest absorbance that was used; null for a molar absorptivity spectrum. */
  readonly largestAbsorbance: number | null;
}

/** A relative noise this small is taken where a molar absorptivity spectrum is too short to tell. */
const shortSpectrumRelativeNoise = 1e-3;

/**
 * ε = A / (b c), the stray light taken out of A, with the noise of A carried along and the errors common to the spectrum named.
 *
 * @param strayLight fraction of the light in the reference beam
 */
export function solutionOf(
  sheet: Sheet,
  standard: SheetStandard,
  spectrum: Spectrum,
  settings: FitSettings,
  strayLight = 0,
): Solution {
  const scaleErrors = scaleErrorsOf(sheet, standard);
  const shared = {
    standard: standard.id,
    species: standard.species,
    wavelengthNm: spectrum.wavelengthNm,
    scaleErrors,
  };
  return standard.kind === 'molar-absorptivity'
    ? { ...shared, ...givenAsEpsilon(spectrum) }
    : { ...shared, ...fromAbsorbance(standard, spectrum, settings, strayLight) };
}

function scaleErrorsOf(sheet: Sheet, standard: SheetStandard): ScaleError[] {
  const stock = sheet.stocks?.find(({ id }) => id === standard.stock);
  const own = {
    source:
      standard.kind === 'molar-absorptivity'
        ? `scale of ${standard.id}`
        : `dilution of ${standard.id}`,
    relative: standard.relativeStandardUncertainty ?? 0,
  };
  if (!stock) return [own];
  return [own, { source: `stock ${stock.id}`, relative: stock.relativeStandardUncertainty ?? 0 }];
}

type Measured = Pick<
  Solution,
  'epsilon' | 'sd' | 'usable' | 'largestAbsorbance' | 'absorbancePerEpsilon'
>;

function fromAbsorbance(
  standard: SheetStandard,
  { wavelengthNm, values }: Spectrum,
  settings: FitSettings,
  strayLight: number,
): Measured {
  const scale = (standard.pathLengthCm ?? 1) * (standard.concentrationMolPerL ?? Number.NaN);
  const noise = settings.noise ?? estimateNoise(wavelengthNm, values) ?? shortSpectrumNoise(values);
  const epsilon = new Float64Array(values.length).fill(Number.NaN);
  const sd = new Float64Array(values.length);
  const usable = new Uint8Array(values.length);
  let largestAbsorbance = 0;
  for (const [i, reading] of values.entries()) {
    if (!(reading <= settings.upperAbsorbance)) continue;
    const absorbance = withoutStrayLight(reading, strayLight);
    if (Number.isNaN(absorbance)) continue;
    usable[i] = 1;
    epsilon[i] = absorbance / scale;
    sd[i] = Math.sqrt(absorbanceVariance(noise, absorbance)) / scale;
    if (absorbance > largestAbsorbance) largestAbsorbance = absorbance;
  }
  return { epsilon, sd, usable, largestAbsorbance, absorbancePerEpsilon: scale };
}

function givenAsEpsilon({ wavelengthNm, values }: Spectrum): Measured {
  const largest = largestOf(values);
  const relative = new Float64Array(values.length);
  for (const [i, value] of values.entries()) relative[i] = value / largest;
  const estimate = estimateNoise(wavelengthNm, relative);
  const noise = Math.max(
    estimate ? Math.hypot(estimate.constant, estimate.transmittance) : shortSpectrumRelativeNoise,
    noiseFloor,
  );
  return {
    epsilon: values,
    sd: new Float64Array(values.length).fill(noise * largest),
    usable: Uint8Array.from(values, (value) => (Number.isNaN(value) ? 0 : 1)),
    largestAbsorbance: null,
    absorbancePerEpsilon: null,
  };
}

function shortSpectrumNoise(values: Float64Array): NoiseModel {
  return { constant: shortSpectrumRelativeNoise * largestOf(values), transmittance: 0 };
}

function largestOf(values: Float64Array): number {
  let largest = 0;
  for (const value of values) if (Math.abs(value) > largest) largest = Math.abs(value);
  return largest || 1;
}
