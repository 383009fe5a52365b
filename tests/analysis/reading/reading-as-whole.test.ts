import { describe, expect, it } from 'vitest';
import { readExport } from '../../../analysis/reading/read-export.ts';
import { readingToJson } from '../../../analysis/reading/reading-to-json.ts';
import { onlySpectrum, readText } from './read-text.ts';
import { encode } from './write-export.ts';

describe('a file that was cut', () => {
  const whole = 'nm;A;B\n400;0.1111;0.2222\n401;0.1111;0.2222\n402;0.1111;0.2222';

  it('reads the same without its last line end', () => {
    expect(readText(whole).spectra).toEqual(readText(`${whole}\n`).spectra);
  });

  it('loses a last number that has lost digits, and says so', () => {
    const [, second] = readText(whole.slice(0, -1)).spectra;
    expect(Array.from(second?.absorbance ?? [])).toEqual([0.2222, 0.2222, Number.NaN]);
    expect(second?.assumptions.join()).toContain('the file seems to have been cut');
  });

  it('loses a last line that stops half way, and says so', () => {
    const [first] = readText(whole.slice(0, -7)).spectra;
    expect(first?.points).toBe(2);
    expect(first?.assumptions.join()).toContain('Line 4, the last, stops half way');
  });
});

describe('a reading', () => {
  it('knows bytes and encoding whatever the file is called', () => {
    const bytes = new TextEncoder().encode('nm;A\n400;0.1\n401;0.2\n');
    const reading = readExport(bytes, 'photo.png');
    expect(reading.spectra.length).toBe(1);
    // sha256sum of these bytes, by coreutils.
    expect(reading.sha256).toBe('fa1ecc5e7a5ade7eba789cfc7ceb0a82b05f9809fb3875d0803929a14ee64188');
  });

  it('as JSON has the members of the contract in its order, null for missing points', () => {
    const json = readingToJson(readText('nm;A;mAU\n401;0.1;5\n400;OVER;6\n'));
    const text = JSON.stringify(json);
    expect(JSON.parse(text)).toMatchObject({
      format: 'monobis-reading',
      version: 1,
      spectra: [{ wavelengthNm: [400, 401], absorbance: [null, 0.1], points: 2, xUnit: 'nm' }],
      refused: [{ what: 'trace 2 ("mAU")', line: null }],
    });
    expect(Object.keys(json)).toEqual([
      'format',
      'version',
      'file',
      'sha256',
      'encoding',
      'delimiter',
      'decimal',
      'spectra',
      'refused',
    ]);
    expect(text).toContain(
      '"name":"A","xUnit":"nm","quantity":"absorbance","points":2,"wavelengthNm"',
    );
  });
});

describe('encodings', () => {
  const text = 'Größe\nWellenlänge (nm);Probe ä (A)\n400;0,1\n401;0,2\n';

  it.each(['utf-8', 'utf-16le', 'utf-16be', 'latin-1'] as const)('%s', (encoding) => {
    const reading = readExport(encode(text, encoding), 'export.csv');
    expect([reading.encoding, reading.spectra[0]?.name]).toEqual([encoding, 'Probe ä (A)']);
  });

  it('a UTF-8 file cut inside a character stays UTF-8 and is told', () => {
    const bytes = encode(`${text}µ`, 'utf-8').slice(0, -1);
    const reading = readExport(bytes, 'export.csv');
    expect(reading.encoding).toBe('utf-8');
    expect(reading.spectra[0]?.assumptions.join()).toContain('in the middle of a character');
  });
});

describe('gaps', () => {
  it('a missing line in an even axis is told', () => {
    const rows = [400, 401, 402, 403, 405, 406, 407].map((nm) => `${nm};0.1\n`).join('');
    expect(onlySpectrum(`nm;A\n${rows}`).assumptions.join()).toContain('between 403 and 405 nm');
  });
});
