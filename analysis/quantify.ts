import { allDoubts } from './doubts/all-doubts.ts';
import { programName } from './program.ts';
import type { Reading, RefusedPart } from './reading/reading.ts';
import { resolveSpectrum } from './reading/resolve-spectrum.ts';
import { Refusal, refusalSentence } from './refusal.ts';
import { type FitSettings, fitSettings, productSpecies, speciesName } from './sheet/defaults.ts';
import type { Sheet, SheetAliquot } from './sheet/schema.ts';
import { unknownMembers } from './sheet/unknown-members.ts';
import type { AliquotEstimate } from './split/aliquot-estimate.ts';
import { amountEvidence, estimateOf, fitResult } from './split/aliquot-result.ts';
import { budgetOf } from './split/budget.ts';
import { comparisonsOf } from './split/compare-runs.ts';
import { concentrationsOf } from './split/concentrations.ts';
import { aliquotCurves, standardCurves } from './split/curves.ts';
import { dilutionOf } from './split/dilution.ts';
import { ratiosOf, splitOf } from './split/fractions.ts';
import type { AliquotCurves, AliquotResult, Quantification } from './split/results.ts';
import { runResult } from './split/runs.ts';
import { type StandardsLibrary, standardsLibrary } from './standards/library.ts';
import { noiseOfScans } from './standards/noise-scans.ts';
import type { SpeciesStandard } from './standards/species-standard.ts';
import { pointUse } from './unmixing/choose-points.ts';
import { commonEffects, errorSources } from './unmixing/error-sources.ts';
import { type UnmixInput, type Unmixing, unmix } from './unmixing/unmix.ts';

/**
 * The whole sheet, computed. `readings` holds one reading for each file that the sheet points at
 * (`filesOf`). Throws a `Refusal` where the sheet as a whole cannot be used (a standard is missing
 * or unreadable); an aliquot that cannot be fitted is listed in `results.refused` instead.
 */
export function quantify(sheet: Sheet, readings: ReadonlyMap<string, Reading>): Quantification {
  const prepared = prepare(sheet, readings);
  const done: QuantifiedAliquot[] = [];
  const refused: RefusedPart[] = [];
  for (const aliquot of sheet.aliquots ?? []) {
    try {
      done.push(quantifyAliquot(prepared, aliquot, readings));
    } catch (error) {
      refused.push(refusedAliquot(aliquot, error));
    }
  }
  const products = productPositions(prepared);
  const estimates = done.map(({ estimate }) => estimate());
  const runs = (sheet.runs ?? []).map((run) => ({
    run,
    aliquots: estimates.filter((estimate) => estimate.run === run.id),
  }));
  return {
    results: {
      format: 'monobis-results',
      version: 1,
      program: programName,
      title: sheet.title ?? '',
      aliquots: done.map(({ result }) => result),
      runs: runs.map(({ run, aliquots }) => runResult(sheet, run, aliquots, products)),
      comparisons: comparisonsOf(
        runs.map(({ run, aliquots }) => ({ run: run.id, aliquots })),
        products,
      ),
      refused,
      warnings: unknownMembers(sheet),
    },
    curves: done.map(({ curves }) => curves()),
    standards: prepared.library.standards.map(standardCurves),
  };
}

/** A sheet with its standards made ready: what all its aliquots share. */
export interface PreparedSheet {
  readonly sheet: Sheet;
  /** As the sheet has them, with the noise of its repeated scans where it states none. */
  readonly settings: FitSettings;
  readonly library: StandardsLibrary;
  /** The library with this fraction of stray light taken out of every standard. */
  readonly libraryAt: (strayLight: number) => StandardsLibrary;
}

export function prepare(sheet: Sheet, readings: ReadonlyMap<string, Reading>): PreparedSheet {
  const stated = fitSettings(sheet);
  const scans = noiseOfScans(sheet, readings);
  const settings: FitSettings =
    scans?.model && !stated.noise ? { ...stated, noise: scans.model, noiseFrom: 'scans' } : stated;
  const libraries = new Map<number, StandardsLibrary>();
  const libraryAt = (strayLight: number): StandardsLibrary => {
    const known = libraries.get(strayLight);
    if (known) return known;
    const made = standardsLibrary(sheet, readings, settings, {
      strayLight,
      scans: scans?.samples ?? [],
    });
    if (libraries.size < mostLibraries) libraries.set(strayLight, made);
    return made;
  };
  const strayLight = settings.strayLight === 'fit' ? 0 : settings.strayLight;
  return { sheet, settings, library: libraryAt(strayLight), libraryAt };
}

/** A fit of stray light tries a handful for each aliquot. */
const mostLibraries = 100;

export interface QuantifiedAliquot {
  readonly result: AliquotResult;
  /** What is drawn of it, and what its run needs of it: worked out when asked for, as a batch needs neither. */
  readonly curves: () => AliquotCurves;
  readonly estimate: () => AliquotEstimate;
}

/** One aliquot: spectrum, unmixing, uncertainty, split, doubts. Throws a `Refusal` where it cannot be. */
export function quantifyAliquot(
  prepared: PreparedSheet,
  aliquot: SheetAliquot,
  readings: ReadonlyMap<string, Reading>,
): QuantifiedAliquot {
  const { sheet, settings, library } = prepared;
  const input = unmixInput(prepared, aliquot, readings);
  const { crude } = input;
  const unmixing = unmix(input);
  const sources = errorSources(unmixing);
  const estimate = estimateOf(unmixing, sources);
  const products = productPositions(prepared);
  const dilution = dilutionOf(aliquot);
  const concentrations = concentrationsOf(estimate, dilution);
  const doubts = allDoubts({
    crude,
    unmixing,
    sources,
    covariance: estimate.own.map((row, k) => row.map((own, l) => own + estimate.common[k]![l]!)),
    settings,
    amounts: amountEvidence(concentrations),
    products,
    notGiven: [...library.notGiven, ...(dilution.notGiven ? [dilution.notGiven] : [])],
    nameOf: (species) => speciesName(sheet, species),
  });
  const run = aliquot.run ?? null;
  return {
    result: {
      aliquot: aliquot.id,
      run,
      concentrations,
      split: splitOf(estimate, products),
      ratios: ratiosOf(estimate, products),
      budget: budgetOf(unmixing, sources, products),
      fit: fitResult(unmixing, crude.wavelengthNm),
      doubts,
      notes: [
        ...windowNotes(unmixing, settings, crude.wavelengthNm),
        ...(dilution.note ? [dilution.note] : []),
      ],
    },
    curves: () => aliquotCurves(aliquot.id, crude, unmixing, settings),
    estimate: () => ({
      aliquot: aliquot.id,
      run,
      estimate,
      effects: commonEffects(sources),
      dilution,
    }),
  };
}

/** What the unmixing of one aliquot is given. Throws a `Refusal` where its spectrum cannot be used. */
export function unmixInput(
  { settings, library, libraryAt }: PreparedSheet,
  aliquot: SheetAliquot,
  readings: ReadonlyMap<string, Reading>,
): UnmixInput {
  const what = `aliquot ${aliquot.id}`;
  return {
    crude: resolveSpectrum(aliquot.spectrum, readings, 'absorbance', what),
    standardsAt: (strayLight) => libraryAt(strayLight).standards,
    noiseSamples: library.noiseSamples,
    noiseLevelSeen: library.noiseLevelSeen,
    pathLengthCm: aliquot.pathLengthCm ?? 1,
    settings,
    what,
  };
}

/** What of the window could not be fitted because a standard or the crude does not reach there. */
function windowNotes({ use, at }: Unmixing, { windowNm }: FitSettings, nm: Float64Array): string[] {
  const uncovered = use.filter((reason) => reason === pointUse.noStandard).length;
  if (windowNm === null || uncovered === 0) return [];
  const [low, high] = [nm[at[0] ?? 0], nm[at.at(-1) ?? 0]];
  return [
    `${uncovered} points of the window lie where not every standard reaches; fitted from ${low} to ${high} nm.`,
  ];
}

/** Positions of the products among the species that are fitted. */
export function productPositions({ sheet, library }: PreparedSheet): number[] {
  const products = new Set(productSpecies(sheet).map(({ id }) => id));
  return library.standards.flatMap(({ species }: SpeciesStandard, k) =>
    products.has(species) ? [k] : [],
  );
}

function refusedAliquot(aliquot: SheetAliquot, error: unknown): RefusedPart {
  if (!(error instanceof Refusal)) throw error;
  const { code, message, mend } = error;
  const { what: _, ...where } = error.where;
  return {
    what: `aliquot ${aliquot.id}`,
    why: refusalSentence({ code, message, mend, where }),
    line: where.line ?? null,
    code,
    mend,
  };
}
