import type { Sheet, SheetFit, SheetSpecies } from './schema.ts';

/** The defaults of SHEET.md, applied when the sheet is used; the sheet itself stays as written. */
export interface FitSettings {
  /** Null: the range that all spectra share. */
  readonly windowNm: readonly [number, number] | null;
  readonly excludeNm: readonly (readonly [number, number])[];
  readonly baseline: NonNullable<SheetFit['baseline']>;
  readonly shift: NonNullable<SheetFit['shift']>;
  /** Standard deviation of the prior on the offset, nm; null for none. */
  readonly shiftPriorNm: number | null;
  /** Fraction of the light in the reference beam; "fit" where it is to be found. */
  readonly strayLight: number | 'fit';
  readonly upperAbsorbance: number;
  readonly noise: { readonly constant: number; readonly transmittance: number } | null;
  readonly noiseFrom: 'sheet' | 'scans' | 'spectrum';
}

export function fitSettings(sheet: Sheet): FitSettings {
  const fit = sheet.fit ?? {};
  return {
    windowNm: fit.windowNm ?? null,
    excludeNm: fit.excludeNm ?? [],
    baseline: fit.baseline ?? 'offset',
    shift: fit.shift ?? 'none',
    shiftPriorNm: fit.shiftStandardUncertaintyNm ?? null,
    strayLight: fit.strayLight ?? 0,
    upperAbsorbance: fit.upperAbsorbance ?? 2,
    noise: fit.noise ?? null,
    noiseFrom: fit.noise ? 'sheet' : 'spectrum',
  };
}

/** A species absorbs unless the sheet says that it does not. */
export function absorbingSpecies(sheet: Sheet): readonly SheetSpecies[] {
  return sheet.species.filter(({ absorbs }) => absorbs !== false);
}

/** Products: at least one core and one arm built in. */
export function productSpecies(sheet: Sheet): readonly SheetSpecies[] {
  return sheet.species.filter(({ cores, arms }) => cores >= 1 && arms >= 1);
}

export function speciesName(sheet: Sheet, id: string): string {
  return sheet.species.find((species) => species.id === id)?.name || id;
}

const longestLabel = 18;

/** A short name for where there is little room (answers, labels on curves): the name if it is short, else the id. */
export function speciesLabel(sheet: Sheet, id: string): string {
  const name = speciesName(sheet, id);
  return name.length <= longestLabel ? name : id;
}
