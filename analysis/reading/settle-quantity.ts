import { Refusal } from '../refusal.ts';
import type { RawTrace } from './layouts/layout.ts';
import type { Quantity } from './reading.ts';

export interface SettledQuantity {
  readonly quantity: Quantity;
  readonly assumptions: readonly string[];
}

/** No photometer measures beyond; what is printed above is a mark or another quantity. */
export const HIGHEST_ABSORBANCE = 20;
/** Highest value that is taken for an absorbance where nothing names the quantity. */
const HIGHEST_UNNAMED = 6;
/** A fraction of light above it is no noise around 1. */
const HIGHEST_FRACTION = 1.5;
/** Below it, "transmittance" without a unit may still be a fraction that went wrong. */
const LOWEST_CLEAR_PERCENT = 10;

const nameIt =
  'Name the quantity in the heading of the column (absorbance, %T, T or molar absorptivity) and load the file again.';

/**
 * What the values of a trace are, by name where the file gives one and checked against their size.
 * Throws `Refusal` (`other-quantity`, `unnamed-quantity`, `ambiguous-quantity`,
 * `implausible-values`, `ambiguous-number`).
 */
export function settleQuantity(trace: RawTrace, unnamedIs?: Quantity): SettledQuantity {
  const { quantity: word } = trace;
  if (word?.kind === 'foreign') {
    throw refusal(
      trace,
      'other-quantity',
      `This column holds a quantity that ${word.why}.`,
      'Export absorbance, %T, T or molar absorptivity in L mol⁻¹ cm⁻¹.',
    );
  }
  const size = sizeOf(trace.y);
  const settled = word ? bySize(trace, word.quantity, size) : unnamed(trace, size, unnamedIs);
  const assumptions = [
    ...settled.assumptions,
    ...decimalNote(trace, settled.quantity, word !== null),
  ];
  if (word?.unit === 'left-open') {
    assumptions.push(
      'The heading gives no unit of the molar absorptivity; it was read as L mol⁻¹ cm⁻¹.',
    );
  }
  return { quantity: settled.quantity, assumptions };
}

interface Size {
  readonly lowest: number;
  readonly highest: number;
  /** More than half of the values are beyond what a photometer measures as absorbance. */
  readonly isMostlyBeyond: boolean;
}

function sizeOf(y: Float64Array): Size {
  let lowest = Number.POSITIVE_INFINITY;
  let highest = Number.NEGATIVE_INFINITY;
  let solid = 0;
  let beyond = 0;
  for (const value of y) {
    if (Number.isNaN(value)) continue;
    solid += 1;
    if (value < lowest) lowest = value;
    if (value > highest) highest = value;
    if (Math.abs(value) > HIGHEST_ABSORBANCE) beyond += 1;
  }
  return { lowest, highest, isMostlyBeyond: beyond > solid / 2 };
}

function bySize(trace: RawTrace, quantity: Quantity, size: Size): SettledQuantity {
  const plain = { quantity, assumptions: [] };
  if (quantity === 'absorbance' && size.isMostlyBeyond) {
    throw refusal(
      trace,
      'implausible-values',
      `The heading says absorbance, but most values are above ${HIGHEST_ABSORBANCE} (up to ${size.highest}).`,
      nameIt,
    );
  }
  if (quantity === 'transmittance' && size.highest > HIGHEST_FRACTION) {
    if (size.highest < LOWEST_CLEAR_PERCENT) {
      throw refusal(
        trace,
        'ambiguous-quantity',
        `The heading says transmittance; with values up to ${size.highest} it may be a fraction or per cent.`,
        'Write %T or T in the heading of the column and load the file again.',
      );
    }
    const assumption = `The heading says transmittance without %, but values go up to ${size.highest}; they were read as per cent.`;
    return { quantity: 'percent-transmittance', assumptions: [assumption] };
  }
  if (quantity === 'percent-transmittance' && size.highest <= HIGHEST_FRACTION) {
    const assumption = `No value is above ${HIGHEST_FRACTION} %T, which is unusual; the heading was trusted.`;
    return { quantity, assumptions: [assumption] };
  }
  return plain;
}

function unnamed(trace: RawTrace, size: Size, unnamedIs: Quantity | undefined): SettledQuantity {
  if (unnamedIs !== undefined) {
    const said = `Nothing in the file names the quantity; it was read as ${unnamedIs.replaceAll('-', ' ')}, as the sheet says.`;
    return { quantity: unnamedIs, assumptions: [said] };
  }
  if (size.highest > HIGHEST_UNNAMED || size.lowest < -HIGHEST_UNNAMED) {
    throw refusal(
      trace,
      'unnamed-quantity',
      `Nothing names the quantity, and values from ${size.lowest} to ${size.highest} are no plain absorbance (per cent transmittance, perhaps).`,
      nameIt,
    );
  }
  const assumption = `Nothing names the quantity; values from ${size.lowest} to ${size.highest} were read as absorbance.`;
  return { quantity: 'absorbance', assumptions: [assumption] };
}

/** "1,234" throughout: an absorbance or transmittance of over a thousand cannot be, an absorptivity can. */
function decimalNote(trace: RawTrace, quantity: Quantity, isNamed: boolean): string[] {
  if (trace.decimal === 'settled') return [];
  const sign = trace.decimal === 'open-comma' ? 'comma' : 'point';
  const isOpen = quantity === 'molar-absorptivity' || (!isNamed && sign === 'comma');
  if (isOpen) {
    throw refusal(
      trace,
      'ambiguous-number',
      `All numbers look like 1${sign === 'comma' ? ',' : '.'}234, which may be a decimal number or a whole one with its thousands marked off.`,
      'Export with a decimal point, without thousands marks, or with more decimals.',
    );
  }
  if (sign === 'point') return [];
  return [
    'All numbers look like 1,234; the comma was read as the decimal sign, as thousands cannot be meant for this quantity.',
  ];
}

function refusal(trace: RawTrace, code: string, message: string, mend: string): Refusal {
  return new Refusal({ code, message, where: { what: trace.what }, mend });
}
