import { studentTQuantile } from '../distributions/student-t.ts';
import { quadratic } from '../spectrum/vectors.ts';
import type { AmountEstimate } from './amounts.ts';
import { confidenceInterval } from './confidence-set.ts';
import type { ConcentrationResult, Quantified } from './results.ts';

/** Chance that nothing is taken for something (ISO 11843, IUPAC: decision limit). */
const falseDetection = 0.05;

/** The dilution from flask to cuvette, with its relative standard uncertainty. */
export interface DilutionFactor {
  readonly factor: number;
  readonly relativeStandardUncertainty: number;
}

/** Amount of each species in the cuvette and in the flask, with what can be told from nothing. */
export function concentrationsOf(
  estimate: AmountEstimate,
  dilution: DilutionFactor,
): ConcentrationResult[] {
  return estimate.species.map((species, k) => {
    const limit = decisionLimit(estimate, k);
    return {
      species,
      cuvetteMolPerL: scaled(estimate, k, { factor: 1, relativeStandardUncertainty: 0 }),
      flaskMolPerL: scaled(estimate, k, dilution),
      detected: estimate.amounts[k]! > limit,
      detectionLimitMolPerL: detectionLimit(estimate, k, limit),
    };
  });
}

/** The smallest estimate that is called present: t · u at an amount of nothing. mol/L in the cuvette. */
function decisionLimit(estimate: AmountEstimate, k: number): number {
  const unit = unitVector(estimate, k);
  const { fixed } = variances(estimate, k, unit, 0);
  return studentTQuantile(1 - falseDetection, estimate.df) * Math.sqrt(fixed);
}

/**
 * The smallest true amount that is called present in 95 % of spectra (ISO 11843-1, IUPAC 1995): it
 * stands t · u above the decision limit, u at that amount itself, with the uncertainty that grows
 * with it. Null where that grows so fast that no amount is found so surely. mol/L in the cuvette.
 */
function detectionLimit(estimate: AmountEstimate, k: number, decision: number): number | null {
  const unit = unitVector(estimate, k);
  const { fixed, relative } = variances(estimate, k, unit, 0);
  const t = studentTQuantile(1 - falseDetection, estimate.df);
  // (x - decision)² = t²(fixed + relative x²), the larger root
  const a = 1 - t * t * relative;
  if (!(a > 0)) return null;
  const c = decision * decision - t * t * fixed;
  return (decision + Math.sqrt(Math.max(decision * decision - a * c, 0))) / a;
}

function scaled(estimate: AmountEstimate, k: number, dilution: DilutionFactor): Quantified {
  const { factor, relativeStandardUncertainty } = dilution;
  const unit = unitVector(estimate, k);
  const raw = estimate.amounts[k]!;
  const { fixed, relative } = variances(estimate, k, unit, relativeStandardUncertainty);
  const sd = (amount: number) => Math.sqrt(fixed + relative * amount * amount);
  const own = Math.max(quadratic(unit, estimate.own), 0);
  const total = fixed + relative * raw * raw;
  const [low, high] = confidenceInterval({
    estimate: raw,
    upper: Number.POSITIVE_INFINITY,
    df:
      own > 0 && estimate.df !== Number.POSITIVE_INFINITY
        ? (total / own) ** 2 * estimate.df
        : Number.POSITIVE_INFINITY,
    departure: (amount) => (raw - amount) / sd(amount),
    sd,
  });
  return {
    value: factor * estimate.drawn[k]!,
    standardUncertainty: factor * Math.sqrt(total),
    interval95: [factor * low, factor * high],
  };
}

/**
 * Variance that stays when the amount goes to nothing, and the relative variance that goes with
 * the amount. The standards' share of the common covariance goes with the amount of the species
 * itself as far as it is positive; what other species' standards bring in stays.
 */
function variances(
  estimate: AmountEstimate,
  k: number,
  unit: Float64Array,
  dilution: number,
): { fixed: number; relative: number } {
  const own = Math.max(quadratic(unit, estimate.own), 0);
  const common = Math.max(quadratic(unit, estimate.common), 0);
  const raw = estimate.amounts[k]!;
  const alone = raw > 0 ? Math.min(estimate.selfScale[k]! * raw * raw, common) : 0;
  return {
    fixed: own + common - alone,
    relative: (raw > 0 ? alone / (raw * raw) : 0) + dilution * dilution,
  };
}

function unitVector({ amounts }: AmountEstimate, k: number): Float64Array {
  const unit = new Float64Array(amounts.length);
  unit[k] = 1;
  return unit;
}
