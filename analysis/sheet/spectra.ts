import type { EmbeddedSpectrum, Sheet, SheetSpectrum } from './schema.ts';

/** Paths of the files that the sheet still points at, each once, in the order of the sheet. */
export function filesOf(sheet: Sheet): readonly string[] {
  const files = new Set<string>();
  const scans = (sheet.noiseScans ?? []).flatMap(({ spectra }) => spectra);
  const owned = [...(sheet.standards ?? []), ...(sheet.aliquots ?? [])];
  for (const spectrum of [...owned.map((owner) => owner.spectrum), ...scans]) {
    if (spectrum.file !== undefined) files.add(spectrum.file);
  }
  return [...files];
}

/** What the sheet says of a file that the file itself may not: that it holds molar absorptivities. */
export function knownOf(sheet: Sheet, file: string): { readonly unnamedIs?: 'molar-absorptivity' } {
  const isEpsilon = (sheet.standards ?? []).some(
    ({ kind, spectrum }) => kind === 'molar-absorptivity' && spectrum.file === file,
  );
  return isEpsilon ? { unnamedIs: 'molar-absorptivity' } : {};
}

/**
 * The sheet with every file that `embeddedFor` knows taken in, so that it can be mailed as one
 * file. What it does not know (null) stays a reference.
 */
export function embedSpectra(
  sheet: Sheet,
  embeddedFor: (file: string, trace: number) => EmbeddedSpectrum | null,
): Sheet {
  const takenIn = (spectrum: SheetSpectrum): SheetSpectrum => {
    const { file, trace, ...rest } = spectrum;
    const embedded = file === undefined ? null : embeddedFor(file, trace ?? 0);
    return embedded ? { ...rest, embedded } : spectrum;
  };
  const taken = <T extends { readonly spectrum: SheetSpectrum }>(entry: T): T => {
    const spectrum = takenIn(entry.spectrum);
    return spectrum === entry.spectrum ? entry : { ...entry, spectrum };
  };
  return {
    ...sheet,
    ...(sheet.standards ? { standards: sheet.standards.map(taken) } : {}),
    ...(sheet.aliquots ? { aliquots: sheet.aliquots.map(taken) } : {}),
    ...(sheet.noiseScans
      ? {
          noiseScans: sheet.noiseScans.map((group) => ({
            ...group,
            spectra: group.spectra.map(takenIn),
          })),
        }
      : {}),
  };
}
