import type { SheetSource } from '../../reading/sheet-sources.ts';
import { type FitSettings, fitSettings } from '../../sheet/defaults.ts';
import type { Sheet } from '../../sheet/schema.ts';
import { breakable, escaped, htmlTable } from '../html.ts';
import { givenText } from '../numbers.ts';

/** The method in a paragraph: model, weights, window, noise, baseline, intervals, versions. */
export function methodHtml(sheet: Sheet, program: string): string {
  const settings = fitSettings(sheet);
  const baseline = {
    none: 'no baseline',
    offset: 'a constant baseline',
    line: 'a baseline of offset and slope',
    scatter: 'a baseline of offset and a term in λ⁻⁴',
  }[settings.baseline];
  const window = settings.windowNm
    ? `the window from ${rangeText(settings.windowNm)}`
    : 'the range that all spectra share';
  const excluded =
    settings.excludeNm.length === 0
      ? ''
      : `, without ${settings.excludeNm.map(rangeText).join(' and ')}`;
  return `<h2>Method</h2><p>${escaped(
    `The absorbance of each aliquot over ${window}${excluded} was described as the sum of the standards' molar absorptivities times amounts and path length, with ${baseline}; ${shiftText(settings)}. ${strayLightText(settings)} ` +
      `Points above an absorbance of ${givenText(settings.upperAbsorbance)} were left out. The fit is weighted least squares by orthogonal decomposition with weights from the fitted absorbance; offsets that the solutions of one species show against each other were taken out of them; the standards were brought to the crude's wavelengths by interpolation exact for a cubic and combined weighted by their uncertainties. ${noiseText(sheet)} ` +
      'Uncertainties follow the GUM (JCGM 100): noise and lack of fit, noise and common scale errors of the standards, dilution; u is a standard uncertainty (k = 1). Intervals are 95 %: of fractions and ratios by Fieller, near an edge by Feldman and Cousins; amounts are quoted non-negative, with an upper limit where they are below detection (5 % false alarms). ' +
      `Numbers are rounded so that two figures of u remain. Computed with ${program}; sheet format 1, results format 1.`,
  )}</p>`;
}

function shiftText({ shift, shiftPriorNm }: FitSettings): string {
  if (shift === 'none') return 'crude and standards were taken to agree in wavelength';
  const prior =
    shiftPriorNm === null
      ? 'left free'
      : `held by a standard uncertainty of the wavelength scale of ${givenText(shiftPriorNm)} nm`;
  return `one wavelength offset between crude and standards, ${prior}, was found by variable projection`;
}

function strayLightText({ strayLight }: FitSettings): string {
  if (strayLight === 'fit') {
    return 'Stray light, one fraction of the light at every wavelength, was found by the fit and taken out of the crude and the standards.';
  }
  if (strayLight === 0) return 'No stray light was taken into account.';
  const percent = givenText(Number((100 * strayLight).toPrecision(12)));
  return `Stray light, stated as ${percent} % of the light at every wavelength, was taken out of the crude and the standards.`;
}

/** Where the noise is from: stated, else scans, else the spectrum itself. */
function noiseText({ fit, noiseScans = [] }: Sheet): string {
  if (fit?.noise) {
    const { constant, transmittance } = fit.noise;
    return `The noise was given: ${givenText(1000 * constant)} mAU at every absorbance, and an error in transmittance of ${givenText(transmittance)}.`;
  }
  const model = 'The noise (a constant part in absorbance and a constant error in transmittance)';
  const scans = noiseScans.reduce((sum, { spectra }) => sum + spectra.length, 0);
  if (scans === 0) return `${model} was estimated from the spectrum and its residual.`;
  const of = noiseScans.length === 1 ? 'one cuvette' : `${noiseScans.length} cuvettes`;
  return `${model} was taken from ${scans === 1 ? '1 scan' : `${scans} scans`} of ${of}: the scatter of the scans about each other, or of a single one about a line.`;
}

function rangeText([low, high]: readonly [number, number]): string {
  return `${givenText(low)} to ${givenText(high)} nm`;
}

/** Every file behind the report with the checksum of its bytes, and how it was read. */
export function provenanceHtml(sources: readonly SheetSource[]): string {
  const rows = sources.map(({ file, sha256, what, decisions }) => [
    breakable(file),
    breakable(what),
    `<span class="hash">${escaped(sha256 || 'not known')}</span>${decisions.length === 0 ? '' : `<br><span class="soft small">${escaped(decisions.join(' '))}</span>`}`,
  ]);
  return `<h2>Provenance</h2>${htmlTable(['file', 'used as', 'SHA-256, and how it was read'], ['left', 'left', 'left'], rows)}`;
}

/** What in the sheet or the files was not used. */
export function warningsHtml(warnings: readonly string[]): string {
  if (warnings.length === 0) return '';
  return `<h2>Left unused</h2>${warnings.map((warning) => `<p>${escaped(warning)}</p>`).join('')}`;
}

export const cautionsHtml =
  '<h2>Cautions</h2><div class="cautions">' +
  "<p>A result is not a release decision until the method has been validated under the user's own quality system.</p>" +
  "<p>Changing the order or the rate of addition changes heat release and accumulation of reagent: a change of procedure goes through the site's own process-safety review.</p>" +
  '<p>Solvents and strong bases are handled as the local rules and the safety data sheets say.</p></div>';
