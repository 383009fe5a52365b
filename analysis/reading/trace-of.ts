import type { Reading, ReadSpectrum } from './reading.ts';

/** The trace at a place in the file, counted from 0 with the refused ones; undefined if it is not there. */
export function traceOf(reading: Reading, trace: number): ReadSpectrum | undefined {
  // nothing was refused before it: it stands at its own place
  const there = reading.spectra[trace];
  if (there && (there.trace ?? trace) === trace) return there;
  return reading.spectra.find((spectrum, index) => (spectrum.trace ?? index) === trace);
}
