import type { FitSettings } from '../sheet/defaults.ts';
import { absorbanceVariance } from '../spectrum/noise.ts';
import type { Spectrum } from '../spectrum/spectrum.ts';
import { taken } from '../spectrum/vectors.ts';
import { linearityOf } from '../standards/linearity.ts';
import { molarAbsorptivityAt } from '../standards/molar-absorptivity.ts';
import type { SpeciesStandard } from '../standards/species-standard.ts';
import { baselineColumns } from '../unmixing/design.ts';
import { standardsVariance } from '../unmixing/standards-on-points.ts';
import type { Unmixing } from '../unmixing/unmix.ts';
import type { AliquotCurves, StandardCurves } from './results.ts';

/** What to draw for one aliquot, on the crude's own points. */
export function aliquotCurves(
  aliquot: string,
  crude: Spectrum,
  unmixing: Unmixing,
  settings: FitSettings,
): AliquotCurves {
  const { species, molarAbsorptivity, drawn, pathLengthCm, use, noise } = unmixing;
  const { wavelengthNm, values } = crude;
  const contributions = species.map((id, k) => ({
    species: id,
    absorbance: molarAbsorptivity[k]!.epsilon.map((value) => pathLengthCm * drawn[k]! * value),
  }));
  const baseline = drawnBaseline(crude, unmixing, settings);
  const fitted = baseline.slice();
  for (const { absorbance } of contributions) {
    for (let i = 0; i < fitted.length; i++) fitted[i]! += absorbance[i]!;
  }
  const everyPoint = Int32Array.from(wavelengthNm.keys());
  const extra = standardsVariance(molarAbsorptivity, everyPoint, pathLengthCm, drawn);
  return {
    aliquot,
    wavelengthNm,
    measured: values,
    use,
    fitted,
    contributions,
    baseline,
    residual: values.map((value, i) => value - fitted[i]!),
    expectedSd: fitted.map((absorbance, i) =>
      Math.sqrt(absorbanceVariance(noise, absorbance) + extra[i]!),
    ),
  };
}

/** The fitted baseline on every point of the crude; its terms are defined on the fitted points. */
function drawnBaseline(
  crude: Spectrum,
  { at, baseline }: Unmixing,
  settings: FitSettings,
): Float64Array {
  const fittedNm = taken(crude.wavelengthNm, at);
  const terms = baselineColumns(crude.wavelengthNm, settings.baseline, fittedNm);
  const sum = new Float64Array(crude.wavelengthNm.length);
  for (const [m, { column }] of terms.entries()) {
    for (let i = 0; i < sum.length; i++) sum[i]! += baseline[m]!.drawn * column[i]!;
  }
  return sum;
}

/** Molar absorptivity of one species on the wavelengths of its finest solution. */
export function standardCurves(standard: SpeciesStandard): StandardCurves {
  const wavelengthNm = joinedWavelengths(standard);
  const { epsilon, sd } = molarAbsorptivityAt(standard, wavelengthNm);
  return {
    species: standard.species,
    wavelengthNm,
    molarAbsorptivity: epsilon,
    noiseSd: sd,
    relativeScaleUncertainty: standard.relativeScaleUncertainty,
    solutions: standard.solutions.map((solution, s) => ({
      standard: solution.standard,
      wavelengthNm: solution.wavelengthNm,
      molarAbsorptivity: solution.epsilon,
      factor: standard.factors[s]!,
      offset: standard.offsets[s]!,
    })),
    linearity: testedLinearity(standard),
  };
}

function testedLinearity({ solutions }: SpeciesStandard): StandardCurves['linearity'] {
  const { curvature, straightUpTo, largestAbsorbance } = linearityOf(solutions);
  if (!curvature) return null;
  return { testedUpTo: largestAbsorbance, straightUpTo: straightUpTo ?? largestAbsorbance };
}

function joinedWavelengths({ solutions }: SpeciesStandard): Float64Array {
  const all = new Set<number>();
  for (const { wavelengthNm } of solutions) for (const nm of wavelengthNm) all.add(nm);
  return Float64Array.from(all).sort();
}
