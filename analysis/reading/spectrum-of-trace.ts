import { Refusal } from '../refusal.ts';
import type { RawTrace } from './layouts/layout.ts';
import type { Quantity, ReadSpectrum } from './reading.ts';
import { HIGHEST_ABSORBANCE, settleQuantity } from './settle-quantity.ts';
import { HIGHEST_NM, isPlausibleNm, LOWEST_NM, toNm } from './wavelength.ts';

/**
 * A trace as the file has it to a spectrum: wavelengths ascending in nm, transmittance to
 * absorbance. Throws `Refusal` where order, range, number of points or quantity do not allow it.
 */
export function spectrumOfTrace(trace: RawTrace, unnamedIs?: Quantity): ReadSpectrum {
  if (trace.x.length < 2) throw tooFewPoints(trace);
  const { nm, isReversed } = axisOf(trace);
  if (trace.y.every(Number.isNaN)) throw noValues(trace);
  const { quantity, assumptions } = settleQuantity(trace, unnamedIs);
  const converted = convert(trace.y, quantity);
  if (isReversed) converted.values.reverse();
  const values =
    quantity === 'molar-absorptivity'
      ? { molarAbsorptivity: converted.values }
      : { absorbance: converted.values };
  return {
    name: trace.name,
    trace: trace.position,
    xUnit: trace.unit,
    quantity,
    points: nm.length,
    wavelengthNm: nm,
    ...values,
    assumptions: [
      ...trace.assumptions,
      ...assumptions,
      ...converted.assumptions,
      ...unitNote(trace),
    ],
  };
}

interface AxisInNm {
  readonly unit: RawTrace['unit'];
  /** Ascending. */
  readonly nm: Float64Array;
  readonly isReversed: boolean;
}

/** Traces that stand on one axis share its wavelengths. */
const axes = new WeakMap<Float64Array, AxisInNm>();

function axisOf(trace: RawTrace): AxisInNm {
  const { x, lines, unit } = trace;
  const before = axes.get(x);
  if (before?.unit === unit) return before;
  const isAscending = checkOrder(x, lines, unit);
  const nm = x.map((value) => toNm(value, unit));
  checkRange(nm, trace);
  // Wavenumbers and energies run against wavelengths.
  const isReversed = isAscending === (unit === 'cm-1' || unit === 'eV');
  if (isReversed) nm.reverse();
  const axis = { unit, nm, isReversed };
  axes.set(x, axis);
  return axis;
}

function unitNote({ unit }: RawTrace): string[] {
  if (unit === 'nm') return [];
  const air =
    unit === 'cm-1' || unit === 'eV' ? ', without correction for the refraction of air' : '';
  return [`The axis is in ${unit}; it was converted to nm${air}.`];
}

/** True where x ascends, false where it descends; throws where it does neither, strictly. */
function checkOrder(x: Float64Array, lines: Uint32Array, unit: string): boolean {
  let upward = 0;
  for (let i = 1; i < x.length; i += 1) upward += Math.sign((x[i] ?? 0) - (x[i - 1] ?? 0));
  const direction = upward >= 0 ? 1 : -1;
  for (let i = 1; i < x.length; i += 1) {
    const here = x[i] ?? 0;
    const before = x[i - 1] ?? 0;
    if ((here - before) * direction > 0) continue;
    const line = lines[i] ?? 0;
    if (here === before) {
      throw new Refusal({
        code: 'repeated-wavelength',
        message: `${here} ${unit} stands here and in line ${lines[i - 1]}.`,
        where: { line },
        mend: 'Export each spectrum once, or remove the repeated lines.',
      });
    }
    throw new Refusal({
      code: 'wavelengths-not-in-order',
      message: `The wavelengths do not run one way: ${here} ${unit} follows ${before} ${unit}.`,
      where: { line },
      mend: 'Export one spectrum a file, with its wavelengths in order.',
    });
  }
  return direction === 1;
}

function checkRange(nm: Float64Array, { lines }: RawTrace): void {
  const index = nm.findIndex((value) => !isPlausibleNm(value));
  if (index === -1) return;
  throw new Refusal({
    code: 'wavelength-out-of-range',
    message: `A wavelength of ${Number((nm[index] ?? 0).toPrecision(6))} nm is outside the range of photometers (${LOWEST_NM} to ${HIGHEST_NM} nm).`,
    where: { line: lines[index] ?? 1 },
    mend: 'Look whether the first column holds wavelengths, and name its unit (nm, µm, cm-1, eV) in the heading.',
  });
}

function tooFewPoints({ lines }: RawTrace): Refusal {
  return new Refusal({
    code: 'too-few-points',
    message: 'A spectrum needs at least 2 points; only 1 was found.',
    where: { line: lines[0] ?? 1 },
    mend: 'Export the whole spectrum, one wavelength a line.',
  });
}

function noValues({ what }: RawTrace): Refusal {
  return new Refusal({
    code: 'no-values',
    message: 'The column holds no number: every point is missing.',
    where: { what },
    mend: 'Export the trace again, or leave it out.',
  });
}

/** Absorbance from transmittance, `A = -log10 T`; what has no logarithm becomes a missing point. */
function convert(y: Float64Array, quantity: Quantity) {
  switch (quantity) {
    case 'molar-absorptivity':
      return { values: Float64Array.from(y), assumptions: [] };
    case 'absorbance':
      return withoutMarks(y);
    case 'transmittance':
      return fromTransmittance(y, 1);
    case 'percent-transmittance':
      return fromTransmittance(y, 100);
  }
}

function fromTransmittance(y: Float64Array, whole: 1 | 100) {
  // Subtracting from 0 keeps T = 1 from giving a negative zero.
  const values = y.map((value) => (value > 0 ? 0 - Math.log10(value / whole) : Number.NaN));
  const dark = y.filter((value) => value <= 0).length;
  const points = dark === 1 ? '1 point has' : `${dark} points have`;
  const assumptions =
    dark > 0
      ? [`${points} a transmittance of zero or less, which has no absorbance; taken as missing.`]
      : [];
  return { values, assumptions };
}

function withoutMarks(y: Float64Array) {
  const values = y.slice();
  const marks: number[] = [];
  for (let i = 0; i < values.length; i += 1) {
    if (!(Math.abs(values[i] ?? 0) > HIGHEST_ABSORBANCE)) continue;
    marks.push(values[i] ?? 0);
    values[i] = Number.NaN;
  }
  const points = marks.length === 1 ? '1 point has' : `${marks.length} points have`;
  const assumptions =
    marks.length > 0
      ? [
          `${points} an absorbance beyond ${HIGHEST_ABSORBANCE} (${marks[0]}), which no photometer measures; taken as over range.`,
        ]
      : [];
  return { values, assumptions };
}
