import type { SheetSource } from '../reading/sheet-sources.ts';
import type { Sheet } from '../sheet/schema.ts';
import type { AliquotResult, Quantification } from '../split/results.ts';
import { concentrationUnit } from './concentration-unit.ts';
import { fitFigureCaption } from './figures/fit-figure.ts';
import { escaped } from './html.ts';
import { pageStyle } from './page-style.ts';
import { resultsJson } from './results-json.ts';
import { type AmountUnits, aliquotHtml } from './sections/aliquot.ts';
import { cautionsHtml, methodHtml, provenanceHtml, warningsHtml } from './sections/closing.ts';
import { aliquotsHtml, reactionHtml, standardsHtml } from './sections/inputs.ts';
import { comparisonsHtml, runsHtml } from './sections/runs.ts';
import { summaryHtml } from './sections/summary.ts';
import { reportStyle } from './style.ts';

export interface ReportOptions {
  /** ISO date and time, given by the caller: all that differs between two reports of one sheet. */
  readonly madeOn: string;
  readonly program: string;
  readonly warnings?: readonly string[];
  readonly sources: readonly SheetSource[];
}

/**
 * The printed sheet as one self-contained HTML file: the answers, the sections of the screen in
 * their order, then method, provenance and cautions. No script, nothing from outside, no style
 * attributes, all text of the user escaped. The same input gives the same bytes, but for `madeOn`.
 * Throws (a fault) on a number of the results that is not finite.
 */
export function reportHtml(
  sheet: Sheet,
  { results, curves, standards }: Quantification,
  options: ReportOptions,
): string {
  // for its check alone: a number that is none must not be printed as if it were missing
  resultsJson(results);
  const title = sheet.title || 'Untitled sheet';
  const units = amountUnits(results.aliquots);
  const aliquots = results.aliquots.map((result) =>
    aliquotHtml(
      sheet,
      result,
      curves.find(({ aliquot }) => aliquot === result.aliquot),
      units,
    ),
  );
  const refused = results.refused.map(
    ({ what, why }) =>
      `<p class="refused"><strong>${escaped(what)} was refused.</strong> ${escaped(why)}</p>`,
  );
  return [
    '<!doctype html>\n<html lang="en"><head><meta charset="utf-8">',
    `<meta http-equiv="Content-Security-Policy" content="default-src 'none'; style-src 'unsafe-inline'; img-src data:">`,
    '<meta name="viewport" content="width=device-width, initial-scale=1">',
    `<title>${escaped(title)}</title><style>${pageStyle(sheet, title)}${reportStyle}</style></head><body>`,
    `<h1>${escaped(title)}</h1>`,
    `<p class="soft">Made on ${escaped(dateText(options.madeOn))} with ${escaped(options.program)}.</p>`,
    sheet.invented === true
      ? '<p class="invented">Invented data, for demonstration: not the spectra of real compounds.</p>'
      : '',
    summaryHtml(sheet, results),
    reactionHtml(sheet),
    standardsHtml(sheet, standards),
    aliquotsHtml(sheet),
    `<div class="new-page"><h2>Fit and split</h2><p class="soft small">${fitFigureCaption}</p>${aliquots.join('')}${refused.join('')}</div>`,
    runsHtml(sheet, results.runs),
    comparisonsHtml(sheet, results.comparisons),
    methodHtml(sheet, options.program),
    provenanceHtml(options.sources),
    warningsHtml(options.warnings ?? []),
    cautionsHtml,
    '</body></html>\n',
  ].join('');
}

/** "2026-12-01 11:48 UTC" from an ISO time; anything else as it is. */
function dateText(iso: string): string {
  const parts = /^(\d{4}-\d{2}-\d{2})T(\d{2}:\d{2})(?::\d{2}(?:\.\d+)?)?Z$/.exec(iso);
  return parts ? `${parts[1]} ${parts[2]} UTC` : iso;
}

function amountUnits(aliquots: readonly AliquotResult[]): AmountUnits {
  const all = aliquots.flatMap(({ concentrations }) => concentrations);
  return {
    cuvette: concentrationUnit(all.map(({ cuvetteMolPerL }) => cuvetteMolPerL.value)),
    flask: concentrationUnit(all.map(({ flaskMolPerL }) => flaskMolPerL.value)),
  };
}
