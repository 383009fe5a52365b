import type { Sheet, SheetSpectrum } from './schema.ts';

export interface ReferenceFault {
  readonly code: string;
  readonly message: string;
  readonly path: readonly string[];
  readonly mend: string;
}

/**
 * What the members say of each other: ids that are unique, and references that meet. A sheet in
 * the making (no standards yet, no aliquots) is fine; what it still needs is said elsewhere.
 */
export function checkReferences(sheet: Sheet): ReferenceFault | null {
  return (
    duplicates(sheet) ??
    dangling(sheet) ??
    spectraFaults(sheet) ??
    dilutionFaults(sheet) ??
    chargeFaults(sheet)
  );
}

function duplicates(sheet: Sheet): ReferenceFault | null {
  const lists = {
    species: sheet.species,
    stocks: sheet.stocks ?? [],
    standards: sheet.standards ?? [],
    runs: sheet.runs ?? [],
    aliquots: sheet.aliquots ?? [],
    noiseScans: sheet.noiseScans ?? [],
  };
  for (const [list, entries] of Object.entries(lists)) {
    const seen = new Set<string>();
    for (const [index, { id }] of entries.entries()) {
      if (seen.has(id)) {
        return {
          code: 'duplicate-id',
          message: `The id "${id}" stands twice in "${list}".`,
          path: [list, String(index), 'id'],
          mend: 'Give each its own id.',
        };
      }
      seen.add(id);
    }
  }
  return null;
}

function dangling(sheet: Sheet): ReferenceFault | null {
  const species = new Set(sheet.species.map(({ id }) => id));
  const runs = new Set((sheet.runs ?? []).map(({ id }) => id));
  const stocks = new Map((sheet.stocks ?? []).map((stock) => [stock.id, stock]));
  const missing = (
    what: string,
    name: string,
    path: readonly string[],
    list: string,
  ): ReferenceFault => ({
    code: 'unknown-reference',
    message: `${what} names "${name}", which is not in "${list}".`,
    path,
    mend: `Add it to "${list}", or name one that is there.`,
  });
  for (const role of ['core', 'arm'] as const) {
    const name = sheet.reaction[role];
    if (!species.has(name)) return missing(`The ${role}`, name, ['reaction', role], 'species');
  }
  for (const [index, stock] of (sheet.stocks ?? []).entries()) {
    const path = ['stocks', String(index), 'species'];
    if (!species.has(stock.species)) {
      return missing(`Stock "${stock.id}"`, stock.species, path, 'species');
    }
  }
  for (const [index, standard] of (sheet.standards ?? []).entries()) {
    const path = ['standards', String(index)];
    const what = `Standard "${standard.id}"`;
    if (!species.has(standard.species)) {
      return missing(what, standard.species, [...path, 'species'], 'species');
    }
    if (standard.stock === undefined) continue;
    const stock = stocks.get(standard.stock);
    if (!stock) return missing(what, standard.stock, [...path, 'stock'], 'stocks');
    if (stock.species !== standard.species) {
      return {
        code: 'stock-of-another-species',
        message: `${what} is of "${standard.species}", but its stock "${stock.id}" is of "${stock.species}".`,
        path: [...path, 'stock'],
        mend: 'Name the stock it was made from.',
      };
    }
  }
  for (const [index, aliquot] of (sheet.aliquots ?? []).entries()) {
    if (aliquot.run !== undefined && !runs.has(aliquot.run)) {
      const path = ['aliquots', String(index), 'run'];
      return missing(`Aliquot "${aliquot.id}"`, aliquot.run, path, 'runs');
    }
  }
  return null;
}

function spectraFaults(sheet: Sheet): ReferenceFault | null {
  for (const list of ['standards', 'aliquots'] as const) {
    for (const [index, entry] of (sheet[list] ?? []).entries()) {
      const path = [list, String(index), 'spectrum'];
      const fault = spectrumFault(entry.spectrum, path, `"${entry.id}"`);
      if (fault) return fault;
    }
  }
  for (const [index, { id, spectra }] of (sheet.noiseScans ?? []).entries()) {
    for (const [scan, spectrum] of spectra.entries()) {
      const path = ['noiseScans', String(index), 'spectra', String(scan)];
      const fault = spectrumFault(spectrum, path, `"${id}", scan ${scan + 1}`);
      if (fault) return fault;
    }
  }
  return null;
}

function spectrumFault(
  spectrum: SheetSpectrum,
  path: readonly string[],
  owner: string,
): ReferenceFault | null {
  const { file, embedded } = spectrum;
  if ((file === undefined) === (embedded === undefined)) {
    return {
      code: 'spectrum-source',
      message: `The spectrum of ${owner} must be either a file or embedded${file === undefined ? '; it is neither' : ', not both'}.`,
      path,
      mend: 'Keep one of "file" and "embedded".',
    };
  }
  if (!embedded) return null;
  const values = embedded.absorbance ?? embedded.molarAbsorptivity;
  const at = [...path, 'embedded'];
  if (!values || values.length !== embedded.wavelengthNm.length) {
    return {
      code: 'embedded-lengths',
      message: `The embedded spectrum of ${owner} has ${embedded.wavelengthNm.length} wavelengths and ${values?.length ?? 0} values.`,
      path: at,
      mend: 'Load the export again; both lists need one entry a point.',
    };
  }
  const wrong = embedded.wavelengthNm.findIndex(
    (nm, i) => i > 0 && !(nm > (embedded.wavelengthNm[i - 1] ?? Number.NaN)),
  );
  if (wrong === -1) return null;
  return {
    code: 'embedded-order',
    message: `The embedded wavelengths of ${owner} do not ascend at entry ${wrong + 1}.`,
    path: [...at, 'wavelengthNm'],
    mend: 'Load the export again.',
  };
}

function dilutionFaults(sheet: Sheet): ReferenceFault | null {
  for (const [index, { id, dilution }] of (sheet.aliquots ?? []).entries()) {
    if (!dilution) continue;
    const path = ['aliquots', String(index), 'dilution'];
    if ((dilution.factor === undefined) === (dilution.steps === undefined)) {
      return {
        code: 'dilution-source',
        message: `The dilution of aliquot "${id}" must be either a factor or steps${dilution.factor === undefined ? '; it is neither' : ', not both'}.`,
        path,
        mend: 'Keep one of "factor" and "steps".',
      };
    }
    const wrong = (dilution.steps ?? []).findIndex(({ takeMl, toMl }) => takeMl > toMl);
    if (wrong !== -1) {
      return {
        code: 'dilution-concentrates',
        message: `Dilution step ${wrong + 1} of aliquot "${id}" takes more than it is made up to.`,
        path: [...path, 'steps', String(wrong)],
        mend: 'Check "takeMl" and "toMl".',
      };
    }
  }
  return null;
}

function chargeFaults(sheet: Sheet): ReferenceFault | null {
  const species = new Set(sheet.species.map(({ id }) => id));
  for (const [index, run] of (sheet.runs ?? []).entries()) {
    const wrong = Object.keys(run.chargedMol ?? {}).find((id) => !species.has(id));
    if (wrong !== undefined) {
      return {
        code: 'unknown-reference',
        message: `Run "${run.id}" charges "${wrong}", which is not in "species".`,
        path: ['runs', String(index), 'chargedMol', wrong],
        mend: 'Add it to "species", or correct the name.',
      };
    }
  }
  return null;
}
