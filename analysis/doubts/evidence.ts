import type { FitSettings } from '../sheet/defaults.ts';
import type { Spectrum } from '../spectrum/spectrum.ts';
import type { ErrorSources } from '../unmixing/error-sources.ts';
import type { Unmixing } from '../unmixing/unmix.ts';
import type { Doubt } from './doubt.ts';

/** All that a doubt may look at. */
export interface Evidence {
  readonly crude: Spectrum;
  readonly unmixing: Unmixing;
  readonly sources: ErrorSources;
  /** Covariance of the amounts from all sources, (mol/L)². */
  readonly covariance: readonly Float64Array[];
  readonly settings: FitSettings;
  /** What the split says of each species, in the order of the unmixing. */
  readonly amounts: readonly AmountEvidence[];
  /** Positions of the products among the species. */
  readonly products: readonly number[];
  /** Uncertainties that the sheet leaves out, in words: "the stock mono-A". */
  readonly notGiven: readonly string[];
  /** Name of a species for people. */
  readonly nameOf: (species: string) => string;
}

export interface AmountEvidence {
  readonly detected: boolean;
  /** Standard uncertainty in the cuvette, mol/L. */
  readonly standardUncertainty: number;
  /** Upper end of the 95 % interval in the cuvette, mol/L; null if there is none. */
  readonly upper: number | null;
}

/** One file, one test: evidence in, doubts out (none if it holds). */
export type DoubtTest = (evidence: Evidence) => readonly Doubt[];
