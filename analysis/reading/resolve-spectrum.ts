import { Refusal } from '../refusal.ts';
import type { SheetSpectrum } from '../sheet/schema.ts';
import type { Spectrum } from '../spectrum/spectrum.ts';
import type { Reading, ReadSpectrum } from './reading.ts';
import { traceOf } from './trace-of.ts';

/** What the owner of a spectrum expects it to hold. */
export type Wanted = 'absorbance' | 'molar-absorptivity';

/**
 * The spectrum of a standard or aliquot, from its file's reading or embedded in the sheet.
 * Throws a `Refusal` where it is missing, was refused, or holds another quantity.
 *
 * @param owner in the user's words: "standard S1"
 */
export function resolveSpectrum(
  spectrum: SheetSpectrum,
  readings: ReadonlyMap<string, Reading>,
  wanted: Wanted,
  owner: string,
): Spectrum {
  if (spectrum.embedded) {
    const { name, wavelengthNm, absorbance, molarAbsorptivity } = spectrum.embedded;
    return {
      name,
      wavelengthNm: Float64Array.from(wavelengthNm),
      values: valuesWanted(
        { absorbance: withNaN(absorbance), molarAbsorptivity: withNaN(molarAbsorptivity) },
        wanted,
        { what: owner },
      ),
    };
  }
  const file = spectrum.file ?? '';
  const reading = readings.get(file);
  if (!reading) {
    throw new Refusal({
      code: 'file-missing',
      message: `The file "${file}" was not found.`,
      where: { what: owner },
      mend: 'Put it back where the sheet looks for it (the path is relative to the sheet), or load the export again.',
    });
  }
  const trace = traceWanted(reading, spectrum.trace ?? 0, owner);
  return {
    name: trace.name,
    wavelengthNm: trace.wavelengthNm,
    values: valuesWanted(trace, wanted, { file, what: owner }),
  };
}

function traceWanted(reading: Reading, trace: number, owner: string): ReadSpectrum {
  const spectrum = traceOf(reading, trace);
  if (spectrum) return spectrum;
  const refused =
    reading.refused.find(({ what }) => what.startsWith(`trace ${trace + 1} `)) ??
    reading.refused[0];
  if (refused) {
    throw new Refusal({
      code: refused.code,
      message: refused.why,
      where: {
        file: reading.file,
        ...(refused.line === null ? {} : { line: refused.line }),
        what: owner,
      },
      mend: refused.why.includes(refused.mend) ? '' : refused.mend,
    });
  }
  const held = reading.spectra.length;
  throw new Refusal({
    code: 'trace-missing',
    message: `Trace ${trace} was asked for (counted from 0), and the file holds ${held === 1 ? 'one trace' : `${held} traces`}.`,
    where: { file: reading.file, what: owner },
    mend: 'Correct "trace", or load the export again.',
  });
}

function valuesWanted(
  held: Pick<ReadSpectrum, 'absorbance' | 'molarAbsorptivity'> | Held,
  wanted: Wanted,
  where: { readonly file?: string; readonly what: string },
): Float64Array {
  if (wanted === 'absorbance') {
    if (held.absorbance) return held.absorbance;
    throw new Refusal({
      code: 'molar-absorptivity-unexpected',
      message: 'The spectrum is in L mol⁻¹ cm⁻¹, and an absorbance is needed here.',
      where,
      mend: 'For a standard, set its kind to "molar-absorptivity"; an aliquot needs its absorbance.',
    });
  }
  if (held.molarAbsorptivity) return held.molarAbsorptivity;
  throw new Refusal({
    code: 'molar-absorptivity-expected',
    message:
      'The sheet says that this spectrum is a molar absorptivity, and the file holds an absorbance or a transmittance.',
    where,
    mend: 'Give its concentration and set the kind to "solution", or name the quantity in the heading of the file: "ε (L mol-1 cm-1)".',
  });
}

interface Held {
  readonly absorbance: Float64Array | undefined;
  readonly molarAbsorptivity: Float64Array | undefined;
}

function withNaN(values: readonly (number | null)[] | undefined): Float64Array | undefined {
  return values && Float64Array.from(values, (value) => value ?? Number.NaN);
}
