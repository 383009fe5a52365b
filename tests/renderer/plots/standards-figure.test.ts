import { describe, expect, it } from 'vitest';
import { quantify, speciesLook } from '../../../analysis/index.ts';
import { speciesDash } from '../../../renderer/plots/species-line.ts';
import {
  sameStandards,
  standardsFigure,
  standardsRange,
} from '../../../renderer/plots/standards-figure.ts';
import { doubtfulSheet, theme } from '../fixture.ts';

const { standards } = quantify(doubtfulSheet(), new Map());
const input = {
  standards,
  labels: new Map([['bis', 'both sites']]),
  theme,
  rangeNm: standardsRange(standards),
  widthPx: 920,
  heightPx: 300,
};

describe('the plot of the standards', () => {
  it('shows each species by name and each of its solutions', () => {
    const { data, layout } = standardsFigure(input);
    const names = data.map(({ name }) => name);
    expect(names).toEqual(expect.arrayContaining(['arm', 'mono', 'both sites', 'bis-1', 'bis-2']));
    expect(layout.annotations?.map(({ text }) => text)).toEqual(['arm', 'mono', 'both sites']);
  });

  it('shows the noise of the points where it can be seen, and not where it cannot', () => {
    const bands = (factor: number) =>
      standardsFigure({
        ...input,
        standards: standards.map((one) => ({
          ...one,
          noiseSd: one.noiseSd.map((_, i) => factor * Math.abs(one.molarAbsorptivity[i] ?? 0)),
        })),
      }).data.filter(({ name }) => name === '±2σ').length;
    expect(bands(0.05)).toBe(3);
    expect(bands(1e-6)).toBe(0);
  });

  it('reaches from the first to the last wavelength', () => {
    expect(standardsRange(standards)).toEqual([228, 472]);
    expect(standardsRange([])).toEqual([0, 1]);
  });

  it('knows an answer that holds the same standards from one that does not', () => {
    expect(sameStandards(standards, structuredClone(standards))).toBe(true);
    const other = structuredClone(standards);
    const epsilon = other[1]?.solutions[0]?.molarAbsorptivity;
    if (!epsilon) throw new Error('there are two solutions of each species');
    epsilon[7] = (epsilon[7] ?? 0) + 1;
    expect(sameStandards(standards, other)).toBe(false);
    expect(sameStandards(standards, standards.slice(1))).toBe(false);
  });

  it('gives each look the line pattern that it has in print', () => {
    const patterns = Array.from({ length: 8 }, (_, index) => speciesDash(index));
    expect(new Set(patterns).size).toBe(8);
    expect(patterns[0]).toBe('solid');
    expect(patterns[1]).toBe('8px,3px');
    expect(speciesLook(1).dash).toBe('8 3');
  });
});
