/** One spectrum as drawn: with its noise, not yet rounded to the digits that a file prints. */
export interface Trace {
  /** The id of the standard or aliquot it belongs to. */
  readonly id: string;
  /** What a heading says of it. */
  readonly label: string;
  /** Ascending, in nm. */
  readonly wavelengthNm: Float64Array;
  readonly absorbance: Float64Array;
}

/** The wavelengths of a recording, ascending, both ends included. */
export function wavelengths(fromNm: number, toNm: number, stepNm: number): Float64Array {
  const points = Math.round((toNm - fromNm) / stepNm) + 1;
  return Float64Array.from({ length: points }, (_, i) => fromNm + i * stepNm);
}

/** [wavelength, absorbances of all traces] row by row; the traces of a file share their wavelengths. */
export function rowsOf(
  traces: readonly Trace[],
): readonly (readonly [number, readonly number[]])[] {
  const first = traces[0];
  if (first === undefined) throw new RangeError('a file needs at least one trace');
  return Array.from(first.wavelengthNm, (nm, i) => [
    nm,
    traces.map((trace) => trace.absorbance[i] ?? Number.NaN),
  ]);
}
