import type { Doubt } from '../doubts/doubt.ts';
import type { Sheet } from '../sheet/schema.ts';
import type { AliquotResult, Quantification, Quantified, RunResult } from '../split/results.ts';

const headings = [
  'aliquot',
  'run',
  'quantity',
  'species',
  'value',
  'u',
  'low',
  'high',
  'unit',
  'text',
] as const;
const strayLightOrigins = {
  none: 'not taken into account',
  sheet: 'as stated',
  fit: 'found by the fit',
};
type Row = Partial<Record<(typeof headings)[number], string | number | null>>;

/**
 * One tidy row per number, RFC 4180 (commas, CRLF), full precision with a decimal point. It begins
 * with a byte-order mark, by which spreadsheets know UTF-8. Text that a spreadsheet would take for
 * a formula is given a leading apostrophe; numbers are left as numbers. An empty cell is an end
 * that is not bounded, or a value that does not exist. Throws (a fault) on a number that is none.
 */
export function reportCsv(sheet: Sheet, { results }: Quantification): string {
  const rows: Row[] = [
    { quantity: 'title', text: results.title },
    { quantity: 'program', text: results.program },
    ...(sheet.invented === true
      ? [{ quantity: 'note', text: 'Invented data, for demonstration.' }]
      : []),
    ...results.aliquots.flatMap(aliquotRows),
    ...results.runs.flatMap(runRows),
    ...results.comparisons.flatMap(({ runs, of, to, ratioOfRatios, pValue }): Row[] => {
      const between = { run: `${runs[0]} / ${runs[1]}`, species: `${of} / ${to}` };
      return [
        { ...between, quantity: 'ratio of ratios', ...numbers(ratioOfRatios), unit: '1' },
        { ...between, quantity: 'p-value', value: pValue, unit: '1' },
      ];
    }),
    ...results.refused.map(
      ({ what, why }): Row => ({ quantity: 'refused', text: `${what}: ${why}` }),
    ),
    ...results.warnings.map((text): Row => ({ quantity: 'warning', text })),
  ];
  const lines = rows.map((row) => headings.map((heading) => cell(row[heading])).join(','));
  return `\uFEFF${[headings.join(','), ...lines].join('\r\n')}\r\n`;
}

function aliquotRows(result: AliquotResult): Row[] {
  const whose = { aliquot: result.aliquot, run: result.run };
  const { fit } = result;
  return [
    ...result.concentrations.flatMap(
      ({ species, cuvetteMolPerL, flaskMolPerL, detected, detectionLimitMolPerL }): Row[] => [
        {
          quantity: 'concentration in the cuvette',
          species,
          ...numbers(cuvetteMolPerL),
          unit: 'mol/L',
          text: detected ? '' : 'below detection',
        },
        {
          quantity: 'concentration in the flask',
          species,
          ...numbers(flaskMolPerL),
          unit: 'mol/L',
          text: detected ? '' : 'below detection',
        },
        {
          quantity: 'detection limit in the cuvette',
          species,
          value: detectionLimitMolPerL,
          unit: 'mol/L',
        },
      ],
    ),
    ...splitRows(result),
    ...result.budget.map(
      ({ source, share }): Row => ({
        quantity: 'share of the variance',
        value: share,
        unit: '1',
        text: source,
      }),
    ),
    { quantity: 'points fitted', value: fit.points, unit: '1' },
    { quantity: 'window from', value: fit.windowNm[0], unit: 'nm' },
    { quantity: 'window to', value: fit.windowNm[1], unit: 'nm' },
    { quantity: 'residual rms', value: fit.residualRms, unit: 'absorbance' },
    { quantity: 'reduced chi-square', value: fit.reducedChiSquare, unit: '1' },
    { quantity: 'wavelength offset', ...numbers(fit.shiftNm), unit: 'nm' },
    {
      quantity: 'stray light',
      ...numbers(fit.strayLight),
      unit: '1',
      text: strayLightOrigins[fit.strayLight.from],
    },
    ...fit.separation.map(
      ({ species, inflation }): Row => ({
        quantity: 'uncertainty inflated by likeness of the standards',
        species,
        value: inflation,
        unit: '1',
      }),
    ),
    ...fit.baseline.map(
      ({ term, absorbance }): Row => ({
        quantity: `baseline ${term}`,
        ...numbers(absorbance),
        unit: 'absorbance',
      }),
    ),
    {
      quantity: 'noise, constant',
      value: fit.noise.constant,
      unit: 'absorbance',
      text: `from the ${fit.noise.from}`,
    },
    {
      quantity: 'noise, transmittance',
      value: fit.noise.transmittance,
      unit: 'absorbance at 0',
      text: `from the ${fit.noise.from}`,
    },
    ...result.doubts.flatMap(doubtRows),
    ...result.notes.map((text): Row => ({ quantity: 'note', text })),
  ].map((row) => ({ ...whose, ...row }));
}

/** One row for each range of wavelengths that the doubt names, one without if it names none. */
function doubtRows({ code, message, atNm = [], species = [] }: Doubt): Row[] {
  const doubt = { quantity: `doubt:${code}`, species: species.join(' / '), text: message };
  if (atNm.length < 2) return [doubt];
  const rows: Row[] = [];
  for (let i = 0; i + 1 < atNm.length; i += 2) {
    rows.push({ ...doubt, low: atNm[i] ?? null, high: atNm[i + 1] ?? null, unit: 'nm' });
  }
  return rows;
}

function runRows({ run, aliquots, balance, ...result }: RunResult): Row[] {
  const { coresFound, armsFound } = balance;
  return [
    { quantity: 'aliquots', value: aliquots, unit: '1' },
    ...splitRows(result),
    ...(coresFound
      ? [{ quantity: 'cores found over charged', ...numbers(coresFound), unit: '1' }]
      : []),
    ...(armsFound
      ? [{ quantity: 'arms found over charged', ...numbers(armsFound), unit: '1' }]
      : []),
  ].map((row) => ({ run, ...row }));
}

function splitRows({ split, ratios }: Pick<AliquotResult, 'split' | 'ratios'>): Row[] {
  return [
    ...split.map(
      ({ species, fraction }): Row => ({
        quantity: 'fraction of products',
        species,
        ...numbers(fraction),
        unit: '1',
      }),
    ),
    ...ratios.map(
      ({ of, to, value }): Row => ({
        quantity: 'ratio',
        species: `${of} / ${to}`,
        ...numbers(value),
        unit: '1',
      }),
    ),
  ];
}

function numbers({ value, standardUncertainty, interval95: [low, high] }: Quantified): Row {
  return { value, u: standardUncertainty, low, high };
}

function cell(value: string | number | null | undefined): string {
  if (value === null || value === undefined || value === '') return '';
  if (typeof value === 'number') {
    if (!Number.isFinite(value)) throw new Error('a number of the results is not finite');
    return String(value);
  }
  const safe = /^\s*[=+\-@\t\r]/.test(value) ? `'${value}` : value;
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
}
