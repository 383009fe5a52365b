import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { concentrationUnit } from '../../../analysis/report/concentration-unit.ts';
import {
  figuresText,
  givenText,
  numberText,
  quantifiedText,
  type ReadingUnit,
  readingUnits,
  roundedTo,
} from '../../../analysis/report/numbers.ts';
import type { Quantified } from '../../../analysis/split/results.ts';

type End = number | null;
const quantity = (value: End, u: End, low: End, high: End): Quantified => ({
  value,
  standardUncertainty: u,
  interval95: [low, high],
});
const plain = (value: End, u: End, low: End, high: End) =>
  quantifiedText(quantity(value, u, low, high), { unit: 'plain' });

/** Reads a number back as a person would: thin spaces, minus sign and power of ten. */
function readBack(text: string): { readonly value: number; readonly lastDigit: number } {
  const ordinary = text.replaceAll('\u2009', '').replace('\u2212', '-');
  const [mantissa = '', power = ''] = ordinary.split(' × 10');
  const exponent = power.replace(/[⁻⁰¹²³⁴⁵⁶⁷⁸⁹]/g, (sign) =>
    sign === '⁻' ? '-' : String('⁰¹²³⁴⁵⁶⁷⁸⁹'.indexOf(sign)),
  );
  const decimals = mantissa.split('.')[1]?.length ?? 0;
  return {
    value: Number(`${mantissa}e${exponent || '0'}`),
    lastDigit: Number(`1e${Number(exponent || '0') - decimals}`),
  };
}

const sizes = fc
  .tuple(fc.double({ min: 1, max: 10, noNaN: true }), fc.integer({ min: -30, max: 30 }))
  .map(([mantissa, exponent]) => mantissa * 10 ** exponent);
const signs = fc.constantFrom(1, -1);
const ordinary =
  /^(\u2212?\d{1,4}|\u2212?\d{1,3}(\u2009\d{3})+|\u2212?0)(\.\d+)?( × 10⁻?[⁰¹²³⁴⁵⁶⁷⁸⁹]+)?$/;

describe('a number rounded to its uncertainty', () => {
  it.each([
    [2.376_4, 0.0187, '2.376'],
    [2.376_4, 0.187, '2.38'],
    [2.376_4, 1.87, '2.4'],
    [0.1, 0.099_6, '0.10'],
    [56_789, 1234, '56\u2009800'],
    [9999, 12, '9999'],
    [10_000, 12, '10\u2009000'],
    [-0.001, 0.5, '0.00'],
    [-2.5, 0.11, '\u22122.50'],
    [1.234e-5, 1e-6, '1.23 × 10⁻⁵'],
    [1e12, 1e10, '1.000 × 10¹²'],
    [0.5, 0, '0.5'],
    [Number.NaN, 0.1, '—'],
    [Number.POSITIVE_INFINITY, 0.1, '—'],
    [1, Number.NaN, '1'],
  ])('%d with u = %d reads %s', (value, u, text) => {
    expect(roundedTo(value, u)).toBe(text);
  });

  it('never moves the value by more than half of the last printed digit', () => {
    fc.assert(
      fc.property(sizes, sizes, signs, (size, u, sign) => {
        const value = sign * size;
        const { value: back, lastDigit } = readBack(roundedTo(value, u));
        // beside the half digit, the double nearest to a decimal number
        const slack = 1e-12 * Math.abs(value);
        // a value far below its uncertainty reads 0, whose last digit is that of u
        const digit = back === 0 ? Math.max(lastDigit, u) : lastDigit;
        // tens and hundreds are printed with zeros: their last digit is at most u / 10
        expect(Math.abs(back - value)).toBeLessThanOrEqual(Math.max(digit, u / 10) / 2 + slack);
      }),
    );
  });

  it('keeps two figures of the uncertainty', () => {
    fc.assert(
      fc.property(sizes, sizes, (value, u) => {
        const text = quantifiedText(quantity(value, u, value - 2 * u, value + 2 * u), {
          unit: 'plain',
        });
        const back = readBack(text.uncertainty).value;
        // half of the second figure of u is at most 5 % of u (of 1.0)
        expect(Math.abs(back - u)).toBeLessThanOrEqual(0.05 * u * (1 + 1e-12));
      }),
    );
  });

  it('is written without exponent letters, hyphens, NaN or minus zero', () => {
    fc.assert(
      fc.property(fc.double(), fc.double(), (value, u) => {
        for (const text of [roundedTo(value, u), figuresText(value), givenText(value)]) {
          if (text !== '—') expect(text).toMatch(ordinary);
          expect(text).not.toMatch(/^\u2212[0.\u2009]+$/);
        }
      }),
    );
  });
});

describe('a quantity for people', () => {
  it.each([
    [quantity(2.3761, 0.0193, 2.3386, 2.4144), 'plain', '2.376', '2.339 to 2.414'],
    [quantity(0.7038, 0.0017, 0.70047, 0.70712), 'percent', '70.38', '70.05 to 70.71'],
    [quantity(2.2787e-6, 2.3e-8, 2.234e-6, 2.3242e-6), 'micromolar', '2.279', '2.234 to 2.324'],
    [quantity(0, 0.0011, 0, 0.0021), 'percent', '0.00', 'below 0.21'],
    [quantity(null, null, 12.3, null), 'plain', '—', 'above 12.3'],
    [quantity(-3, 12, -27, 21), 'plain', '\u22123', '\u221227 to 21'],
  ] as const)('%j in %s', (given, unit, value, interval) => {
    const text = quantifiedText(given, { unit });
    expect([text.value, text.interval]).toEqual([value, interval]);
  });

  it('says in words that an end is not bounded', () => {
    expect(plain(300, 40, 250, null)).toMatchObject({
      low: '250',
      high: 'no upper bound',
      interval: 'above 250',
    });
    expect(plain(1, 0.1, null, 1.2)).toMatchObject({
      low: 'no lower bound',
      interval: 'below 1.20',
    });
    expect(plain(null, null, null, null)).toMatchObject({ value: '—', interval: 'not bounded' });
  });

  it('is an upper limit where its interval begins at 0', () => {
    expect(plain(0, 0.0021, 0, 0.0041).interval).toBe('below 0.0041');
  });

  it('keeps two figures of an upper limit that is smaller than u', () => {
    expect(plain(0, 0.5, 0, 0.034).interval).toBe('below 0.034');
  });

  it('takes the decimals from the known side where u is not known', () => {
    expect(plain(12.3456, null, 8.1234, null)).toMatchObject({
      value: '12.3',
      interval: 'above 8.1',
    });
  });

  it('writes an exact 0 and an exact 1 as they are', () => {
    expect(quantifiedText(quantity(1, 0, 1, 1), { unit: 'percent' })).toMatchObject({
      value: '100',
      uncertainty: '0',
      interval: '100 to 100',
    });
    expect(plain(0, 0, 0, 0).value).toBe('0');
  });

  it('has the same power of ten in all of its numbers', () => {
    const { value, uncertainty, interval } = plain(2.31e-9, 4e-11, 2.2e-9, 2.4e-9);
    expect([value, uncertainty, interval]).toEqual([
      '2.310 × 10⁻⁹',
      '0.040 × 10⁻⁹',
      '2.200 × 10⁻⁹ to 2.400 × 10⁻⁹',
    ]);
  });

  it('holds in every unit what the value says', () => {
    fc.assert(
      fc.property(
        sizes,
        fc.constantFrom<ReadingUnit>('percent', 'micromolar', 'millimolar', 'milliabsorbance'),
        (value, unit) => {
          const text = quantifiedText(
            quantity(value, value / 1e4, value * 0.9998, value * 1.0002),
            { unit },
          );
          const { factor, name } = readingUnits[unit];
          expect(text.unit).toBe(name);
          // five figures are printed at least
          expect(readBack(text.value).value / (value * factor)).toBeCloseTo(1, 4);
        },
      ),
    );
  });
});

describe('numbers that are not rounded to an uncertainty', () => {
  it('keep their figures when rounding carries', () => {
    expect([figuresText(9.96), figuresText(9.96e-6), figuresText(0.0999)]).toEqual([
      '10',
      '1.0 × 10⁻⁵',
      '0.10',
    ]);
  });

  it('are written as given', () => {
    expect([0.1 + 0.2, 2400, 158.54, 1e-7, 123_456.75, -0].map(givenText)).toEqual([
      '0.3',
      '2400',
      '158.54',
      '1 × 10⁻⁷',
      '123\u2009456.75',
      '0',
    ]);
  });

  it('survive what toFixed would write with an exponent letter', () => {
    expect(numberText(1e21, 2)).toBe('1.00 × 10²¹');
  });
});

describe('the unit of a column of concentrations', () => {
  it.each([
    [[2e-5, 1e-6, 0], 'micromolar'],
    [[0.095, 0.003], 'millimolar'],
    [[1.5], 'molar'],
    [[4e-9, null], 'nanomolar'],
    [[0, null, Number.NaN], 'micromolar'],
    [[], 'micromolar'],
  ] as const)('for %j is %s', (values, unit) => {
    expect(concentrationUnit(values)).toBe(unit);
  });
});
