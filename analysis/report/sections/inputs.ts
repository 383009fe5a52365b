import { speciesLabel, speciesName } from '../../sheet/defaults.ts';
import type { Sheet, SheetSpectrum } from '../../sheet/schema.ts';
import type { StandardCurves } from '../../split/results.ts';
import { standardsFigureSvg } from '../figures/standards-figure.ts';
import { breakable, escaped, htmlTable } from '../html.ts';
import { figuresText, givenText, numberText } from '../numbers.ts';
import { speciesCell } from '../species-cell.ts';

/** Reaction: the core, the arm, and every species by what is built into it. */
export function reactionHtml(sheet: Sheet): string {
  const { core, arm, sites } = sheet.reaction;
  const rows = sheet.species.map((species) => [
    speciesCell(sheet, species.id),
    breakable(species.id),
    String(species.cores),
    String(species.arms),
    species.absorbs === false ? 'no' : 'yes',
    species.molarMassGPerMol === undefined ? '' : givenText(species.molarMassGPerMol),
  ]);
  return `<h2>Reaction</h2><p>The core ${escaped(speciesName(sheet, core))} carries ${sites} sites, each of which takes one arm ${escaped(speciesName(sheet, arm))}.</p>${htmlTable(
    ['species', 'id', 'cores', 'arms', 'absorbs', 'molar mass, g/mol'],
    ['left', 'left', 'right', 'right', 'left', 'right'],
    rows,
  )}`;
}

type Met = StandardCurves['solutions'][number];

function metText(solution: Met | undefined, text: (solution: Met) => string): string {
  return solution ? text(solution) : '';
}

/** Up to which absorbance the solutions of each species were seen to follow Beer-Lambert. */
function linearityText(sheet: Sheet, standards: readonly StandardCurves[]): string {
  const parts = standards.map(({ species, linearity }) => {
    const name = speciesName(sheet, species);
    if (!linearity) return `${name} not tested`;
    const { testedUpTo, straightUpTo } = linearity;
    return straightUpTo < testedUpTo
      ? `${name} bends above ${numberText(straightUpTo, 2)}`
      : `${name} straight up to ${numberText(testedUpTo, 2)}`;
  });
  return ` Absorbance against concentration (F-test of a bend): ${parts.join('; ')}.`;
}

/** Standards: what was measured of each species, and the molar absorptivity that came of it. */
export function standardsHtml(sheet: Sheet, standards: readonly StandardCurves[]): string {
  const met = new Map(
    standards.flatMap(({ solutions }) =>
      solutions.map((solution) => [solution.standard, solution] as const),
    ),
  );
  const rows = (sheet.standards ?? []).map((standard) => [
    breakable(standard.id),
    speciesCell(sheet, standard.species, { name: 'short' }),
    breakable(standard.stock ?? ''),
    standard.concentrationMolPerL === undefined
      ? 'given as ε'
      : givenText(Number((standard.concentrationMolPerL * 1e6).toPrecision(6))),
    percent(standard.relativeStandardUncertainty),
    givenText(standard.pathLengthCm ?? 1),
    breakable(fileOf(standard.spectrum)),
    metText(met.get(standard.id), ({ factor }) => numberText(100 * (factor - 1), 2)),
    metText(met.get(standard.id), ({ offset }) => numberText(1000 * offset, 2)),
  ]);
  const stocks = (sheet.stocks ?? []).map(({ id, species, relativeStandardUncertainty }) => [
    breakable(id),
    speciesCell(sheet, species, { name: 'short' }),
    percent(relativeStandardUncertainty),
  ]);
  const scales = standards.map(
    ({ species, relativeScaleUncertainty }) =>
      `${escaped(speciesName(sheet, species))} ${figuresText(100 * relativeScaleUncertainty)} %`,
  );
  return [
    '<h2>Standards</h2>',
    htmlTable(
      [
        'standard',
        'of',
        'stock',
        'µmol/L',
        'u, %',
        'path, cm',
        'file',
        'moved by, %',
        'offset, mAU',
      ],
      ['left', 'left', 'left', 'right', 'right', 'right', 'left', 'right', 'right'],
      rows,
    ),
    stocks.length === 0
      ? ''
      : htmlTable(['stock', 'of', 'u, %'], ['left', 'left', 'right'], stocks),
    standardsFigureSvg(sheet, standards),
    scales.length === 0
      ? ''
      : `<p class="soft">Relative standard uncertainty of the scale of ε: ${scales.join('; ')}. “Moved by” is how far a solution was brought to meet the others of its species, “offset” a constant of its own that was taken out of it before.${escaped(linearityText(sheet, standards))}</p>`,
  ].join('');
}

/** Aliquots and the runs they are of. */
export function aliquotsHtml(sheet: Sheet): string {
  const rows = (sheet.aliquots ?? []).map(({ id, run, pathLengthCm, dilution, spectrum }) => [
    breakable(id),
    breakable(run ?? ''),
    givenText(pathLengthCm ?? 1),
    dilution === undefined
      ? 'none'
      : dilution.factor !== undefined
        ? givenText(dilution.factor)
        : (dilution.steps ?? [])
            .map(({ takeMl, toMl }) => `${givenText(takeMl)} → ${givenText(toMl)} mL`)
            .join('; '),
    percent(dilution?.relativeStandardUncertainty),
    breakable(fileOf(spectrum)),
  ]);
  const runs = (sheet.runs ?? []).map(
    ({ id, name, order, chargedMol = {}, volumeL, additionTimeMin }) => [
      breakable(id),
      breakable(name ?? ''),
      escaped((order ?? '').replaceAll('-', ' ')),
      Object.entries(chargedMol)
        .map(
          ([species, mol]) =>
            `${breakable(speciesLabel(sheet, species))} ${figuresText(1000 * mol, 4)} mmol`,
        )
        .join('; '),
      volumeL === undefined ? '' : figuresText(1000 * volumeL, 4),
      additionTimeMin === undefined ? '' : givenText(additionTimeMin),
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
  return fraction === undefined ? 'not given' : givenText(100 * fraction);
}

function fileOf({ file, embedded, trace }: SheetSpectrum): string {
  if (file !== undefined) return trace === undefined ? file : `${file}, trace ${trace}`;
  return embedded ? `${embedded.source?.file ?? 'embedded'}, ${embedded.name}` : '';
}
