/** What a file held, as its heading or its numbers say. */
export type Quantity =
  | 'absorbance'
  | 'percent-transmittance'
  | 'transmittance'
  | 'molar-absorptivity';

/**
 * One trace as it was understood. Arrays have one entry a point; wavelengths ascend strictly, in nm.
 * Exactly one of `absorbance` (after conversion) and `molarAbsorptivity` (L mol⁻¹ cm⁻¹) is there;
 * NaN stands where the file marks a point as over range or missing (null in JSON).
 */
export interface ReadSpectrum {
  readonly name: string;
  /** Zero-based position among all traces of the file, refused ones counted (a sheet's `trace`). */
  readonly trace?: number;
  /** The unit of the abscissa in the file, "nm" for now. */
  readonly xUnit: string;
  readonly quantity: Quantity;
  readonly points: number;
  readonly wavelengthNm: Float64Array;
  readonly absorbance?: Float64Array;
  readonly molarAbsorptivity?: Float64Array;
  /** In words: what the file left open and how it was read, and what was left out. */
  readonly assumptions: readonly string[];
}

/** A part of a file, or the whole of it, that could not be used. */
export interface RefusedPart {
  /** "the file", "trace 3 (blank)". */
  readonly what: string;
  /** What is wrong and what would mend it, as one or two sentences. */
  readonly why: string;
  /** Line in the file counted from 1; null where no single line is to blame. */
  readonly line: number | null;
  readonly code: string;
  readonly mend: string;
}

/** What the importer understood of one export. SHEET.md, "A reading". */
export interface Reading {
  readonly format: 'monobis-reading';
  readonly version: 1;
  readonly file: string;
  readonly sha256: string;
  /** "utf-8", "utf-8 with byte-order mark", "utf-16le", "utf-16be", "latin-1"; "" if not text. */
  readonly encoding: string;
  /** "comma", "semicolon", "tab", "space"; "" if the file was refused. */
  readonly delimiter: string;
  /** "point" or "comma"; "" if the file was refused. */
  readonly decimal: string;
  readonly spectra: readonly ReadSpectrum[];
  readonly refused: readonly RefusedPart[];
}
