import { signal } from '@preact/signals';
import {
  addAliquots,
  addNoiseScans,
  addStandards,
  type EmbeddedSpectrum,
  embeddedFrom,
  productSpecies,
  type Reading,
  type Sheet,
  speciesName,
} from '../../analysis/index.ts';
import type { OpenedFile } from '../../main/desktop/channels.ts';
import { notify } from '../state/notices.ts';
import { change, sheet, sheetsShown } from '../state/store.ts';
import { readFileBytes } from '../worker/analysis-client.ts';

/** Where spectra are to go. */
export type Destination = 'standards' | 'aliquots' | 'noise-scans';

export function isDestination(text: string | null | undefined): text is Destination {
  return text === 'standards' || text === 'aliquots' || text === 'noise-scans';
}

/** Spectra that were read and whose destination is still to be asked. */
export const pending = signal<readonly EmbeddedSpectrum[] | null>(null);

/** Progress of reading many files; null when nothing is being read. */
export const reading = signal<{ readonly done: number; readonly of: number } | null>(null);
let isCancelled = false;

export function cancelReading(): void {
  isCancelled = true;
}

/**
 * Reads exports and puts their traces where they were dropped, or asks. Nothing vanishes in silence.
 * `shown` is the count of `sheetsShown` when they were given: they are for that sheet and no later one.
 */
export async function addExports(
  files: readonly OpenedFile[],
  destination: Destination | null,
  shown = sheetsShown.peek(),
): Promise<void> {
  if (files.length === 0) return;
  const readings = await readAll(files);
  if (shown !== sheetsShown.peek()) {
    notify(
      'refusal',
      'Another sheet was opened while these were read; nothing of them was taken in. Drop them again where they belong:',
      files.map(({ name }) => name),
    );
    return;
  }
  const spectra = readings.flatMap((each) =>
    each.spectra.flatMap(({ trace }, index) => embeddedFrom(each, trace ?? index) ?? []),
  );
  tellWhatWasRead(readings, files.length);
  if (spectra.length === 0) return;
  // another drop may come while the question still stands
  if (destination === null) pending.value = [...(pending.value ?? []), ...spectra];
  else place(spectra, destination);
}

export function place(spectra: readonly EmbeddedSpectrum[], destination: Destination): void {
  pending.value = null;
  const count = countOf(spectra);
  if (destination === 'aliquots') {
    // which run a crude is from is never guessed: aliquots of one run count as replicates
    change(`add ${count} as aliquots`, (before) => addAliquots(before, spectra, null));
    return;
  }
  if (destination === 'noise-scans') {
    placeScans(spectra);
    return;
  }
  const guesses = spectra.map((spectrum) => ({
    spectrum,
    ...likelySpecies(sheet.value, spectrum),
  }));
  change(`add ${count} as standards`, (before) =>
    guesses.reduce(
      (next, { spectrum, species }) => addStandards(next, [spectrum], species),
      before,
    ),
  );
  notify(
    'news',
    'Of which species each standard is was guessed; look at the column "of":',
    guesses.map(({ spectrum: { name, source }, species, isNamed }) => {
      const why = isNamed ? 'its name says so' : 'nothing in its name says which';
      return `${source?.file ?? ''} · ${name}: ${speciesName(sheet.value, species)} (${why})`;
    }),
  );
}

/** Scans given together are of one cuvette: one group. */
function placeScans(spectra: readonly EmbeddedSpectrum[]): void {
  const [scans, others] = [
    spectra.filter(({ absorbance }) => absorbance !== undefined),
    spectra.filter(({ absorbance }) => absorbance === undefined),
  ];
  if (scans.length > 0) {
    change(`take the noise from ${countOf(scans)}`, (before) => addNoiseScans(before, scans));
  }
  if (others.length > 0) {
    notify(
      'refusal',
      'Molar absorptivities show no noise of an instrument; these were left out:',
      others.map(({ name, source }) => `${source?.file ?? ''} · ${name}`),
    );
  }
}

/** The question where they belong was put aside: said, so that nothing vanishes in silence. */
export function leaveOut(spectra: readonly EmbeddedSpectrum[]): void {
  pending.value = null;
  notify('news', `${countOf(spectra)} left out; drop the files again to take them in.`);
}

function countOf(spectra: readonly EmbeddedSpectrum[]): string {
  return spectra.length === 1 ? '1 spectrum' : `${spectra.length} spectra`;
}

interface Guess {
  readonly species: string;
  readonly isNamed: boolean;
}

/**
 * The species whose id or name stands as a word of its own in the heading or the file name, the
 * longest such; else the first product.
 */
export function likelySpecies(into: Sheet, spectrum: EmbeddedSpectrum): Guess {
  const words = ` ${spectrum.source?.file ?? ''} ${spectrum.name} `.toLowerCase();
  let best = { species: '', length: 0 };
  for (const { id, name = '' } of into.species) {
    for (const word of [id, name].map((each) => each.trim().toLowerCase())) {
      if (word.length > best.length && standsIn(words, word))
        best = { species: id, length: word.length };
    }
  }
  if (best.length > 0) return { species: best.species, isNamed: true };
  return { species: (productSpecies(into)[0] ?? into.species[0])?.id ?? '', isNamed: false };
}

/** True where the word stands with no letter or digit at either end of it. */
function standsIn(words: string, word: string): boolean {
  const isPart = (sign: string | undefined): boolean => /[\p{L}\p{N}]/u.test(sign ?? ' ');
  for (let at = words.indexOf(word); at !== -1; at = words.indexOf(word, at + 1)) {
    if (!isPart(words[at - 1]) && !isPart(words[at + word.length])) return true;
  }
  return false;
}

async function readAll(files: readonly OpenedFile[]): Promise<Reading[]> {
  const readings: Reading[] = [];
  isCancelled = false;
  reading.value = { done: 0, of: files.length };
  try {
    for (const { name, bytes } of files) {
      if (isCancelled) {
        notify('news', `Stopped: ${readings.length} of ${files.length} files were read.`);
        break;
      }
      readings.push(await readFileBytes(name, bytes));
      reading.value = { done: readings.length, of: files.length };
    }
  } finally {
    reading.value = null;
  }
  return readings;
}

function tellWhatWasRead(readings: readonly Reading[], asked: number): void {
  const refused = readings.flatMap(({ file, refused: parts }) =>
    parts.map(({ what, why, line }) => {
      const place = line === null ? file : `${file}, line ${line}`;
      return what === 'the file' ? `${place}: ${why}` : `${place}, ${what}: ${why}`;
    }),
  );
  const lines = readings.flatMap(readingLines);
  const traces = readings.reduce((sum, { spectra }) => sum + spectra.length, 0);
  if (traces > 0) {
    const from = asked === 1 ? '1 file' : `${asked} files`;
    notify('news', `Read ${traces === 1 ? '1 trace' : `${traces} traces`} from ${from}.`, lines);
  }
  if (refused.length > 0) {
    const what = refused.length === 1 ? 'One part' : `${refused.length} parts`;
    notify('refusal', `${what} of what was given could not be used:`, refused);
  }
}

/** One line for each trace: what was understood, and what was left open. */
function readingLines({ file, encoding, delimiter, decimal, spectra }: Reading): string[] {
  return spectra.map(({ name, quantity, points, wavelengthNm, assumptions }) => {
    const range = `${wavelengthNm[0]} to ${wavelengthNm.at(-1)} nm`;
    const understood = `${encoding}, delimiter ${delimiter}, decimal ${decimal}; ${quantity.replaceAll('-', ' ')}, ${points} points, ${range}.`;
    return [`${file} · ${name}: ${understood}`, ...assumptions].join(' ');
  });
}
