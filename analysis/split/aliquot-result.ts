import type { AmountEvidence } from '../doubts/evidence.ts';
import type { BaselineName } from '../unmixing/design.ts';
import {
  commonCovariance,
  type ErrorSources,
  ownCovariance,
  standardsNoiseThrough,
} from '../unmixing/error-sources.ts';
import { separationOf } from '../unmixing/separation.ts';
import type { Unmixing } from '../unmixing/unmix.ts';
import type { AmountEstimate } from './amounts.ts';
import { plainQuantile, studentFactor } from './confidence-set.ts';
import type { ConcentrationResult, FitResult, Quantified } from './results.ts';

/** The amounts of one aliquot with their uncertainty in its two parts. */
export function estimateOf(unmixing: Unmixing, sources: ErrorSources): AmountEstimate {
  const selfScale = new Float64Array(unmixing.species.length);
  for (const { effect } of sources.scale) {
    for (const [k, change] of effect.entries()) {
      const amount = unmixing.amounts[k]!;
      if (amount > 0) selfScale[k]! += (change / amount) ** 2;
    }
  }
  return {
    species: unmixing.species,
    amounts: unmixing.amounts,
    drawn: unmixing.drawn,
    own: ownCovariance(sources),
    common: commonCovariance(sources),
    selfScale,
    df: unmixing.df,
  };
}

/** What the doubts may know of the amounts. */
export function amountEvidence(concentrations: readonly ConcentrationResult[]): AmountEvidence[] {
  return concentrations.map(({ detected, cuvetteMolPerL }) => ({
    detected,
    standardUncertainty: cuvetteMolPerL.standardUncertainty ?? Number.POSITIVE_INFINITY,
    upper: cuvetteMolPerL.interval95[1],
  }));
}

/** The figures of the fit. */
export function fitResult(unmixing: Unmixing, wavelengthNm: Float64Array): FitResult {
  const ofInstrument = instrumentSds(unmixing);
  const { at, fit, noise, noiseFrom, baseline, shiftNm, strayLight, reducedChiSquare, df } =
    unmixing;
  const squares = fit.residual.reduce((sum, value) => sum + value * value, 0);
  return {
    points: at.length,
    windowNm: [wavelengthNm[at[0] ?? 0] ?? 0, wavelengthNm[at.at(-1) ?? 0] ?? 0],
    residualRms: Math.sqrt(squares / at.length),
    reducedChiSquare:
      reducedChiSquare !== null && Number.isFinite(reducedChiSquare) ? reducedChiSquare : null,
    shiftNm: symmetric(shiftNm.value, ofInstrument.shiftNm, df),
    baseline: baseline.map(
      ({ term, value, sd }): { term: BaselineName; absorbance: Quantified } => ({
        term,
        absorbance: symmetric(value, sd, df),
      }),
    ),
    strayLight: {
      ...symmetric(strayLight.value, ofInstrument.strayLight, df),
      from: strayLight.sd > 0 ? 'fit' : strayLight.value > 0 ? 'sheet' : 'none',
    },
    separation: separationOf(fit, unmixing.species.length).map((inflation, k) => ({
      species: unmixing.species[k]!,
      inflation: Number.isFinite(inflation) ? inflation : null,
    })),
    noise: { ...noise, from: noiseFrom },
  };
}

/** Standard uncertainties of the fitted errors of the instrument, the standards' noise joined to the points'. */
function instrumentSds(unmixing: Unmixing): { shiftNm: number; strayLight: number } {
  const { shiftNm, strayLight, species, baseline } = unmixing;
  const first = species.length + baseline.length;
  const joined = (sd: number, parameter: number): number => {
    const gain = unmixing.fit.gain[parameter];
    return sd > 0 && gain ? Math.sqrt(sd * sd + standardsNoiseThrough(unmixing, gain)) : 0;
  };
  return {
    shiftNm: joined(shiftNm.sd, first),
    strayLight: joined(strayLight.sd, first + (shiftNm.sd > 0 ? 1 : 0)),
  };
}

function symmetric(value: number, sd: number, df: number): Quantified {
  const half = studentFactor(df) * plainQuantile * sd;
  return { value, standardUncertainty: sd, interval95: [value - half, value + half] };
}
