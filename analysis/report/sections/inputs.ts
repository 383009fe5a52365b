import { speciesName } from '../../sheet/defaults.ts';
import type { Sheet, SheetSpectrum } from '../../sheet/schema.ts';
import type { StandardCurves } from '../../split/results.ts';
import { standardsFigureSvg } from '../figures/standards-figure.ts';
import { escaped, htmlTable } from '../html.ts';
import { figuresText, numberText } from '../numbers.ts';
import { speciesGlyph } from '../species-glyph.ts';

/** Reaction: the core, the arm, and every species by what is built into it. */
export function reactionHtml(sheet: Sheet): string {
  const { core, arm, sites } = sheet.reaction;
  const rows = sheet.species.map((species) => [
    `${speciesGlyph(sheet, species)} ${escaped(speciesName(sheet, species.id))}`,
    escaped(species.id),
    String(species.cores),
    String(species.arms),
    species.absorbs === false ? 'no' : 'yes',
    species.molarMassGPerMol === undefined ? '' : String(species.molarMassGPerMol),
  ]);
  return `<h2>Reaction</h2><p>The core ${escaped(speciesName(sheet, core))} carries ${sites} sites, each of which takes one arm ${escaped(speciesName(sheet, arm))}.</p>${htmlTable(
    ['species', 'id', 'cores', 'arms', 'absorbs', 'molar mass, g/mol'],
    ['left', 'left', 'right', 'right', 'left', 'right'],
    rows,
  )}`;
}

/** Standards: what was measured of each species, and the molar absorptivity that came of it. */
export function standardsHtml(sheet: Sheet, standards: readonly StandardCurves[]): string {
  const factors = new Map(
    standards.flatMap(({ solutions }) =>
      solutions.map(({ standard, factor }) => [standard, factor] as const),
    ),
  );
  const rows = (sheet.standards ?? []).map((standard) => [
    escaped(standard.id),
    escaped(speciesName(sheet, standard.species)),
    escaped(standard.stock ?? ''),
    standard.concentrationMolPerL === undefined
      ? 'given as ε'
      : String(Number((standard.concentrationMolPerL * 1e6).toPrecision(12))),
    percent(standard.relativeStandardUncertainty),
    String(standard.pathLengthCm ?? 1),
    escaped(fileOf(standard.spectrum)),
    factors.has(standard.id) ? numberText(100 * ((factors.get(standard.id) ?? 1) - 1), 2) : '',
  ]);
  const stocks = (sheet.stocks ?? []).map(({ id, species, relativeStandardUncertainty }) => [
    escaped(id),
    escaped(speciesName(sheet, species)),
    percent(relativeStandardUncertainty),
  ]);
  const scales = standards.map(
    ({ species, relativeScaleUncertainty }) =>
      `${escaped(speciesName(sheet, species))} ${figuresText(100 * relativeScaleUncertainty)} %`,
  );
  return [
    '<h2>Standards</h2>',
    htmlTable(
      ['standard', 'of', 'stock', 'µmol/L', 'u, %', 'path, cm', 'file', 'moved by, %'],
      ['left', 'left', 'left', 'right', 'right', 'right', 'left', 'right'],
      rows,
    ),
    stocks.length === 0
      ? ''
      : htmlTable(['stock', 'of', 'u, %'], ['left', 'left', 'right'], stocks),
    standardsFigureSvg(sheet, standards),
    scales.length === 0
      ? ''
      : `<p class="soft">Relative standard uncertainty of the scale of ε: ${scales.join('; ')}.</p>`,
  ].join('');
}

/** Aliquots and the runs they are of. */
export function aliquotsHtml(sheet: Sheet): string {
  const rows = (sheet.aliquots ?? []).map(({ id, run, pathLengthCm, dilution, spectrum }) => [
    escaped(id),
    escaped(run ?? ''),
    String(pathLengthCm ?? 1),
    dilution === undefined
      ? 'none'
      : dilution.factor !== undefined
        ? String(dilution.factor)
        : (dilution.steps ?? []).map(({ takeMl, toMl }) => `${takeMl} → ${toMl} mL`).join('; '),
    percent(dilution?.relativeStandardUncertainty),
    escaped(fileOf(spectrum)),
  ]);
  const runs = (sheet.runs ?? []).map(
    ({ id, name, order, chargedMol = {}, volumeL, additionTimeMin }) => [
      escaped(id),
      escaped(name ?? ''),
      escaped((order ?? '').replaceAll('-', ' ')),
      Object.entries(chargedMol)
        .map(
          ([species, mol]) =>
            `${escaped(speciesName(sheet, species))} ${figuresText(1000 * mol, 4)} mmol`,
        )
        .join('; '),
      volumeL === undefined ? '' : figuresText(1000 * volumeL, 4),
      additionTimeMin === undefined ? '' : String(additionTimeMin),
    ],
  );
  return [
    '<h2>Aliquots</h2>',
    htmlTable(
      ['aliquot', 'run', 'path, cm', 'dilution', 'u, %', 'file'],
      ['left', 'left', 'right', 'right', 'right', 'left'],
      rows,
    ),
    runs.length === 0
      ? ''
      : htmlTable(
          ['run', 'name', 'order of addition', 'charged', 'volume, mL', 'addition, min'],
          ['left', 'left', 'left', 'left', 'right', 'right'],
          runs,
        ),
  ].join('');
}

function percent(fraction: number | undefined): string {
  return fraction === undefined ? 'not given' : String(Number((100 * fraction).toPrecision(6)));
}

function fileOf({ file, embedded, trace }: SheetSpectrum): string {
  if (file !== undefined) return trace === undefined ? file : `${file}, trace ${trace}`;
  return embedded ? `${embedded.source?.file ?? 'embedded'}, ${embedded.name}` : '';
}
