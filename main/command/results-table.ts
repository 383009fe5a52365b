import {
  type AliquotResult,
  type Quantified,
  quantifiedText,
  type Results,
  type Sheet,
  speciesLabel,
  speciesName,
} from '../../analysis/index.ts';
import { table } from './table.ts';

/** The results for a terminal: one block an aliquot, then the runs and their comparisons. */
export function resultsTable(sheet: Sheet, results: Results): string {
  const blocks = results.aliquots.map((aliquot) => aliquotBlock(sheet, aliquot));
  if (results.runs.some(({ split }) => split.length > 0)) blocks.push(runsBlock(sheet, results));
  if (results.comparisons.length > 0) blocks.push(comparisonsBlock(sheet, results));
  const title = results.title === '' ? [] : [results.title];
  const invented = sheet.invented === true ? ['Invented data, for demonstration.'] : [];
  return `${[...title, ...invented, ...blocks].join('\n\n')}\n`;
}

function aliquotBlock(sheet: Sheet, aliquot: AliquotResult): string {
  const name = (species: string) => speciesName(sheet, species);
  const rows = aliquot.concentrations.map(({ species, cuvetteMolPerL, flaskMolPerL, detected }) => {
    const fraction = aliquot.split.find((entry) => entry.species === species)?.fraction;
    return [
      name(species),
      cell(cuvetteMolPerL, 'micromolar'),
      cell(flaskMolPerL, 'millimolar'),
      fraction ? cell(fraction, 'percent') : '',
      detected ? '' : 'below detection',
    ];
  });
  const ratios = aliquot.ratios.map(
    ({ of, to, value }) =>
      `  ${speciesLabel(sheet, of)} : ${speciesLabel(sheet, to)} = ${cell(value, 'plain')}`,
  );
  const doubts = aliquot.doubts.map(({ code, message }) => `  ! ${code}: ${message}`);
  return [
    `${aliquot.aliquot}${aliquot.run === null ? '' : ` (run ${aliquot.run})`}`,
    table(
      ['species', 'cuvette, µmol/L (95 %)', 'flask, mmol/L (95 %)', 'of products, % (95 %)', ''],
      rows,
      '  ',
    ),
    ...ratios,
    ...doubts,
    ...aliquot.notes.map((note) => `  ${note}`),
  ].join('\n');
}

function runsBlock(sheet: Sheet, { runs }: Results): string {
  const rows = runs.flatMap(({ run, aliquots, split, ratios }) => [
    ...split.map(({ species, fraction }) => [
      run,
      String(aliquots),
      `${speciesLabel(sheet, species)}, % of products`,
      cell(fraction, 'percent'),
    ]),
    ...ratios.map(({ of, to, value }) => [
      run,
      String(aliquots),
      `${speciesLabel(sheet, of)} : ${speciesLabel(sheet, to)}`,
      cell(value, 'plain'),
    ]),
  ]);
  return `Runs\n${table(['run', 'aliquots', 'quantity', 'value (95 %)'], rows, '  ')}`;
}

function comparisonsBlock(sheet: Sheet, { comparisons }: Results): string {
  const rows = comparisons.map(({ runs, of, to, ratioOfRatios, pValue }) => [
    `${runs[0]} over ${runs[1]}`,
    `${speciesLabel(sheet, of)} : ${speciesLabel(sheet, to)}`,
    cell(ratioOfRatios, 'plain'),
    pValue === null ? '' : pValue < 1e-4 ? 'below 0.0001' : pValue.toPrecision(2),
  ]);
  return `Runs compared\n${table(['runs', 'ratio', 'ratio of ratios (95 %)', 'p'], rows, '  ')}`;
}

function cell(
  quantity: Quantified,
  unit: 'micromolar' | 'millimolar' | 'percent' | 'plain',
): string {
  const { value, interval } = quantifiedText(quantity, { unit });
  return `${value} (${interval})`;
}
