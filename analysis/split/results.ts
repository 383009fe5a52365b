import type { Doubt } from '../doubts/doubt.ts';
import type { RefusedPart } from '../reading/reading.ts';

/**
 * A quantity with its standard uncertainty (k = 1) and 95 % interval. `null` for an end that the
 * data do not bound, and for a value or uncertainty that does not exist (a ratio over nothing).
 */
export interface Quantified {
  readonly value: number | null;
  readonly standardUncertainty: number | null;
  readonly interval95: readonly [number | null, number | null];
}

export interface ConcentrationResult {
  readonly species: string;
  readonly cuvetteMolPerL: Quantified;
  readonly flaskMolPerL: Quantified;
  /** False if the amount is below what this spectrum can tell from nothing. */
  readonly detected: boolean;
  /** Smallest cuvette concentration that would be told from nothing here (5 % false alarms), mol/L. */
  readonly detectionLimitMolPerL: number | null;
}

/** Share of one product among all products (cores >= 1 and arms >= 1); values sum to 1. */
export interface SplitFraction {
  readonly species: string;
  readonly fraction: Quantified;
}

export interface RatioResult {
  readonly of: string;
  readonly to: string;
  readonly value: Quantified;
}

/** Share of the variance of the first split fraction; shares sum to 1. */
export interface BudgetShare {
  readonly source: string;
  readonly share: number;
}

export interface BaselineTerm {
  readonly term: 'offset' | 'slope' | 'scatter';
  /** Absorbance, at the middle of the window for the offset; across the window for the slope. */
  readonly absorbance: Quantified;
}

export interface FitResult {
  readonly points: number;
  readonly windowNm: readonly [number, number];
  readonly residualRms: number;
  /** Null where the noise is known from this residual only. */
  readonly reducedChiSquare: number | null;
  readonly shiftNm: Quantified;
  readonly baseline: readonly BaselineTerm[];
  /** Fraction of the light in the reference beam that was taken out, and where it is from. */
  readonly strayLight: Quantified & { readonly from: 'none' | 'sheet' | 'fit' };
  /** How far the likeness of the standards in the window inflates the uncertainty of each amount; 1 is well separated, null without bound. */
  readonly separation: readonly { readonly species: string; readonly inflation: number | null }[];
  /** Noise model used: absorbance units, and transmittance units. */
  readonly noise: {
    readonly constant: number;
    readonly transmittance: number;
    readonly from: 'sheet' | 'scans' | 'spectrum';
  };
}

export interface AliquotResult {
  readonly aliquot: string;
  readonly run: string | null;
  readonly concentrations: readonly ConcentrationResult[];
  readonly split: readonly SplitFraction[];
  readonly ratios: readonly RatioResult[];
  readonly budget: readonly BudgetShare[];
  readonly fit: FitResult;
  readonly doubts: readonly Doubt[];
  /** What the sheet left open and how it was taken, in words. */
  readonly notes: readonly string[];
}

export interface RunResult {
  readonly run: string;
  /** How many aliquots went in. */
  readonly aliquots: number;
  readonly split: readonly SplitFraction[];
  readonly ratios: readonly RatioResult[];
  /** Found in the flask over charged (1 closes the balance); null where the sheet does not say enough. */
  readonly balance: {
    readonly coresFound: Quantified | null;
    readonly armsFound: Quantified | null;
  };
}

export interface ComparisonResult {
  readonly runs: readonly [string, string];
  readonly of: string;
  readonly to: string;
  readonly ratioOfRatios: Quantified;
  readonly pValue: number | null;
}

/** SHEET.md, "Results". */
export interface Results {
  readonly format: 'monobis-results';
  readonly version: 1;
  readonly program: string;
  readonly title: string;
  readonly aliquots: readonly AliquotResult[];
  readonly runs: readonly RunResult[];
  readonly comparisons: readonly ComparisonResult[];
  /** Aliquots that could not be fitted, each with the reason. */
  readonly refused: readonly RefusedPart[];
  /** Members of the sheet that this program does not know, and the like. */
  readonly warnings: readonly string[];
}

/** What to draw for one aliquot. Arrays have one entry per point of the crude spectrum. */
export interface AliquotCurves {
  readonly aliquot: string;
  readonly wavelengthNm: Float64Array;
  /** NaN where missing. */
  readonly measured: Float64Array;
  /** 0 used; else why not: see `leftOut`. */
  readonly use: Uint8Array;
  /** Fitted absorbance wherever the standards reach, NaN elsewhere. */
  readonly fitted: Float64Array;
  /** Contribution of each absorbing species (drawn, non-negative amounts), absorbance. */
  readonly contributions: readonly {
    readonly species: string;
    readonly absorbance: Float64Array;
  }[];
  readonly baseline: Float64Array;
  readonly residual: Float64Array;
  /** Expected standard deviation of the residual at each point: noise and the standards' noise. */
  readonly expectedSd: Float64Array;
}

/** Meaning of the numbers in `AliquotCurves.use`. */
export { pointUse as leftOut } from '../unmixing/choose-points.ts';

/** Molar absorptivity of one species, for plots. L mol⁻¹ cm⁻¹. */
export interface StandardCurves {
  readonly species: string;
  readonly wavelengthNm: Float64Array;
  readonly molarAbsorptivity: Float64Array;
  /** Point noise alone. */
  readonly noiseSd: Float64Array;
  /** Relative standard uncertainty common to the whole spectrum. */
  readonly relativeScaleUncertainty: number;
  /** Each solution by itself, on its own wavelengths. */
  readonly solutions: readonly {
    readonly standard: string;
    readonly wavelengthNm: Float64Array;
    readonly molarAbsorptivity: Float64Array;
    /** Factor that brings this solution onto the combined spectrum; 1 is agreement. */
    readonly factor: number;
    /** Offset of its own recording that was taken out of it, absorbance. */
    readonly offset: number;
  }[];
  /** Largest absorbance tested for a bend against concentration, and up to where none was seen; null where it could not be tested. */
  readonly linearity: { readonly testedUpTo: number; readonly straightUpTo: number } | null;
}

export interface Quantification {
  readonly results: Results;
  readonly curves: readonly AliquotCurves[];
  readonly standards: readonly StandardCurves[];
}
