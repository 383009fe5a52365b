/** Units of the abscissa and how a wavelength in nm follows from them. */
export type AxisUnit = 'nm' | 'µm' | 'Å' | 'cm-1' | 'eV';

export interface AxisWord {
  readonly kind: 'axis';
  /** As the heading names it; null where it gives no unit, `unknown` where it gives another one. */
  readonly unit: AxisUnit | 'unknown' | null;
}

const axisNames = [
  'wavelength',
  'wave length',
  'wellenlänge',
  'wellenlaenge',
  'wellenlange',
  "longueur d'onde",
  'longueur d’onde',
  'longitud de onda',
  "lunghezza d'onda",
  'lunghezza d’onda',
  'comprimento de onda',
  '波長',
  '波长',
  'lambda',
  'λ',
  'wl',
  'wavelen',
  'nanometers',
  'nanometer',
  'nanometres',
  'x',
];

const otherAxes: readonly (readonly [string, AxisUnit])[] = [
  ['wavenumber', 'cm-1'],
  ['wave number', 'cm-1'],
  ['wellenzahl', 'cm-1'],
  ["nombre d'onde", 'cm-1'],
  ['número de onda', 'cm-1'],
  ["numero d'onda", 'cm-1'],
  ['波数', 'cm-1'],
  ['photon energy', 'eV'],
  ['photonenenergie', 'eV'],
];

const unitSpellings: ReadonlyMap<string, AxisUnit> = new Map([
  ['nm', 'nm'],
  ['nanometer', 'nm'],
  ['nanometers', 'nm'],
  ['nanometres', 'nm'],
  ['纳米', 'nm'],
  ['μm', 'µm'],
  ['um', 'µm'],
  ['micron', 'µm'],
  ['microns', 'µm'],
  ['micrometer', 'µm'],
  ['micrometers', 'µm'],
  ['mikrometer', 'µm'],
  ['å', 'Å'],
  ['angstrom', 'Å'],
  ['cm-1', 'cm-1'],
  ['1/cm', 'cm-1'],
  ['cm^-1', 'cm-1'],
  ['cm**-1', 'cm-1'],
  ['ev', 'eV'],
]);

const otherUnits = new Set([
  'm',
  'mm',
  'cm',
  'thz',
  'phz',
  'hz',
  'ghz',
  'kev',
  'mev',
  'j',
  'pm',
  'px',
  'pixel',
  'pixels',
  'kk',
]);

const indexNames = new Set([
  'no',
  'nr',
  '#',
  'index',
  'idx',
  'point',
  'points',
  'pt',
  'punkt',
  'n°',
  'nº',
  'num',
  'number',
  'nummer',
  'row',
  'zeile',
  'n',
  '序号',
  '番号',
]);

const asideNames =
  /^(?:time|zeit|elapsed|temps|tiempo|tempo|date|datum|clock|temp|temperature|temperatur|température|temperatura|时间|時間|温度)(?![\p{L}\p{N}])/u;
const asideUnits = /^[tθϑ]\s?[/([]\s?(?:s|sec|min|h|°c|°f|k|c|ms)\s?[)\]]?$/;

/** Lower case, compatibility forms unified ("⁻¹" -> "-1", "µ" -> "μ"), one sort of minus. */
export function plainHeading(heading: string): string {
  return heading
    .normalize('NFKC')
    .replace(/[\u2212\u2013\u2010]/g, '-')
    .toLowerCase()
    .trim();
}

/** Unit named anywhere in a heading as a word of its own. */
function unitIn(plain: string): AxisUnit | 'unknown' | null {
  if (plain.includes('cm-1') || plain.includes('1/cm') || /cm\^\(?-1/.test(plain)) return 'cm-1';
  const words = plain.split(/[\s()[\]{},;:./]+/);
  for (const word of words) {
    const unit = unitSpellings.get(word);
    if (unit) return unit;
  }
  return words.slice(1).some((word) => otherUnits.has(word)) ? 'unknown' : null;
}

const startsAsWord = (plain: string, name: string) =>
  plain.startsWith(name) && !/^[\p{L}\p{N}]/u.test(plain.slice(name.length, name.length + 2));

/** The abscissa that a heading names, or null. A bare unit counts; "20 nm particles" does not. */
export function axisNamed(heading: string): AxisWord | null {
  const plain = plainHeading(heading).slice(0, 200);
  if (plain === '') return null;
  const bare = unitSpellings.get(plain.replace(/^[\s([]+|[\s)\]]+$/g, ''));
  if (bare) return { kind: 'axis', unit: bare };
  const other = otherAxes.find(([name]) => startsAsWord(plain, name));
  if (other || (/^energ(?:y|ie)/.test(plain) && unitIn(plain) === 'eV')) {
    const unit = unitIn(plain);
    return { kind: 'axis', unit: unit ?? other?.[1] ?? 'unknown' };
  }
  if (!axisNames.some((name) => startsAsWord(plain, name))) return null;
  const meaning = otherAxes.find(([name]) => plain.includes(name))?.[1];
  return { kind: 'axis', unit: unitIn(plain) ?? meaning ?? null };
}

/** A column that stands beside the traces: a running number, a time, a temperature. */
export function asideNamed(heading: string): 'index' | 'time-or-temperature' | null {
  const plain = plainHeading(heading).slice(0, 200);
  if (indexNames.has(plain.replace(/[.:]+$/, ''))) return 'index';
  return asideNames.test(plain) || asideUnits.test(plain) ? 'time-or-temperature' : null;
}

/** Whether header lines speak of wavenumbers, energies or micrometres and nowhere of nm. */
export function otherAxisIn(lines: readonly string[]): string | null {
  let found: string | null = null;
  for (const line of lines) {
    const plain = plainHeading(line.slice(0, 1000));
    if (/(?<![\p{L}])nm(?![\p{L}])|nanomet|wavelength|wellenlänge/u.test(plain)) return null;
    if (/mol|m-1 ?cm/.test(plain)) continue;
    if (
      /cm\^?-1|1\/cm|wavenumber|wellenzahl|wave number|micromet|(?<![\p{L}])ev(?![\p{L}])/u.test(
        plain,
      )
    ) {
      found ??= line.trim();
    }
  }
  return found;
}
