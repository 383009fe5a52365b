import type { EmbeddedSpectrum } from '../sheet/schema.ts';
import type { Reading, ReadSpectrum } from './reading.ts';
import { traceOf } from './trace-of.ts';

/** A trace of a reading as the sheet embeds it, with where it came from; null if there is no such trace. */
export function embeddedFrom(reading: Reading, trace: number): EmbeddedSpectrum | null {
  const spectrum = traceOf(reading, trace);
  if (!spectrum) return null;
  return {
    name: spectrum.name,
    wavelengthNm: [...spectrum.wavelengthNm],
    ...valuesOf(spectrum),
    assumptions: [...spectrum.assumptions],
    source: { file: reading.file, sha256: reading.sha256 },
  };
}

function valuesOf(
  spectrum: ReadSpectrum,
): Pick<EmbeddedSpectrum, 'absorbance' | 'molarAbsorptivity'> {
  if (spectrum.absorbance) return { absorbance: withNulls(spectrum.absorbance) };
  if (spectrum.molarAbsorptivity)
    return { molarAbsorptivity: withNulls(spectrum.molarAbsorptivity) };
  throw new Error(`the reading of "${spectrum.name}" has no values`);
}

function withNulls(values: Float64Array): (number | null)[] {
  return Array.from(values, (value) => (Number.isNaN(value) ? null : value));
}
