import type { SheetSource } from '../reading/sheet-sources.ts';
import { fitSettings } from '../sheet/defaults.ts';
import type { Sheet } from '../sheet/schema.ts';
import type { Quantification } from '../split/results.ts';
import { escaped, htmlTable } from './html.ts';
import { aliquotsHtml, reactionHtml, standardsHtml } from './sections/inputs.ts';
import { resultsHtml } from './sections/results.ts';
import { reportStyle } from './style.ts';

export interface ReportOptions {
  /** ISO date and time, given by the caller: all that differs between two reports of one sheet. */
  readonly madeOn: string;
  readonly program: string;
  readonly warnings?: readonly string[];
  readonly sources: readonly SheetSource[];
}

/**
 * The printed sheet as one self-contained HTML file: the sections of the screen in their order,
 * then method, provenance and cautions. No script, nothing from outside, no style attributes, all
 * text of the user escaped. The same input gives the same bytes, but for `madeOn`.
 */
export function reportHtml(
  sheet: Sheet,
  { results, curves, standards }: Quantification,
  options: ReportOptions,
): string {
  const title = sheet.title || 'Untitled sheet';
  const warnings = options.warnings ?? [];
  return [
    '<!doctype html>\n<html lang="en"><head><meta charset="utf-8">',
    `<meta http-equiv="Content-Security-Policy" content="default-src 'none'; style-src 'unsafe-inline'; img-src data:">`,
    `<title>${escaped(title)}</title><style>${reportStyle}</style></head><body>`,
    `<h1>${escaped(title)}</h1>`,
    `<p class="soft">Made on ${escaped(options.madeOn)} with ${escaped(options.program)}.</p>`,
    sheet.invented === true
      ? '<p class="invented">Invented data, for demonstration: not the spectra of real compounds.</p>'
      : '',
    reactionHtml(sheet),
    standardsHtml(sheet, standards),
    aliquotsHtml(sheet),
    resultsHtml(sheet, results, curves),
    methodHtml(sheet, options.program),
    provenanceHtml(options.sources),
    warnings.length === 0
      ? ''
      : `<h2>Left unused</h2>${warnings.map((warning) => `<p>${escaped(warning)}</p>`).join('')}`,
    cautionsHtml,
    '</body></html>\n',
  ].join('');
}

function methodHtml(sheet: Sheet, program: string): string {
  const settings = fitSettings(sheet);
  const baseline = {
    none: 'no baseline',
    offset: 'a constant baseline',
    line: 'a baseline of offset and slope',
    scatter: 'a baseline of offset and a term in λ⁻⁴',
  }[settings.baseline];
  const shift =
    settings.shift === 'common'
      ? 'one wavelength offset between crude and standards was found by variable projection'
      : 'crude and standards were taken to agree in wavelength';
  const noise = settings.noise
    ? 'The noise (a constant part in absorbance and a constant error in transmittance) was given.'
    : 'The noise (a constant part in absorbance and a constant error in transmittance) was estimated from the spectrum and its residual.';
  const window = settings.windowNm
    ? `the window from ${settings.windowNm[0]} to ${settings.windowNm[1]} nm`
    : 'the range that all spectra share';
  return `<h2>Method</h2><p>${escaped(
    `The absorbance of each aliquot over ${window} was described as the sum of the standards' molar absorptivities times amounts, with ${baseline}; ${shift}. ` +
      `Points above an absorbance of ${settings.upperAbsorbance} were left out. The fit is weighted least squares by orthogonal decomposition with weights from the fitted absorbance; the standards were brought to the crude's wavelengths by interpolation exact for a cubic and combined weighted by their uncertainties. ${noise} ` +
      'Uncertainties follow the GUM (JCGM 100): noise and lack of fit, noise and common scale errors of the standards, dilution. Intervals are 95 %: of fractions and ratios by Fieller, near an edge by Feldman and Cousins; amounts are quoted non-negative, with an upper limit where they are below detection (5 % false alarms). ' +
      `Computed with ${program}.`,
  )}</p>`;
}

function provenanceHtml(sources: readonly SheetSource[]): string {
  const rows = sources.map(({ file, sha256, what, decisions }) => [
    escaped(file),
    escaped(what),
    `<span class="hash">${escaped(sha256 || 'not known')}</span>${decisions.length === 0 ? '' : `<br><span class="soft small">${escaped(decisions.join(' '))}</span>`}`,
  ]);
  return `<h2>Provenance</h2>${htmlTable(['file', 'used as', 'SHA-256, and how it was read'], ['left', 'left', 'left'], rows)}`;
}

const cautionsHtml =
  '<h2>Cautions</h2><div class="cautions">' +
  "<p>A result is not a release decision until the method has been validated under the user's own quality system.</p>" +
  "<p>Changing the order or the rate of addition changes heat release and accumulation of reagent: a change of procedure goes through the site's own process-safety review.</p>" +
  '<p>Solvents and strong bases are handled as the local rules and the safety data sheets say.</p></div>';
