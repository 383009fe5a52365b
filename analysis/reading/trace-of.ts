import type { Reading, ReadSpectrum } from './reading.ts';

/** The trace at a place in the file, counted from 0 with the refused ones; undefined if it is not there. */
export function traceOf(reading: Reading, trace: number): ReadSpectrum | undefined {
  return reading.spectra.find((spectrum, index) => (spectrum.trace ?? index) === trace);
}
