import type { Quantified } from '../split/results.ts';

/** Units in which people read results. The value itself is a fraction, a ratio, or mol/L. */
export type ReadingUnit = 'percent' | 'plain' | 'micromolar' | 'millimolar';

export interface QuantifiedText {
  /** "2.31"; an em dash where there is no value. */
  readonly value: string;
  readonly uncertainty: string;
  readonly low: string;
  readonly high: string;
  /** "2.24 to 2.38", "below 0.4", "above 250", "not bounded". */
  readonly interval: string;
  /** "%", "", "µmol/L", "mmol/L". */
  readonly unit: string;
}

const factors: Record<ReadingUnit, number> = {
  percent: 100,
  plain: 1,
  micromolar: 1e6,
  millimolar: 1e3,
};
const names: Record<ReadingUnit, string> = {
  percent: '%',
  plain: '',
  micromolar: 'µmol/L',
  millimolar: 'mmol/L',
};
const none = '—';
const mostDecimals = 12;

/**
 * A quantity as text, rounded to its uncertainty: two significant figures of u set the decimals of
 * the value and of its interval (GUM, 7.2.6). Ends are never rounded to where they would meet the
 * other side of 0: an upper limit is rounded to two figures of itself.
 */
export function quantifiedText(
  quantity: Quantified,
  { unit }: { unit: ReadingUnit },
): QuantifiedText {
  const factor = factors[unit];
  const scaled = (value: number | null): number | null => (value === null ? null : value * factor);
  const value = scaled(quantity.value);
  const u = scaled(quantity.standardUncertainty);
  const [low, high] = [scaled(quantity.interval95[0]), scaled(quantity.interval95[1])];
  const decimals = decimalsFor(u, value, low, high);
  const text = (number: number | null): string =>
    number === null ? none : numberText(number, decimals);
  return {
    value: text(value),
    uncertainty: text(u),
    low: text(low),
    high: text(high),
    interval: intervalText(low, high, decimals),
    unit: names[unit],
  };
}

/** Decimals at which a standard uncertainty keeps two significant figures. */
export function decimalsOf(uncertainty: number): number {
  if (!(uncertainty > 0) || !Number.isFinite(uncertainty)) return 3;
  const first = Math.floor(Math.log10(uncertainty));
  // 0.0996 rounds up to 0.10: one decimal fewer keeps two figures
  const carried = Number((uncertainty / 10 ** first).toFixed(1)) >= 10 ? 1 : 0;
  return Math.min(Math.max(1 - first - carried, 0), mostDecimals);
}

/** A number with a real minus sign, thin spaces from 10 000 up, and no "-0". */
export function numberText(value: number, decimals: number): string {
  if (!Number.isFinite(value)) return none;
  const [whole = '0', part] = Math.abs(value).toFixed(decimals).split('.');
  const grouped = whole.length > 4 ? whole.replace(/\B(?=(\d{3})+$)/g, '\u2009') : whole;
  const digits = part === undefined ? grouped : `${grouped}.${part}`;
  return value < 0 && /[1-9]/.test(digits) ? `\u2212${digits}` : digits;
}

/** Two significant figures or as many as asked, never as 1e-5. */
export function figuresText(value: number, figures = 2): string {
  if (value === 0 || !Number.isFinite(value)) return value === 0 ? '0' : none;
  const first = Math.floor(Math.log10(Math.abs(value)));
  if (first < -4 || first > 5) {
    const mantissa = value / 10 ** first;
    return `${numberText(mantissa, figures - 1)} × 10${superscript(first)}`;
  }
  return numberText(value, Math.max(figures - 1 - first, 0));
}

function superscript(exponent: number): string {
  const digits = '⁰¹²³⁴⁵⁶⁷⁸⁹';
  return String(exponent).replace(/./g, (sign) =>
    sign === '-' ? '⁻' : (digits[Number(sign)] ?? ''),
  );
}

function decimalsFor(
  u: number | null,
  value: number | null,
  low: number | null,
  high: number | null,
): number {
  if (u !== null && u > 0) {
    // an upper limit that is smaller than u (near zero) still keeps two figures
    const smallest =
      high !== null && high > 0 && value !== null && value < u ? Math.min(u, high) : u;
    return decimalsOf(smallest);
  }
  const width = low !== null && high !== null ? high - low : 0;
  return width > 0 ? decimalsOf(width / 4) : 3;
}

function intervalText(low: number | null, high: number | null, decimals: number): string {
  if (low === null && high === null) return 'not bounded';
  if (low === null) return `below ${numberText(high ?? 0, decimals)}`;
  if (high === null) return `above ${numberText(low, decimals)}`;
  if (low === 0 && high > 0) return `below ${numberText(high, decimals)}`;
  return `${numberText(low, decimals)} to ${numberText(high, decimals)}`;
}
