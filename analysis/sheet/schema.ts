import * as v from 'valibot';

/**
 * The sheet as SHEET.md has it, checked member by member. Unknown members pass through unharmed
 * (`looseObject`), so that saving keeps them; `openSheet` reports them.
 */

const finite = v.pipe(v.number('must be a number'), v.finite('must be a finite number'));
const positive = v.pipe(finite, v.gtValue(0, 'must be greater than 0'));
const nonNegative = v.pipe(finite, v.minValue(0, 'must not be negative'));
const count = v.pipe(
  v.number('must be a whole number'),
  v.integer('must be a whole number'),
  v.minValue(0, 'must not be negative'),
);
const id = v.pipe(
  v.string('must be a text'),
  v.nonEmpty('must not be empty'),
  v.maxLength(200, 'must not be longer than 200 characters'),
  // a record keyed by ids would lose these in silence
  v.check(
    (text) => !['__proto__', 'constructor', 'prototype'].includes(text),
    'must not be a word that JavaScript keeps for itself',
  ),
);
const text = v.pipe(v.string('must be a text'), v.maxLength(20_000, 'is too long'));
const rangeNm = v.pipe(
  v.tuple([positive, positive], 'must be two wavelengths [low, high]'),
  v.check(([low, high]) => low < high, 'must have the lower wavelength first'),
);
const points = v.array(v.nullable(finite), 'must be a list of numbers');

export const embeddedSpectrumSchema = v.looseObject({
  name: text,
  wavelengthNm: v.array(positive, 'must be a list of wavelengths in nm'),
  absorbance: v.optional(points),
  molarAbsorptivity: v.optional(points),
  assumptions: v.optional(v.array(text)),
  source: v.optional(v.looseObject({ file: text, sha256: v.optional(text) })),
});

const spectrumSchema = v.looseObject({
  file: v.optional(id),
  trace: v.optional(count),
  embedded: v.optional(embeddedSpectrumSchema),
});

const speciesSchema = v.looseObject({
  id,
  name: v.optional(text),
  cores: count,
  arms: count,
  absorbs: v.optional(v.boolean('must be true or false')),
  molarMassGPerMol: v.optional(positive),
});

const stockSchema = v.looseObject({
  id,
  species: id,
  relativeStandardUncertainty: v.optional(nonNegative),
});

const standardSchema = v.looseObject({
  id,
  species: id,
  stock: v.optional(id),
  kind: v.optional(
    v.picklist(['solution', 'molar-absorptivity'], 'must be "solution" or "molar-absorptivity"'),
  ),
  spectrum: spectrumSchema,
  concentrationMolPerL: v.optional(positive),
  relativeStandardUncertainty: v.optional(nonNegative),
  pathLengthCm: v.optional(positive),
});

/** Scans of one and the same cuvette (a blank, a solution): their scatter is the instrument's noise. */
const noiseScansSchema = v.looseObject({
  id,
  spectra: v.pipe(
    v.array(spectrumSchema, 'must be a list of spectra'),
    v.nonEmpty('must not be empty'),
  ),
});

const runSchema = v.looseObject({
  id,
  name: v.optional(text),
  order: v.optional(
    v.picklist(
      ['arm-into-core', 'core-into-arm', 'together'],
      'must be "arm-into-core", "core-into-arm" or "together"',
    ),
  ),
  chargedMol: v.optional(v.record(v.string(), nonNegative)),
  volumeL: v.optional(positive),
  additionTimeMin: v.optional(nonNegative),
});

const dilutionStepSchema = v.looseObject({
  takeMl: positive,
  takeWith: v.optional(text),
  toMl: positive,
  toWith: v.optional(text),
});

const dilutionSchema = v.looseObject({
  factor: v.optional(v.pipe(finite, v.minValue(1, 'must be 1 or more'))),
  relativeStandardUncertainty: v.optional(nonNegative),
  steps: v.optional(v.array(dilutionStepSchema, 'must be a list of steps')),
});

const aliquotSchema = v.looseObject({
  id,
  name: v.optional(text),
  run: v.optional(id),
  spectrum: spectrumSchema,
  pathLengthCm: v.optional(positive),
  dilution: v.optional(dilutionSchema),
});

const fitSchema = v.looseObject({
  windowNm: v.optional(rangeNm),
  excludeNm: v.optional(v.array(rangeNm, 'must be a list of ranges [low, high]')),
  baseline: v.optional(
    v.picklist(
      ['none', 'offset', 'line', 'scatter'],
      'must be "none", "offset", "line" or "scatter"',
    ),
  ),
  shift: v.optional(v.picklist(['none', 'common'], 'must be "none" or "common"')),
  /** How well the wavelength scale is known: a prior of mean 0 on the offset, for shift "common". */
  shiftStandardUncertaintyNm: v.optional(positive),
  /** Stray light as a fraction of the light in the reference beam, or to be found by the fit. */
  strayLight: v.optional(
    v.union(
      [v.literal('fit'), v.pipe(finite, v.minValue(0), v.maxValue(0.05))],
      'must be "fit", or a fraction from 0 to 0.05',
    ),
  ),
  upperAbsorbance: v.optional(positive),
  noise: v.optional(v.looseObject({ constant: nonNegative, transmittance: nonNegative })),
});

export const sheetSchema = v.looseObject({
  format: v.literal('monobis-sheet', 'must be "monobis-sheet"'),
  version: v.literal(1, 'must be 1'),
  title: v.optional(text),
  /** Invented demonstration data say so here; it is shown and printed. */
  invented: v.optional(v.boolean('must be true or false')),
  reaction: v.looseObject({
    core: id,
    arm: id,
    sites: v.pipe(count, v.minValue(1, 'must be 1 or more')),
  }),
  species: v.array(speciesSchema, 'must be a list of species'),
  stocks: v.optional(v.array(stockSchema, 'must be a list of stocks')),
  standards: v.optional(v.array(standardSchema, 'must be a list of standards')),
  runs: v.optional(v.array(runSchema, 'must be a list of runs')),
  aliquots: v.optional(v.array(aliquotSchema, 'must be a list of aliquots')),
  noiseScans: v.optional(v.array(noiseScansSchema, 'must be a list of groups of scans')),
  fit: v.optional(fitSchema),
});

type Frozen<T> = T extends object ? { readonly [K in keyof T]: Frozen<T[K]> } : T;

export type Sheet = Frozen<v.InferOutput<typeof sheetSchema>>;
export type SheetSpecies = Sheet['species'][number];
export type SheetStock = NonNullable<Sheet['stocks']>[number];
export type SheetStandard = NonNullable<Sheet['standards']>[number];
export type SheetRun = NonNullable<Sheet['runs']>[number];
export type SheetAliquot = NonNullable<Sheet['aliquots']>[number];
export type SheetNoiseScans = NonNullable<Sheet['noiseScans']>[number];
export type SheetSpectrum = SheetStandard['spectrum'];
export type EmbeddedSpectrum = NonNullable<SheetSpectrum['embedded']>;
export type SheetDilution = NonNullable<SheetAliquot['dilution']>;
export type SheetFit = NonNullable<Sheet['fit']>;
