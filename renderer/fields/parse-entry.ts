/** What a user types into a field, as a number in the sheet's unit, or why it cannot be one. */
export type Entry =
  | { readonly ok: true; readonly value: number | undefined }
  | {
      readonly ok: false;
      readonly message: string;
      /** True for a number whose comma may stand for thousands as well as for decimals. */
      readonly isTwofold?: boolean;
    };

const nothing: Entry = { ok: true, value: undefined };

/** "0,4", "1.5e-3", "2 400": a plain number with a decimal point or comma; empty is nothing. */
export function parseNumber(text: string): Entry {
  const trimmed = text
    .trim()
    .replace('\u2212', '-')
    .replace(/[\s\u2009\u00a0]/g, '');
  if (trimmed === '') return nothing;
  const [, whole, thousandths] = /^[+-]?([1-9]\d{0,2}),(\d{3})$/.exec(trimmed) ?? [];
  if (whole !== undefined && thousandths !== undefined) {
    // a factor of 2,000 read as 2 would be wrong a thousandfold and look right
    return {
      ok: false,
      isTwofold: true,
      message: `"${text.trim()}" can be read in two ways; type ${whole}${thousandths} or ${whole}.${thousandths}.`,
    };
  }
  const pointed = /^[^.]*,[^.,]*$/.test(trimmed) ? trimmed.replace(',', '.') : trimmed;
  const value = /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i.test(pointed)
    ? Number(pointed)
    : Number.NaN;
  return Number.isFinite(value)
    ? { ok: true, value }
    : { ok: false, message: `"${text.trim()}" is not a number.` };
}

export function parsePositive(text: string): Entry {
  const entry = parseNumber(text);
  if (!entry.ok || entry.value === undefined || entry.value > 0) return entry;
  return { ok: false, message: 'It must be greater than 0.' };
}

export function parseNonNegative(text: string): Entry {
  const entry = parseNumber(text);
  if (!entry.ok || entry.value === undefined || entry.value >= 0) return entry;
  return { ok: false, message: 'It must not be negative.' };
}

/** A length, "1", "0,5 cm" or "2 mm", in cm. */
export function parsePathLength(text: string): Entry {
  const match = /^(.*?)\s*(cm|mm)?\s*$/i.exec(text);
  const entry = parsePositive(match?.[1] ?? '');
  if (!entry.ok || entry.value === undefined) return entry;
  const isMm = match?.[2]?.toLowerCase() === 'mm';
  return { ok: true, value: isMm ? Number((entry.value / 10).toPrecision(15)) : entry.value };
}

/** A percentage, "0.4" or "0.4 %", as a fraction. */
export function parsePercent(text: string): Entry {
  const entry = parseNonNegative(text.replace(/%\s*$/, ''));
  if (!entry.ok || entry.value === undefined) return entry;
  return { ok: true, value: Number((entry.value / 100).toPrecision(15)) };
}

const concentrationUnits: Readonly<Record<string, number>> = {
  '': 1e-6,
  M: 1,
  'mol/L': 1,
  'mol/l': 1,
  mM: 1e-3,
  'mmol/L': 1e-3,
  'mmol/l': 1e-3,
  µM: 1e-6,
  μM: 1e-6,
  uM: 1e-6,
  'µmol/L': 1e-6,
  'µmol/l': 1e-6,
  'μmol/L': 1e-6,
  'umol/L': 1e-6,
  'umol/l': 1e-6,
  nM: 1e-9,
  'nmol/L': 1e-9,
  'nmol/l': 1e-9,
};

/** "25 µM", "2.5e-5 M", "0,025 mmol/L"; a bare number is in µmol/L, as the column says. In mol/L. */
export function parseConcentration(text: string): Entry {
  const match = /^\s*([^a-zµμ]*?(?:\de[+-]?\d+)?)\s*([a-zµμ]+(?:\/l)?)?\s*$/i.exec(text);
  const factor = concentrationUnits[match?.[2] ?? ''];
  if (!match || factor === undefined) {
    return {
      ok: false,
      message: `"${text.trim()}" is not a concentration; try "25 µM" or "2.5e-5 M".`,
    };
  }
  const entry = parsePositive(match[1] ?? '');
  if (!entry.ok || entry.value === undefined) return entry;
  // digits as typed: 25 µM is 0.000025, not 0.000024999999999999998
  return { ok: true, value: Number((entry.value * factor).toPrecision(15)) };
}

/** A number for a field: as many digits as it has, up to 12, without an exponent where it can be. */
export function shown(value: number | undefined, factor = 1): string {
  if (value === undefined) return '';
  const scaled = Number((value * factor).toPrecision(12));
  return String(scaled);
}
