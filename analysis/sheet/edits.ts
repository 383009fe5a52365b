import type {
  EmbeddedSpectrum,
  Sheet,
  SheetAliquot,
  SheetFit,
  SheetRun,
  SheetSpecies,
  SheetStandard,
  SheetStock,
} from './schema.ts';

/**
 * Changes of a sheet, each a function from sheet to sheet that leaves a sheet which `openSheet`
 * takes: what refers to a thing that goes, goes or lets go with it, and a change that names what is
 * not there leaves the sheet as it is. Numbers must be such as the schema allows; the fields on
 * screen see to that. An id is changed by `renameSpecies` alone.
 */

/** Members to set; `undefined` takes an optional member out. */
export type Changes<T> = {
  readonly [K in keyof T]?: undefined extends T[K] ? T[K] | undefined : T[K];
};

export function setTitle(sheet: Sheet, title: string): Sheet {
  return { ...sheet, title };
}

export function setReaction(sheet: Sheet, changes: Changes<Sheet['reaction']>): Sheet {
  const { core = sheet.reaction.core, arm = sheet.reaction.arm } = changes;
  if (!has(sheet.species, core) || !has(sheet.species, arm)) return sheet;
  return { ...sheet, reaction: changed(sheet.reaction, changes) };
}

export function setFit(sheet: Sheet, changes: Changes<SheetFit>): Sheet {
  return { ...sheet, fit: changed(sheet.fit ?? {}, changes) };
}

/** Adds a species with an id of its own. */
export function addSpecies(
  sheet: Sheet,
  species: Pick<SheetSpecies, 'name' | 'cores' | 'arms'>,
): Sheet {
  const id = freeId('species', sheet.species);
  return { ...sheet, species: [...sheet.species, { ...species, id }] };
}

export function updateSpecies(sheet: Sheet, id: string, changes: Changes<SheetSpecies>): Sheet {
  return { ...sheet, species: updated(sheet.species, id, changes) };
}

/** Why a species cannot be given this id, in words; null if it can. */
export function whyNotRename(sheet: Sheet, id: string, next: string): string | null {
  if (next === '') return 'An id is needed.';
  // names of the language's own: readers of JSON drop members so called
  if (['__proto__', 'constructor', 'prototype'].includes(next)) {
    return `"${next}" cannot be an id.`;
  }
  if (next.length > longestId) return `An id has at most ${longestId} characters.`;
  if (next !== id && has(sheet.species, next)) return `"${next}" is another species already.`;
  return null;
}

/** Gives a species another id; all that refers to it follows. An id that cannot be changes nothing. */
export function renameSpecies(sheet: Sheet, id: string, next: string): Sheet {
  if (id === next || !has(sheet.species, id)) return sheet;
  if (whyNotRename(sheet, id, next) !== null) return sheet;
  const follow = (name: string): string => (name === id ? next : name);
  const following = <T extends { readonly species: string }>(entry: T): T =>
    entry.species === id ? { ...entry, species: next } : entry;
  return {
    ...sheet,
    reaction: {
      ...sheet.reaction,
      core: follow(sheet.reaction.core),
      arm: follow(sheet.reaction.arm),
    },
    species: sheet.species.map((entry) => (entry.id === id ? { ...entry, id: next } : entry)),
    ...(sheet.stocks ? { stocks: sheet.stocks.map(following) } : {}),
    ...(sheet.standards ? { standards: sheet.standards.map(following) } : {}),
    ...(sheet.runs ? { runs: sheet.runs.map((run) => withChargesRenamed(run, follow)) } : {}),
  };
}

function withChargesRenamed(run: SheetRun, follow: (id: string) => string): SheetRun {
  if (!run.chargedMol) return run;
  const charges = Object.entries(run.chargedMol).map(([id, mol]) => [follow(id), mol] as const);
  return { ...run, chargedMol: Object.fromEntries(charges) };
}

/** Takes a species out, with its standards, its stocks and its charges. Core and arm stay. */
export function removeSpecies(sheet: Sheet, id: string): Sheet {
  if (id === sheet.reaction.core || id === sheet.reaction.arm) return sheet;
  return {
    ...sheet,
    species: without(sheet.species, id),
    stocks: (sheet.stocks ?? []).filter(({ species }) => species !== id),
    standards: (sheet.standards ?? []).filter(({ species }) => species !== id),
    runs: (sheet.runs ?? []).map((run) => {
      if (!run.chargedMol || !(id in run.chargedMol)) return run;
      const { [id]: _, ...chargedMol } = run.chargedMol;
      return { ...run, chargedMol };
    }),
  };
}

/** Adds one standard for each spectrum, all of one species, concentrations still to be typed. */
export function addStandards(
  sheet: Sheet,
  spectra: readonly EmbeddedSpectrum[],
  species: string,
): Sheet {
  if (!has(sheet.species, species)) return sheet;
  let standards = sheet.standards ?? [];
  for (const embedded of spectra) {
    const id = freeId('S', standards);
    const kind = embedded.absorbance ? 'solution' : 'molar-absorptivity';
    standards = [...standards, { id, species, kind, spectrum: { embedded } }];
  }
  return { ...sheet, standards };
}

/** A standard that changes its species lets go of a stock of the old one. */
export function updateStandard(sheet: Sheet, id: string, changes: Changes<SheetStandard>): Sheet {
  if (changes.species !== undefined && !has(sheet.species, changes.species)) return sheet;
  return withStocksMet({ ...sheet, standards: updated(sheet.standards ?? [], id, changes) });
}

export function removeStandard(sheet: Sheet, id: string): Sheet {
  return { ...sheet, standards: without(sheet.standards ?? [], id) };
}

/** Adds a stock of the standard's species and takes the standard to be made from it. */
export function addStockFor(sheet: Sheet, standardId: string): Sheet {
  const standard = sheet.standards?.find(({ id }) => id === standardId);
  if (!standard) return sheet;
  const stocks = sheet.stocks ?? [];
  const id = freeId(`${standard.species.slice(0, longestId)}-stock`, stocks);
  return updateStandard(
    { ...sheet, stocks: [...stocks, { id, species: standard.species }] },
    standardId,
    { stock: id },
  );
}

/** Standards of another species let go of a stock that changes its own. */
export function updateStock(sheet: Sheet, id: string, changes: Changes<SheetStock>): Sheet {
  if (changes.species !== undefined && !has(sheet.species, changes.species)) return sheet;
  return withStocksMet({ ...sheet, stocks: updated(sheet.stocks ?? [], id, changes) });
}

/** Standards made from it stay, without a stock. */
export function removeStock(sheet: Sheet, id: string): Sheet {
  return withStocksMet({ ...sheet, stocks: without(sheet.stocks ?? [], id) });
}

/** Adds one aliquot for each spectrum. */
export function addAliquots(
  sheet: Sheet,
  spectra: readonly EmbeddedSpectrum[],
  run: string | null,
): Sheet {
  if (run !== null && !has(sheet.runs ?? [], run)) return sheet;
  let aliquots = sheet.aliquots ?? [];
  for (const embedded of spectra) {
    const id = freeId('a', aliquots);
    aliquots = [...aliquots, { id, ...(run === null ? {} : { run }), spectrum: { embedded } }];
  }
  return { ...sheet, aliquots };
}

export function updateAliquot(sheet: Sheet, id: string, changes: Changes<SheetAliquot>): Sheet {
  if (changes.run !== undefined && !has(sheet.runs ?? [], changes.run)) return sheet;
  return { ...sheet, aliquots: updated(sheet.aliquots ?? [], id, changes) };
}

export function removeAliquot(sheet: Sheet, id: string): Sheet {
  return { ...sheet, aliquots: without(sheet.aliquots ?? [], id) };
}

/**
 * Adds scans of one and the same cuvette, which show the noise, as one group. Spectra that are no
 * absorbances are left out; without any there is no group.
 */
export function addNoiseScans(sheet: Sheet, scans: readonly EmbeddedSpectrum[]): Sheet {
  const spectra = scans.flatMap((embedded) => (embedded.absorbance ? [{ embedded }] : []));
  if (spectra.length === 0) return sheet;
  const groups = sheet.noiseScans ?? [];
  return { ...sheet, noiseScans: [...groups, { id: freeId('scans', groups), spectra }] };
}

export function removeNoiseScans(sheet: Sheet, id: string): Sheet {
  return { ...sheet, noiseScans: without(sheet.noiseScans ?? [], id) };
}

/** Adds a run and, if asked, puts an aliquot into it. */
export function addRun(sheet: Sheet, aliquotId?: string): Sheet {
  const id = freeId('r', sheet.runs ?? []);
  const added = { ...sheet, runs: [...(sheet.runs ?? []), { id, name: '' }] };
  return aliquotId === undefined ? added : updateAliquot(added, aliquotId, { run: id });
}

export function updateRun(sheet: Sheet, id: string, changes: Changes<SheetRun>): Sheet {
  const charged = Object.keys(changes.chargedMol ?? {});
  if (charged.some((species) => !has(sheet.species, species))) return sheet;
  return { ...sheet, runs: updated(sheet.runs ?? [], id, changes) };
}

/** Aliquots of the run stay, without a run. */
export function removeRun(sheet: Sheet, id: string): Sheet {
  return {
    ...sheet,
    runs: without(sheet.runs ?? [], id),
    aliquots: (sheet.aliquots ?? []).map((aliquot) => {
      if (aliquot.run !== id) return aliquot;
      const { run: _, ...rest } = aliquot;
      return rest;
    }),
  };
}

/** Each standard without a stock that is gone or of another species. */
function withStocksMet(sheet: Sheet): Sheet {
  const stocks = new Map((sheet.stocks ?? []).map((stock) => [stock.id, stock.species]));
  const standards = (sheet.standards ?? []).map((standard) => {
    if (standard.stock === undefined || stocks.get(standard.stock) === standard.species) {
      return standard;
    }
    const { stock: _, ...rest } = standard;
    return rest;
  });
  return { ...sheet, standards };
}

/** Leaves room for the number and the suffix of what is named after it; the format allows 200. */
const longestId = 100;

interface Named {
  readonly id: string;
}

/** The prefix with the first number that is free. */
function freeId(prefix: string, taken: readonly Named[]): string {
  const ids = new Set(taken.map(({ id }) => id));
  let number = 1;
  while (ids.has(`${prefix}${number}`)) number++;
  return `${prefix}${number}`;
}

function has(list: readonly Named[], id: string): boolean {
  return list.some((entry) => entry.id === id);
}

function without<T extends Named>(list: readonly T[], id: string): readonly T[] {
  return list.filter((entry) => entry.id !== id);
}

function updated<T extends Named>(
  list: readonly T[],
  id: string,
  changes: Changes<T>,
): readonly T[] {
  return list.map((entry) => (entry.id === id ? { ...changed(entry, changes), id } : entry));
}

function changed<T extends object>(value: T, changes: Changes<T>): T {
  const result = { ...value, ...changes };
  for (const key of Object.keys(changes) as (keyof T)[]) {
    if (changes[key] === undefined) delete result[key];
  }
  return result as T;
}
