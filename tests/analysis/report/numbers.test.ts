import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  decimalsOf,
  figuresText,
  numberText,
  quantifiedText,
} from '../../../analysis/report/numbers.ts';

const q = (value: number | null, u: number | null, low: number | null, high: number | null) => ({
  value,
  standardUncertainty: u,
  interval95: [low, high] as const,
});

describe('numbers for people', () => {
  it.each([
    [q(2.3761, 0.0193, 2.3386, 2.4144), 'plain', '2.376', '2.339 to 2.414'],
    [q(0.7038, 0.0017, 0.70047, 0.70712), 'percent', '70.38', '70.05 to 70.71'],
    [q(2.2787e-6, 2.3e-8, 2.234e-6, 2.3242e-6), 'micromolar', '2.279', '2.234 to 2.324'],
    [q(0, 0.0011, 0, 0.0021), 'percent', '0.00', 'below 0.21'],
    [q(null, null, 12.3, null), 'plain', '—', 'above 12.300'],
    [q(null, null, null, null), 'plain', '—', 'not bounded'],
    [q(-3, 12, -27, 21), 'plain', '\u22123', '\u221227 to 21'],
  ] as const)('%j in %s', (quantity, unit, value, interval) => {
    const text = quantifiedText(quantity, { unit });
    expect([text.value, text.interval]).toEqual([value, interval]);
  });

  it('two figures of the uncertainty set the decimals, a carry included', () => {
    expect(decimalsOf(0.0193)).toBe(3);
    expect(decimalsOf(0.0996)).toBe(2);
    expect(decimalsOf(0.00996)).toBe(3);
    expect(decimalsOf(12)).toBe(0);
    expect(decimalsOf(0.1)).toBe(2);
  });

  it('rounding never moves a number by more than half its last digit, nor prints an exponent or -0', () => {
    fc.assert(
      fc.property(fc.double({ min: -1e6, max: 1e6, noNaN: true }), fc.nat(8), (value, decimals) => {
        const text = numberText(value, decimals);
        expect(text).not.toMatch(/e|-|NaN/);
        expect(text).not.toMatch(/^\u22120(\.0*)?$/);
        const back = Number(text.replace('\u2212', '-').replaceAll('\u2009', ''));
        expect(Math.abs(back - value)).toBeLessThanOrEqual(0.5 * 10 ** -decimals + 1e-9);
      }),
    );
  });

  it('small figures are written with a power of ten in full', () => {
    expect(figuresText(0.0000123)).toBe('1.2 × 10⁻⁵');
    expect(figuresText(0.39)).toBe('0.39');
    expect(figuresText(0)).toBe('0');
  });
});
