import { speciesLabel } from '../../sheet/defaults.ts';
import type { Sheet } from '../../sheet/schema.ts';
import { budgetAdvice } from '../../split/budget-advice.ts';
import type { AliquotCurves, AliquotResult, Quantified } from '../../split/results.ts';
import { doubtTitles } from '../doubt-titles.ts';
import { fitFigureSvg } from '../figures/fit-figure.ts';
import { splitBarSvg } from '../figures/split-bar.ts';
import { escaped, htmlTable } from '../html.ts';
import {
  figuresText,
  givenText,
  quantifiedText,
  type ReadingUnit,
  readingUnits,
} from '../numbers.ts';
import { separationText } from '../separation-text.ts';
import { speciesCell } from '../species-cell.ts';
import { answerText } from './answer.ts';

/** Units of the two columns of amounts, the same for all aliquots of a report. */
export interface AmountUnits {
  readonly cuvette: ReadingUnit;
  readonly flask: ReadingUnit;
}

/** Fit and split of one aliquot: the answer, the fit, the ledger of amounts, the doubts. */
export function aliquotHtml(
  sheet: Sheet,
  result: AliquotResult,
  curves: AliquotCurves | undefined,
  units: AmountUnits,
): string {
  const answer = answerText(sheet, result);
  const run = result.run === null ? '' : ` of run ${escaped(result.run)}`;
  return [
    `<section class="aliquot"><div class="keep"><h3>Aliquot ${escaped(result.aliquot)}${run}</h3>`,
    answer
      ? `<p class="answer">${escaped(answer.head)}</p><p class="interval">${escaped(answer.interval)}</p>`
      : '',
    curves ? fitFigureSvg(sheet, curves, result.doubts) : '',
    '</div>',
    `<p class="soft small">${escaped(fitText(sheet, result))}</p>`,
    splitBarSvg(sheet, result.split),
    ledger(sheet, result, units),
    doubtsHtml(sheet, result),
    budgetLine(sheet, result),
    '</section>',
  ].join('');
}

function ledger(
  sheet: Sheet,
  { concentrations, split }: AliquotResult,
  { cuvette, flask }: AmountUnits,
): string {
  const rows = concentrations.map(({ species, cuvetteMolPerL, flaskMolPerL, detected }) => {
    const fraction = split.find((each) => each.species === species)?.fraction;
    const remark = detected ? '' : ' <em>below detection</em>';
    return [
      speciesCell(sheet, species, { remark }),
      ...cells(cuvetteMolPerL, cuvette, detected),
      ...cells(flaskMolPerL, flask, detected),
      ...(fraction ? cells(fraction, 'percent', true) : ['', '']),
    ];
  });
  return htmlTable(
    [
      'species',
      `cuvette, ${readingUnits[cuvette].name}`,
      '95 %',
      `flask, ${readingUnits[flask].name}`,
      '95 %',
      'of products, %',
      '95 %',
    ],
    ['left', 'right', 'interval', 'right', 'interval', 'right', 'interval'],
    rows,
  );
}

function cells(quantity: Quantified, unit: ReadingUnit, isShown: boolean): [string, string] {
  const { value, interval } = quantifiedText(quantity, { unit });
  return isShown ? [value, interval] : ['—', interval.replace('below', 'less than')];
}

const noiseOrigins = { sheet: 'as given', scans: 'from the scans', spectrum: 'estimated' };

function fitText(sheet: Sheet, { fit }: AliquotResult): string {
  const { noise, baseline, shiftNm, strayLight } = fit;
  const withUncertainty = (quantity: Quantified, unit: ReadingUnit, unitName: string): string => {
    const { value, uncertainty } = quantifiedText(quantity, { unit });
    return `${value} ${unitName} (u ${uncertainty})`;
  };
  const parts = [
    `${givenText(fit.points)} points from ${givenText(fit.windowNm[0])} to ${givenText(fit.windowNm[1])} nm`,
    `residual rms ${figuresText(1000 * fit.residualRms)} mAU`,
    fit.reducedChiSquare === null
      ? 'reduced χ² not known, as the noise is known from this residual only'
      : `reduced χ² ${figuresText(fit.reducedChiSquare)}`,
    `noise ${noiseOrigins[noise.from]}: ${figuresText(1000 * noise.constant)} mAU constant, ${figuresText(1000 * noise.transmittance)} mAU from transmittance`,
    ...baseline.map(
      ({ term, absorbance }) =>
        `baseline ${term} ${withUncertainty(absorbance, 'milliabsorbance', 'mAU')}`,
    ),
    shiftNm.standardUncertainty === 0
      ? ''
      : `wavelength offset ${withUncertainty(shiftNm, 'plain', 'nm')}`,
    strayLight.from === 'fit' ? `stray light ${withUncertainty(strayLight, 'percent', '%')}` : '',
    strayLight.from === 'sheet' && strayLight.value !== null
      ? `stray light as stated: ${givenText(100 * strayLight.value)} %`
      : '',
    `uncertainty inflated by likeness of the standards in the window: ${separationText(sheet, fit)}`,
  ];
  return `${parts.filter((part) => part !== '').join('; ')}.`;
}

function doubtsHtml(sheet: Sheet, { doubts, notes }: AliquotResult): string {
  const list = doubts.map(({ code, message, species = [] }) => {
    const names = species.map((id) => speciesLabel(sheet, id)).join(', ');
    const of = names === '' ? '' : ` <span class="soft">· ${escaped(names)}</span>`;
    return `<li><strong>${escaped(doubtTitles[code])}</strong>${of}<br>${escaped(message)}</li>`;
  });
  const noted = notes.map((note) => `<p class="soft">${escaped(note)}</p>`).join('');
  const doubted =
    list.length === 0
      ? '<p class="soft">No doubt was raised. The interval holds as far as the sheet\'s own uncertainties do.</p>'
      : `<h4>Doubts</h4><ol class="doubts">${list.join('')}</ol>`;
  return doubted + noted;
}

function budgetLine(sheet: Sheet, { budget, split }: AliquotResult): string {
  const [product] = split;
  if (budget.length === 0 || !product) return '';
  const advice = budgetAdvice(budget) ?? '';
  const shares = budget
    .filter(({ share }) => share >= 0.005)
    .map(({ source, share }) => `${source} ${figuresText(100 * share)} %`);
  return `<p class="soft small">${escaped(`What the uncertainty is made of (variance of the fraction of ${speciesLabel(sheet, product.species)}): ${shares.join('; ')}. ${advice}`)}</p>`;
}
