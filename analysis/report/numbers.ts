import type { Quantified } from '../split/results.ts';

/** Units in which people read results. The value itself is a fraction, a ratio, mol/L, absorbance or nm. */
export type ReadingUnit =
  | 'percent'
  | 'plain'
  | 'nanomolar'
  | 'micromolar'
  | 'millimolar'
  | 'molar'
  | 'milliabsorbance';

export interface QuantifiedText {
  /** "2.31"; an em dash where there is no value. */
  readonly value: string;
  readonly uncertainty: string;
  /** The lower end; "no lower bound" where the data set none. */
  readonly low: string;
  readonly high: string;
  /** "2.24 to 2.38", "below 0.4", "above 250", "not bounded". */
  readonly interval: string;
  /** "%", "", "µmol/L", "mmol/L". */
  readonly unit: string;
}

/** Factor from the value itself to the unit, and the unit's name. */
export const readingUnits: Readonly<
  Record<ReadingUnit, { readonly factor: number; readonly name: string }>
> = {
  percent: { factor: 100, name: '%' },
  plain: { factor: 1, name: '' },
  nanomolar: { factor: 1e9, name: 'nmol/L' },
  micromolar: { factor: 1e6, name: 'µmol/L' },
  millimolar: { factor: 1e3, name: 'mmol/L' },
  molar: { factor: 1, name: 'mol/L' },
  milliabsorbance: { factor: 1e3, name: 'mAU' },
};
const none = '—';

/** How the numbers of one quantity are written: all with the same last digit and power of ten. */
interface Places {
  /** Decimals of the plain number; negative for tens, hundreds, … */
  readonly decimals: number;
  /** 0 for plain notation. */
  readonly power: number;
}

/**
 * A quantity as text, rounded to its uncertainty: two significant figures of u set the decimals of
 * the value and of its interval (GUM, 7.2.6); an upper limit smaller than u keeps two figures of
 * itself. An interval from 0 is written as an upper limit. What is very small or very large has a
 * power of ten, the same for all of its numbers.
 */
export function quantifiedText(
  quantity: Quantified,
  { unit }: { unit: ReadingUnit },
): QuantifiedText {
  const { factor, name } = readingUnits[unit];
  const scaled = (number: number | null): number | null =>
    number === null || !Number.isFinite(number) ? null : number * factor;
  const value = scaled(quantity.value);
  const u = scaled(quantity.standardUncertainty);
  const [low, high] = [scaled(quantity.interval95[0]), scaled(quantity.interval95[1])];
  const places = placesOf({ value, u, low, high });
  const text = (number: number | null, missing = none): string =>
    number === null ? missing : placed(number, places);
  return {
    value: text(value),
    uncertainty: u === 0 ? '0' : text(u),
    low: text(low, 'no lower bound'),
    high: text(high, 'no upper bound'),
    interval: intervalText(low, high, text),
    unit: name,
  };
}

/** A value rounded so that two significant figures of its standard uncertainty remain, as text. */
export function roundedTo(value: number, standardUncertainty: number): string {
  return quantifiedText({ value, standardUncertainty, interval95: [null, null] }, { unit: 'plain' })
    .value;
}

/** Decimals at which a number keeps so many significant figures; negative for tens, hundreds, … */
function decimalsOf(number: number, figures: number): number {
  const [, exponent = '0'] = Math.abs(number)
    .toExponential(figures - 1)
    .split('e');
  return figures - 1 - Number(exponent);
}

/**
 * A number with so many decimals (negative: rounded to tens, hundreds, …), a real minus sign, thin
 * spaces from 10 000 up, and no "-0". What is not a number is an em dash.
 */
export function numberText(value: number, decimals: number): string {
  if (!Number.isFinite(value)) return none;
  if (Math.abs(value) >= 1e15) return powerText(value, 3);
  const step = 10 ** Math.max(-decimals, 0);
  const rounded = Math.round(Math.abs(value) / step) * step;
  const [whole = '0', part] = (decimals < 0 ? rounded : Math.abs(value))
    .toFixed(Math.min(Math.max(decimals, 0), 100))
    .split('.');
  return signed(value, part === undefined ? grouped(whole) : `${grouped(whole)}.${part}`);
}

/**
 * At least so many significant figures (a whole number keeps all of its own), never as 1e-5 but
 * with a power of ten where it is below 10⁻⁴ or from 10⁶ up.
 */
export function figuresText(value: number, figures = 2): string {
  if (value === 0 || !Number.isFinite(value)) return value === 0 ? '0' : none;
  const decimals = decimalsOf(value, figures);
  const first = figures - 1 - decimals;
  if (first < -4 || first > 5) return powerText(value, figures);
  return numberText(value, Math.max(decimals, 0));
}

/** A number as the user gave it, to twelve figures and without trailing zeros. */
export function givenText(value: number): string {
  if (!Number.isFinite(value)) return none;
  const [mantissa = '', exponent = '0'] = Math.abs(value).toExponential(11).split('e');
  const digits = mantissa.replace(/\.?0+$/, '');
  const power = Number(exponent);
  if (value !== 0 && (power < -6 || power > 11)) {
    return signed(value, `${digits} × 10${superscript(power)}`);
  }
  const shown = digits.replace('.', '').length;
  return numberText(Number(value.toPrecision(12)), Math.max(shown - 1 - power, 0));
}

function powerText(value: number, figures: number): string {
  const [mantissa = '', exponent = '0'] = Math.abs(value)
    .toExponential(figures - 1)
    .split('e');
  return signed(value, `${mantissa} × 10${superscript(Number(exponent))}`);
}

function signed(value: number, digits: string): string {
  return value < 0 && /[1-9]/.test(digits) ? `\u2212${digits}` : digits;
}

function grouped(whole: string): string {
  return whole.length > 4 ? whole.replace(/\B(?=(\d{3})+$)/g, '\u2009') : whole;
}

function superscript(exponent: number): string {
  const digits = '⁰¹²³⁴⁵⁶⁷⁸⁹';
  return String(exponent).replace(/./g, (sign) =>
    sign === '-' ? '⁻' : (digits[Number(sign)] ?? ''),
  );
}

interface Numbers {
  readonly value: number | null;
  readonly u: number | null;
  readonly low: number | null;
  readonly high: number | null;
}

function placesOf(numbers: Numbers): Places {
  const { value, low, high } = numbers;
  const decimals = decimalsFor(numbers);
  const largest = Math.max(...[value, low, high].map((number) => Math.abs(number ?? 0)));
  const first = largest > 0 ? 1 - decimalsOf(largest, 2) : 0;
  // figures that would begin more than four places after the point, or be padded with zeros
  const isFar = decimals > 6 || first > 6;
  return { decimals, power: isFar ? Math.max(first, -decimals) : 0 };
}

function decimalsFor({ value, u, low, high }: Numbers): number {
  if (u !== null && u > 0) {
    // an upper limit that is smaller than u (near zero) still keeps two figures
    const isLimit = high !== null && high > 0 && value !== null && value < u;
    return decimalsOf(isLimit ? Math.min(u, high) : u, 2);
  }
  const width = widthOf(value, low, high);
  if (width > 0) return decimalsOf(width / 4, 2);
  // exact, or of unknown uncertainty: no more than is needed to write it, up to four figures
  const sizes = [value, low, high].filter((number) => number !== null && number !== 0);
  return sizes.length === 0 ? 0 : Math.max(...sizes.map((number) => shortDecimals(number ?? 0)));
}

/** Of the 95 % interval; twice the known side where the other is not bounded. */
function widthOf(value: number | null, low: number | null, high: number | null): number {
  if (low !== null && high !== null) return high - low;
  const end = low ?? high;
  return value === null || end === null ? 0 : 2 * Math.abs(value - end);
}

function shortDecimals(number: number): number {
  const most = Math.max(decimalsOf(number, 4), 0);
  if (most > 12) return most;
  const [, part = ''] = number.toFixed(most).replace(/0+$/, '').split('.');
  return part.length;
}

function placed(number: number, { decimals, power }: Places): string {
  if (power === 0) return numberText(number, decimals);
  // 10 ** 400 is not a number: divide in two steps
  const half = Math.trunc(power / 2);
  const mantissa = number / 10 ** half / 10 ** (power - half);
  const text = numberText(mantissa, decimals + power);
  return /[1-9]/.test(text) ? `${text} × 10${superscript(power)}` : '0';
}

function intervalText(
  low: number | null,
  high: number | null,
  text: (number: number) => string,
): string {
  if (low === null && high === null) return 'not bounded';
  if (low === null) return `below ${text(high ?? 0)}`;
  if (high === null) return `above ${text(low)}`;
  if (low === 0 && high > 0) return `below ${text(high)}`;
  return `${text(low)} to ${text(high)}`;
}
