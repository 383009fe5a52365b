import { describe, expect, it } from 'vitest';
import { addNoiseScans, type EmbeddedSpectrum, newSheet } from '../../../analysis/index.ts';
import { noiseOrigin } from '../../../renderer/sections/fit/noise-text.ts';
import { parseStrayLight } from '../../../renderer/sections/fit/parse-stray-light.ts';
import { scansText } from '../../../renderer/sections/fit/scans-text.ts';

describe('stray light as it is typed', () => {
  it.each([
    ['0.05', 0.0005],
    ['0,05 %', 0.0005],
    ['1', 0.01],
    ['5 %', 0.05],
    ['0', 0],
    ['', undefined],
  ])('%s is a percentage of the light', (text, value) => {
    expect(parseStrayLight(text)).toEqual({ ok: true, value });
  });

  it.each(['5.1', '100', '-0.1', 'some', '1,000'])('%s is refused in words', (text) => {
    const entry = parseStrayLight(text);
    expect(entry.ok).toBe(false);
    expect(entry.ok ? '' : entry.message).not.toBe('');
  });
});

describe('scans that show the noise, in a line', () => {
  const scan = (file: string, name: string): EmbeddedSpectrum => ({
    name,
    wavelengthNm: [250, 251],
    absorbance: [0, 0],
    source: { file },
  });
  const textOf = (scans: readonly EmbeddedSpectrum[]): string => {
    const [group] = addNoiseScans(newSheet(), scans).noiseScans ?? [];
    if (!group) throw new Error('no group');
    return scansText(group);
  };

  it('are counted, with the file they are from', () => {
    expect(textOf([scan('day/blanks.csv', 'b1'), scan('day/blanks.csv', 'b2')])).toBe(
      '2 scans: blanks.csv',
    );
    expect(textOf([scan('a.csv', 'x'), scan('b.csv', 'x'), scan('c.csv', 'x')])).toBe(
      '3 scans: a.csv and 2 more files',
    );
    expect(textOf([scan('a.csv', 'lamp')])).toBe('1 scan: a.csv, lamp');
  });

  it('are where the noise is from, in words', () => {
    expect(noiseOrigin({ from: 'scans' })).toBe('from the scans');
    expect(noiseOrigin({ from: 'spectrum' })).toBe('estimated');
  });
});
