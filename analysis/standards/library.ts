import type { Reading } from '../reading/reading.ts';
import { resolveSpectrum } from '../reading/resolve-spectrum.ts';
import { Refusal } from '../refusal.ts';
import { absorbingSpecies, type FitSettings, speciesName } from '../sheet/defaults.ts';
import type { Sheet, SheetStandard } from '../sheet/schema.ts';
import { inflationOf, noiseCorrelation } from '../spectrum/correlated-noise.ts';
import {
  contrastsOf,
  levelOfContrasts,
  noiseOfContrasts,
  type SampledNoise,
  withNoiseLevel,
} from './contrasts.ts';
import { type Solution, solutionOf } from './solution.ts';
import { combineSolutions, type SpeciesStandard } from './species-standard.ts';

/** The standards of a sheet, one entry for each absorbing species, in the order of the species. */
export interface StandardsLibrary {
  readonly standards: readonly SpeciesStandard[];
  /** Noise seen between solutions of one species, and between the scans that the sheet gives. */
  readonly noiseSamples: readonly SampledNoise[];
  /** True where the level of the standards' noise was found between solutions of one species. */
  readonly noiseLevelSeen: boolean;
  /** Uncertainties that the sheet leaves out, in words. */
  readonly notGiven: readonly string[];
}

interface LibraryOptions {
  /** Noise seen between repeated scans. */
  readonly scans?: readonly SampledNoise[];
  /** Fraction of the light in the reference beam, taken out of every absorbance. */
  readonly strayLight?: number;
}

/** Reads and combines all standards. Throws a `Refusal` where one is missing or cannot be used. */
export function standardsLibrary(
  sheet: Sheet,
  readings: ReadonlyMap<string, Reading>,
  settings: FitSettings,
  { scans = [], strayLight = 0 }: LibraryOptions = {},
): StandardsLibrary {
  const absorbing = absorbingSpecies(sheet);
  if (absorbing.length === 0) {
    throw new Refusal({
      code: 'nothing-absorbs',
      message: 'No species of the sheet absorbs.',
      mend: 'Say which species absorb, and give standards of them.',
    });
  }
  const bySpecies = absorbing.map(({ id }) => ({
    id,
    standards: (sheet.standards ?? []).filter(({ species }) => species === id),
  }));
  const missing = bySpecies.filter(({ standards }) => standards.length === 0);
  if (missing.length > 0) {
    const names = missing.map(({ id }) => speciesName(sheet, id)).join(', ');
    throw new Refusal({
      code: 'standard-missing',
      message: `There is no standard of ${names}.`,
      mend: 'Load a spectrum of a solution of known concentration, or mark the species as not absorbing.',
    });
  }
  const readAll = (noise: FitSettings['noise']) =>
    bySpecies.map(({ standards }) =>
      standards.map((standard) =>
        readSolution(sheet, standard, readings, { ...settings, noise }, strayLight),
      ),
    );
  const first = readAll(settings.noise);
  const instrument = settings.noise ?? noiseOfContrasts(first.flatMap(contrastsOf));
  const solutions = instrument === settings.noise ? first : readAll(instrument);
  const contrasts = solutions.flatMap(contrastsOf);
  const correlation = noiseCorrelation([...contrasts, ...scans].map(({ sample }) => sample));
  const level = levelOfContrasts(contrasts, correlation, settings.noiseFrom);
  const noiseInflation = Math.max(1, inflationOf(correlation));
  return {
    standards: solutions.map((each) =>
      combineSolutions(
        level === null ? each : each.map((solution) => withNoiseLevel(solution, level)),
        { noiseInflation },
      ),
    ),
    noiseSamples: [...contrasts, ...scans],
    noiseLevelSeen: level !== null,
    notGiven: notGiven(sheet),
  };
}

function readSolution(
  sheet: Sheet,
  standard: SheetStandard,
  readings: ReadonlyMap<string, Reading>,
  settings: FitSettings,
  strayLight: number,
): Solution {
  const owner = `standard ${standard.id}`;
  const kind = standard.kind ?? 'solution';
  if (kind === 'solution' && standard.concentrationMolPerL === undefined) {
    throw new Refusal({
      code: 'concentration-missing',
      message: 'The concentration is not given.',
      where: { what: owner },
      mend: 'Type the concentration of the solution ("concentrationMolPerL"), or set the kind to "molar-absorptivity" if the spectrum already is in L mol⁻¹ cm⁻¹.',
    });
  }
  const wanted = kind === 'solution' ? 'absorbance' : 'molar-absorptivity';
  const spectrum = resolveSpectrum(standard.spectrum, readings, wanted, owner);
  const solution = solutionOf(sheet, standard, spectrum, settings, strayLight);
  if (!solution.usable.some((usable) => usable === 1)) {
    throw new Refusal({
      code: 'standard-empty',
      message: `No point of the spectrum can be used: all are missing or above an absorbance of ${settings.upperAbsorbance}.`,
      where: { what: owner },
      mend: 'Dilute the standard and record it again.',
    });
  }
  return solution;
}

function notGiven(sheet: Sheet): string[] {
  const absorbing = new Set(absorbingSpecies(sheet).map(({ id }) => id));
  const used = (sheet.standards ?? []).filter(({ species }) => absorbing.has(species));
  const stocks = new Set(used.map(({ stock }) => stock));
  return [
    ...(sheet.stocks ?? [])
      .filter(({ id, relativeStandardUncertainty: u }) => stocks.has(id) && u === undefined)
      .map(({ id }) => `the stock ${id}`),
    ...used
      .filter(({ relativeStandardUncertainty }) => relativeStandardUncertainty === undefined)
      .map(({ id }) => `the standard ${id}`),
  ];
}
