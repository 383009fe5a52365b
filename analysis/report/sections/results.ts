import { speciesLabel, speciesName } from '../../sheet/defaults.ts';
import type { Sheet } from '../../sheet/schema.ts';
import type {
  AliquotCurves,
  AliquotResult,
  ComparisonResult,
  Quantified,
  Results,
  RunResult,
} from '../../split/results.ts';
import { fitFigureSvg } from '../figures/fit-figure.ts';
import { escaped, htmlTable } from '../html.ts';
import { figuresText, numberText, quantifiedText, type ReadingUnit } from '../numbers.ts';
import { answerText } from './answer.ts';

/** Fit and split of every aliquot, then of the runs. */
export function resultsHtml(
  sheet: Sheet,
  results: Results,
  curves: readonly AliquotCurves[],
): string {
  const aliquots = results.aliquots.map((result) => {
    const drawn = curves.find(({ aliquot }) => aliquot === result.aliquot);
    return aliquotHtml(sheet, result, drawn);
  });
  const refused = results.refused.map(
    ({ what, why }) => `<p><strong>${escaped(what)} was refused.</strong> ${escaped(why)}</p>`,
  );
  return `<h2>Fit and split</h2>${aliquots.join('')}${refused.join('')}${runsHtml(sheet, results.runs)}${comparisonsHtml(sheet, results.comparisons)}`;
}

function aliquotHtml(
  sheet: Sheet,
  result: AliquotResult,
  curves: AliquotCurves | undefined,
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
    ledger(sheet, result),
    fitLine(result),
    doubtsHtml(sheet, result),
    budgetLine(result),
    '</section>',
  ].join('');
}

function ledger(sheet: Sheet, { concentrations, split }: AliquotResult): string {
  const rows = concentrations.map(({ species, cuvetteMolPerL, flaskMolPerL, detected }) => {
    const fraction = split.find((each) => each.species === species)?.fraction;
    return [
      `${escaped(speciesName(sheet, species))}${detected ? '' : ' <em>below detection</em>'}`,
      ...cells(cuvetteMolPerL, 'micromolar', detected),
      ...cells(flaskMolPerL, 'millimolar', detected),
      ...(fraction ? cells(fraction, 'percent', true) : ['', '']),
    ];
  });
  return htmlTable(
    ['species', 'cuvette, µmol/L', '95 %', 'flask, mmol/L', '95 %', 'of products, %', '95 %'],
    ['left', 'right', 'interval', 'right', 'interval', 'right', 'interval'],
    rows,
  );
}

function cells(quantity: Quantified, unit: ReadingUnit, isShown: boolean): [string, string] {
  const { value, interval } = quantifiedText(quantity, { unit });
  return [isShown ? value : '—', interval];
}

function fitLine({ fit }: AliquotResult): string {
  const { noise, baseline, shiftNm } = fit;
  const parts = [
    `${fit.points} points from ${fit.windowNm[0]} to ${fit.windowNm[1]} nm`,
    `residual rms ${figuresText(1000 * fit.residualRms)} mAU`,
    fit.reducedChiSquare === null ? '' : `reduced χ² ${numberText(fit.reducedChiSquare, 2)}`,
    `noise ${noise.from === 'sheet' ? 'as given' : 'estimated'}: ${figuresText(1000 * noise.constant)} mAU constant, ${figuresText(1000 * noise.transmittance)} mAU from transmittance`,
    ...baseline.map(
      ({ term, absorbance }) =>
        `baseline ${term} ${numberText(1000 * (absorbance.value ?? 0), 2)} mAU (u ${numberText(1000 * (absorbance.standardUncertainty ?? 0), 2)})`,
    ),
    shiftNm.standardUncertainty === 0
      ? ''
      : `wavelength offset ${numberText(shiftNm.value ?? 0, 3)} nm (u ${numberText(shiftNm.standardUncertainty ?? 0, 3)})`,
  ];
  return `<p class="soft small">${escaped(parts.filter((part) => part !== '').join('; '))}.</p>`;
}

function doubtsHtml(sheet: Sheet, { doubts, notes }: AliquotResult): string {
  const list = doubts.map(({ code, message, species = [] }) => {
    const names = species.map((id) => speciesLabel(sheet, id)).join(', ');
    return `<li><strong>${escaped(code.replaceAll('-', ' '))}${names === '' ? '' : `: ${escaped(names)}`}.</strong> ${escaped(message)}</li>`;
  });
  const noted = notes.map((note) => `<p class="soft">${escaped(note)}</p>`).join('');
  return `${list.length === 0 ? '<p class="soft">No doubt was raised.</p>' : `<ol class="doubts">${list.join('')}</ol>`}${noted}`;
}

function budgetLine({ budget, split }: AliquotResult): string {
  const [product] = split;
  if (budget.length === 0 || !product) return '';
  const shares = budget
    .filter(({ share }) => share >= 0.005)
    .map(({ source, share }) => `${source} ${figuresText(100 * share)} %`);
  return `<p class="soft small">Of the variance of the fraction of ${escaped(product.species)}: ${escaped(shares.join('; '))}.</p>`;
}

function runsHtml(sheet: Sheet, runs: readonly RunResult[]): string {
  const shown = runs.filter(({ aliquots }) => aliquots > 0);
  if (shown.length === 0) return '';
  const rows = shown.map((run) => {
    const answer = answerText(sheet, run);
    const { coresFound, armsFound } = run.balance;
    const share = (found: Quantified | null): string => {
      if (!found) return '';
      const { value, interval } = quantifiedText(found, { unit: 'percent' });
      return `${value} (${interval})`;
    };
    const name = sheet.runs?.find(({ id }) => id === run.run)?.name;
    return [
      escaped(name ? `${name} (${run.run})` : run.run),
      String(run.aliquots),
      answer
        ? `${escaped(answer.head)}<br><span class="soft">${escaped(answer.interval)}</span>`
        : '',
      share(coresFound),
      share(armsFound),
    ];
  });
  return `<h3>Runs</h3>${htmlTable(
    ['run', 'aliquots', 'together', 'cores found, % of charged', 'arms found, % of charged'],
    ['left', 'right', 'left', 'right', 'right'],
    rows,
  )}<p class="soft small">What does not absorb is not seen by the spectrum and is missing from what was found.</p>`;
}

function comparisonsHtml(sheet: Sheet, comparisons: readonly ComparisonResult[]): string {
  if (comparisons.length === 0) return '';
  const rows = comparisons.map(({ runs, of, to, ratioOfRatios, pValue }) => {
    const { value, interval } = quantifiedText(ratioOfRatios, { unit: 'plain' });
    return [
      escaped(`${runs[0]} over ${runs[1]}`),
      escaped(`${speciesLabel(sheet, of)} : ${speciesLabel(sheet, to)}`),
      value,
      interval,
      pValue === null ? '—' : pValue < 1e-4 ? 'below 0.0001' : pValue.toPrecision(2),
    ];
  });
  return `<h2>Runs compared</h2>${htmlTable(
    ['runs', 'ratio', 'ratio of ratios', '95 %', 'p-value'],
    ['left', 'left', 'right', 'interval', 'right'],
    rows,
  )}`;
}
