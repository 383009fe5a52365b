import type { Reading, ReadSpectrum, RefusedPart } from './reading.ts';

/**
 * A reading as SHEET.md has it ("A reading"): plain arrays, `null` for missing points, members in
 * the order of the contract; refused parts carry `code` and `mend` besides.
 */
export function readingToJson(reading: Reading): object {
  return {
    format: reading.format,
    version: reading.version,
    file: reading.file,
    sha256: reading.sha256,
    encoding: reading.encoding,
    delimiter: reading.delimiter,
    decimal: reading.decimal,
    spectra: reading.spectra.map(spectrumToJson),
    refused: reading.refused.map(refusedToJson),
  };
}

function spectrumToJson(spectrum: ReadSpectrum): object {
  const { absorbance, molarAbsorptivity } = spectrum;
  return {
    name: spectrum.name,
    xUnit: spectrum.xUnit,
    quantity: spectrum.quantity,
    points: spectrum.points,
    wavelengthNm: Array.from(spectrum.wavelengthNm),
    ...(absorbance ? { absorbance: nullable(absorbance) } : {}),
    ...(molarAbsorptivity ? { molarAbsorptivity: nullable(molarAbsorptivity) } : {}),
    assumptions: [...spectrum.assumptions],
  };
}

const nullable = (values: Float64Array): (number | null)[] =>
  Array.from(values, (value) => (Number.isFinite(value) ? value : null));

function refusedToJson({ what, why, line, code, mend }: RefusedPart): object {
  return { what, why, line, code, mend };
}
