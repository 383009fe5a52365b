import { speciesLabel } from '../../sheet/defaults.ts';
import type { Sheet } from '../../sheet/schema.ts';
import type { ComparisonResult, Quantified, RunResult } from '../../split/results.ts';
import { breakable, htmlTable, oneLine } from '../html.ts';
import { quantifiedText } from '../numbers.ts';
import { answerText } from './answer.ts';

/** "Arm into core (r1)": the name of a run and its id. */
export function runName(sheet: Sheet, id: string): string {
  const name = sheet.runs?.find((run) => run.id === id)?.name;
  return name ? `${name} (${id})` : id;
}

/** The aliquots of each run taken together, and what was found of what was charged. */
export function runsHtml(sheet: Sheet, runs: readonly RunResult[]): string {
  const shown = runs.filter(({ aliquots }) => aliquots > 0);
  if (shown.length === 0) return '';
  const rows = shown.map((run) => {
    const answer = answerText(sheet, run);
    const { coresFound, armsFound } = run.balance;
    return [
      breakable(runName(sheet, run.run)),
      String(run.aliquots),
      answer
        ? `<strong>${oneLine(answer.head)}</strong><br><span class="soft">${breakable(answer.interval)}</span>`
        : '',
      foundText(coresFound),
      foundText(armsFound),
    ];
  });
  return `<section class="keep"><h3>Runs</h3>${htmlTable(
    ['run', 'aliquots', 'together', 'cores found, % of charged', 'arms found, % of charged'],
    ['left', 'right', 'left', 'right', 'right'],
    rows,
  )}<p class="soft small">What does not absorb is not seen by the spectrum and is missing from what was found.</p></section>`;
}

function foundText(found: Quantified | null): string {
  if (!found) return '';
  const { value, interval } = quantifiedText(found, { unit: 'percent' });
  return `${value}<br><span class="soft">${interval}</span>`;
}

/** Ratio of the ratios of every two runs; errors that both share cancel in it. */
export function comparisonsHtml(sheet: Sheet, comparisons: readonly ComparisonResult[]): string {
  if (comparisons.length === 0) return '';
  const rows = comparisons.map(({ runs, of, to, ratioOfRatios, pValue }) => {
    const { value, interval } = quantifiedText(ratioOfRatios, { unit: 'plain' });
    return [
      breakable(`${runName(sheet, runs[0])} over ${runName(sheet, runs[1])}`),
      oneLine(`${speciesLabel(sheet, of)} : ${speciesLabel(sheet, to)}`),
      value,
      interval,
      pValueText(pValue),
    ];
  });
  return `<h2>Runs compared</h2>${htmlTable(
    ['run over run', 'ratio', 'ratio of ratios', '95 %', 'p-value'],
    ['left', 'left', 'right', 'interval', 'right'],
    rows,
  )}<p class="soft small">Errors that the runs share, such as those of the standards, cancel in the ratio of their ratios.</p>`;
}

function pValueText(pValue: number | null): string {
  if (pValue === null) return '—';
  return pValue < 1e-4 ? 'below 0.0001' : pValue.toPrecision(2);
}
