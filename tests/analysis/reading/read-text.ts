import { readExport } from '../../../analysis/reading/read-export.ts';
import type { Reading, ReadSpectrum, RefusedPart } from '../../../analysis/reading/reading.ts';

/** Reads a text as an instrument might have written it, in UTF-8. */
export function readText(text: string): Reading {
  return readExport(new TextEncoder().encode(text), 'export.csv');
}

/** The only spectrum of a file that must be read whole. */
export function onlySpectrum(text: string): ReadSpectrum {
  const { spectra, refused } = readText(text);
  const [spectrum] = spectra;
  if (!spectrum || spectra.length !== 1 || refused.length > 0) {
    throw new Error(
      `not one spectrum: ${spectra.length}; ${refused.map(({ why }) => why).join(' ')}`,
    );
  }
  return spectrum;
}

/** The only refusal of a file of which nothing must be read. */
export function onlyRefusal(text: string | Uint8Array): RefusedPart {
  const { spectra, refused } =
    typeof text === 'string' ? readText(text) : readExport(text, 'export.csv');
  const [part] = refused;
  if (!part || refused.length !== 1 || spectra.length > 0) {
    throw new Error(`not one refusal: ${spectra.length} spectra, ${refused.length} refusals`);
  }
  return part;
}
