import { describe, expect, it } from 'vitest';
import { parseDilution, shownDilution } from '../../../renderer/fields/parse-dilution.ts';
import {
  parseConcentration,
  parseNumber,
  parsePercent,
  parsePositive,
  shown,
} from '../../../renderer/fields/parse-entry.ts';
import { parseRanges, shownRanges } from '../../../renderer/sections/fit/parse-ranges.ts';

const good = (value: number | undefined) => ({ ok: true, value });

describe('what is typed into a field', () => {
  it.each([
    ['25', 25e-6],
    ['25 µM', 25e-6],
    ['25 μM', 25e-6],
    ['25uM', 25e-6],
    ['2.5e-5 M', 25e-6],
    ['2.5E-5 mol/L', 25e-6],
    ['0,025 mM', 25e-6],
    ['0.025 mmol/L', 25e-6],
    ['25000 nM', 25e-6],
    ['25 µmol/l', 25e-6],
  ])('a concentration: %s', (text, value) => {
    expect(parseConcentration(text)).toEqual(good(value));
  });

  it.each(['x', '25 g/L', '25 mm', '-3', '0', '1e', '2.5e-5 kM'])(
    'not a concentration: %s',
    (text) => {
      expect(parseConcentration(text).ok).toBe(false);
    },
  );

  it('an empty field takes the number out', () => {
    for (const parse of [parseNumber, parsePositive, parsePercent, parseConcentration])
      expect(parse('  ')).toEqual(good(undefined));
  });

  it('a decimal comma or point, a real minus, spaces between thousands', () => {
    expect(parseNumber('0,4')).toEqual(good(0.4));
    expect(parseNumber('\u22121.5')).toEqual(good(-1.5));
    expect(parseNumber('12 000')).toEqual(good(12000));
    expect(parseNumber('1,2,3').ok).toBe(false);
    expect(parseNumber('1.234,5').ok).toBe(false);
  });

  it('a percentage, shown back as it was typed', () => {
    expect(parsePercent('0.4 %')).toEqual(good(0.004));
    expect(shown(0.004, 100)).toBe('0.4');
    expect(shown(2.5e-5, 1e6)).toBe('25');
  });

  it.each([
    ['2000', { factor: 2000 }],
    ['1:2000', { factor: 2000 }],
    ['1 -> 100', { steps: [{ takeMl: 1, toMl: 100 }] }],
    [
      '1 mL → 100 mL; 5→50',
      {
        steps: [
          { takeMl: 1, toMl: 100 },
          { takeMl: 5, toMl: 50 },
        ],
      },
    ],
  ])('a dilution: %s', (text, value) => {
    const entry = parseDilution(text);
    expect(entry).toEqual({ ok: true, value });
    if (entry.ok && entry.value) expect(parseDilution(shownDilution(entry.value))).toEqual(entry);
  });

  it.each(['0.5', '100 -> 1', 'a lot', '1 -> ', '1:0'])('not a dilution: %s', (text) => {
    expect(parseDilution(text).ok).toBe(false);
  });

  it('ranges of wavelengths, and back', () => {
    expect(parseRanges('300–304; 410-412,5 nm')).toEqual({
      ok: true,
      value: [
        [300, 304],
        [410, 412.5],
      ],
    });
    expect(
      shownRanges([
        [300, 304],
        [410, 412.5],
      ]),
    ).toBe('300–304; 410–412.5');
    expect(parseRanges('')).toEqual({ ok: true, value: [] });
    expect(parseRanges('304-300').ok).toBe(false);
    expect(parseRanges('about 300').ok).toBe(false);
  });
});

describe('a comma that may stand for thousands as well as for decimals', () => {
  it.each(['2,000', '12,345', '-1,250'])('%s is not guessed: both readings are offered', (text) => {
    const entry = parseNumber(text);
    expect(entry.ok).toBe(false);
    if (!entry.ok) expect(entry.message).toContain(text.replace(',', '').replace('-', ''));
  });

  it.each(['0,025', '2,0', '2,00', '2,0000', '1234,567'])('%s can only be a decimal', (text) => {
    expect(parseNumber(text)).toEqual(good(Number(text.replace(',', '.'))));
  });

  it.each(['2,000', '1:2,000', '1 -> 1,000'])(
    'a dilution of %s says why it is not taken',
    (text) => {
      const entry = parseDilution(text);
      expect(entry.ok).toBe(false);
      if (!entry.ok) expect(entry.message).toContain('two ways');
    },
  );
});
