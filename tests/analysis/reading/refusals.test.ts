import { describe, expect, it } from 'vitest';
import { MAX_EXPORT_BYTES } from '../../../analysis/reading/limits.ts';
import { readExport } from '../../../analysis/reading/read-export.ts';
import { onlyRefusal, readText } from './read-text.ts';

const bytesOf = (...parts: (string | readonly number[])[]) =>
  Uint8Array.from(
    parts.flatMap((part) =>
      typeof part === 'string' ? Array.from(part, (letter) => letter.charCodeAt(0)) : part,
    ),
  );

describe('what is no text is named for what it is', () => {
  it.each([
    ['an empty file', bytesOf(), 'empty-file', 'no bytes'],
    ['white space', bytesOf(' \r\n\t\n  '), 'only-white-space', 'nothing but white space'],
    ['a PNG picture', bytesOf([0x89], 'PNG\r\n', [0x1a, 10, 0, 0]), 'is-a-picture', 'picture'],
    ['a JPEG picture', bytesOf([0xff, 0xd8, 0xff, 0xe0, 0, 16], 'JFIF'), 'is-a-picture', 'picture'],
    ['a PDF', bytesOf('%PDF-1.7\n', [0xe2, 0xe3]), 'is-a-pdf', 'PDF'],
    [
      'a workbook',
      bytesOf('PK', [3, 4, 20, 0], '[Content_Types].xml', [0], 'xl/workbook.xml'),
      'is-a-workbook',
      'as text (CSV)',
    ],
    ['an archive', bytesOf('PK', [3, 4, 20, 0], 'spectra/run.csv'), 'is-packed', 'Unpack'],
    ['other binary bytes', bytesOf('400,0.1', [0, 1, 2, 0xfe], '\n401,0.2'), 'is-binary', 'binary'],
    ['control characters', bytesOf([1, 2, 3, 4, 5, 6], '400,0.1\n401,0.2'), 'is-binary', 'binary'],
  ])('%s', (_, bytes, code, words) => {
    const refused = onlyRefusal(bytes);
    expect(refused.code).toBe(code);
    expect(refused.why).toContain(words);
    expect(refused.why.endsWith(refused.mend)).toBe(true);
    expect(readExport(bytes, 'x').delimiter).toBe('');
  });
});

describe('text that is no export is named for what it is', () => {
  it.each([
    ['a sheet', '{ "format": "monobis-sheet", "version": 1 }', 'is-a-sheet', 'Open it as a sheet'],
    ['results', '\uFEFF{\n"format" : "monobis-results"}', 'is-json', 'results file'],
    ['other JSON', '[{"a": 1}]', 'is-json', 'JSON'],
    ['a web page', '<!DOCTYPE html><html>400,0.1', 'is-markup', 'web page'],
    ['JCAMP-DX', '##TITLE= x\n##XYDATA=(X++(Y..Y))\n400 1 2', 'is-jcamp-dx', 'not read yet'],
    ['prose', 'Dear colleague,\nsee the attached.', 'no-numbers', '"Dear colleague,"'],
    ['prose with numbers', 'Room 12\nCall 400 or 401\n', 'no-numbers', 'begins with'],
  ])('%s', (_, text, code, words) => {
    const refused = onlyRefusal(text);
    expect(refused.code).toBe(code);
    expect(refused.why).toContain(words);
  });
});

describe('what is too large is refused before it is read', () => {
  it('a text above the limit, without looking at a byte', () => {
    const refused = onlyRefusal(new Uint8Array(MAX_EXPORT_BYTES + 1).fill(0x31));
    expect(refused.code).toBe('too-large');
    expect(refused.why).toContain('more than 64 MiB');
  });

  it.each([
    ['a line without end', `nm,A\n400,${'1'.repeat(1_000_001)}\n401,2\n`, 'line-too-long', 2],
    [
      'a line of very many columns',
      `400${',0.1'.repeat(20_000)}\n`.repeat(3),
      'too-many-columns',
      1,
    ],
    ['very many lines', '1\n'.repeat(2_000_001), 'too-many-lines', null],
  ])('%s', (_, text, code, line) => {
    const refused = onlyRefusal(text);
    expect(refused.code).toBe(code);
    expect(refused.line).toBe(line);
  });

  it.each([
    ['quotes', '"'.repeat(900_000)],
    ['quotes and commas', '"",'.repeat(300_000)],
    ['quoted cells that never close', ',""x'.repeat(220_000)],
    ['signs', '-'.repeat(900_000)],
    ['digits and points', '1.'.repeat(450_000)],
    ['grouped digits', '1,000'.repeat(150_000)],
    ['words', 'a '.repeat(450_000)],
    ['brackets', '('.repeat(900_000)],
  ])('a line of %s takes no more than one look (the test would time out)', (_, line) => {
    expect(readText(`${line}\n${line}\n${line}`).spectra).toEqual([]);
    expect(readText(`${line}\n400\t0.1\n401\t0.2\n`).refused.length).toBeLessThan(2);
  });
});

const rows = (sign: string, from = 400, count = 6) =>
  Array.from({ length: count }, (_, i) => `${from + i}${sign}0.1${i}`).join('\n');

describe('tables that do not fit are refused with their line', () => {
  it.each([
    [
      'a repeated wavelength',
      'nm;A\n400;0.1\n401;0.2\n401;0.3\n402;0.1\n',
      'repeated-wavelength',
      4,
    ],
    [
      'wavelengths back and forth',
      'nm;A\n400;0.1\n401;0.2\n399;0.3\n402;0.1\n403;0.1\n',
      'wavelengths-not-in-order',
      4,
    ],
    [
      'text amid the data',
      `nm;A\n${rows(';')}\nlamp change\n${rows(';', 406)}\n`,
      'text-in-the-data',
      8,
    ],
    [
      'text after the first row',
      `nm;A\n400;0.1\nlamp change\n${rows(';', 401)}\n`,
      'text-in-the-data',
      3,
    ],
    [
      'a damaged wavelength',
      `nm;A\n${rows(';')}\n4o6;0.1\n${rows(';', 407)}\n`,
      'text-in-the-data',
      8,
    ],
    ['a row cut short', `nm;A;B\n400;1;2\n401;1;2\n402;1\n403;1;2\n404;1;2\n`, 'ragged-row', 4],
    ['a row with a cell too many', `nm A\n400 1\n401 2\n402 1 7\n403 1\n404 1\n`, 'ragged-row', 4],
    ['two rows run together', `nm,A\n400,0.1\n401,0.2402,0.3\n403,0.1\n404,0.2\n`, 'ragged-row', 3],
    ['a row without wavelength', 'nm;A;B\n400;1;2\n;1;2\n402;1;2\n403;1;2\n', 'axis-gap', 3],
    ['one point', 'nm;A\n400;0.1\n', 'too-few-points', 2],
    ['wavelengths of 1 nm and less', 'nm;A\n0.5;0.1\n1.0;0.2\n', 'wavelength-out-of-range', 2],
    ['wavelengths above 4000 nm', 'nm;A\n3999;0.1\n4001;0.2\n', 'wavelength-out-of-range', 3],
    [
      'two blocks one after the other',
      `nm;A\n${rows(';')}\nsecond\nnm;A\n${rows(';')}\n`,
      'several-blocks',
      10,
    ],
    [
      'two blocks apart by a blank line',
      `nm;A\n${rows(';')}\n\n${rows(';')}\n`,
      'wavelengths-not-in-order',
      9,
    ],
    ['two named axes', 'nm;A;nm;A\n400;0.1;400;0.2\n401;0.1;401;0.2\n', 'several-axes', null],
    ['two unnamed axes', '400;0.1;410;0.2\n401;0.1;411;0.2\n', 'several-axes', 1],
    [
      'wavelengths across',
      'cell;200;201;202;203\n100;0.1;0.2;0.3;0.1\n110;0.1;0.2;0.3;0.2\n',
      'wavelengths-across',
      1,
    ],
    ['an axis in an unknown unit', 'Wavelength (Hz);A\n400;0.1\n401;0.2\n', 'axis-unit', 1],
    [
      'an axis that may be wavenumbers',
      'Abscissa: wavenumber\nInvented\n\n1400;0.1\n1401;0.2\n',
      'axis-unit',
      4,
    ],
    ['no column of values', 'nm;\n400;\n401;\n', 'no-numbers', 1],
  ])('%s', (_, text, code, line) => {
    const refused = onlyRefusal(text);
    expect(`${refused.code} in line ${refused.line}`).toBe(`${code} in line ${line}`);
    expect(refused.mend).not.toBe('');
    expect(refused.what).toBe('the file');
  });
});

describe('numbers that may be read in two ways are refused', () => {
  it.each([
    ['1,234 in every cell', '1,234;1,234\n1,235;1,300\n', 'ambiguous-number'],
    ['1,234 of an unnamed quantity', '400;1,234\n401;1,300\n', 'ambiguous-number'],
    [
      '12,345 as molar absorptivity',
      'nm;ε (M-1 cm-1)\n400;12,345\n401;13,200\n',
      'ambiguous-number',
    ],
    [
      '12.345 as molar absorptivity',
      'nm;ε (M-1 cm-1)\n400;12.345\n401;13.200\n',
      'ambiguous-number',
    ],
    ['1,234 beside 1.234', 'nm;A\n400;1,234\n401;1.300\n', 'ambiguous-number'],
    ['0,1 beside 0.1', 'nm;A\n400;0,1\n401;0.2\n402;0,3\n', 'mixed-decimals'],
    ['one 1,234 beside 0.5', 'nm;A\n400;0.5\n401;1,234\n402;0.3\n', 'mixed-decimals'],
    ['commas for both, no heading', '400,0,123\n401,0,125\n402,0,130\n', 'comma-for-both'],
    ['commas for both, two headings', 'nm,A\n400,0,123\n401,0,125\n', 'comma-for-both'],
    ['commas for both, in wavelengths too', 'nm,A\n400,5,0,123\n401,0,0,125\n', 'comma-for-both'],
    ['commas for both, padded zeros', 'nm,A,B\n400,0,012\n401,0,009\n', 'comma-for-both'],
  ])('%s', (_, text, code) => {
    expect(onlyRefusal(text).code).toBe(code);
  });

  it('the mixed sign is shown with its line and the usual one', () => {
    const refused = onlyRefusal('nm;A\n400;0,1\n401;0.2\n402;0,3\n');
    expect(refused.line).toBe(3);
    expect(refused.why).toContain('"0.2" here, "0,1" in line 2');
  });
});

describe('quantities that are not ours are refused trace by trace', () => {
  it.each([
    ['mAU', 'other-quantity', 'thousandths'],
    ['Reflectance (%)', 'other-quantity', 'reflectance'],
    ['1st derivative', 'other-quantity', 'derivative'],
    ['log ε', 'other-quantity', 'logarithm'],
    ['Intensity (a.u.)', 'other-quantity', 'intensity'],
    ['ε (mM-1 cm-1)', 'other-quantity', 'another unit'],
    ['ε (10^3 L mol-1 cm-1)', 'other-quantity', 'power of ten'],
    ['t', 'other-quantity', 'time'],
  ])('%s', (heading, code, words) => {
    const { spectra, refused } = readText(`nm;Absorbance;${heading}\n400;0.5;0.7\n401;0.5;0.8\n`);
    expect(spectra.map(({ name }) => name)).toEqual(['Absorbance']);
    expect(refused.map((part) => part.code)).toEqual([code]);
    expect(refused[0]?.why).toContain(words);
    expect(refused[0]?.what).toBe(`trace 2 ("${heading}")`);
  });

  it.each([
    ['unnamed values up to 100', '400;87.5\n401;99.5\n', 'unnamed-quantity', 'Name the quantity'],
    ['an absorbance of 87', 'nm;A\n400;87.5\n401;99.5\n', 'implausible-values', 'says absorbance'],
    [
      'a transmittance of 5',
      'nm;Transmittance\n400;4.5\n401;5.5\n',
      'ambiguous-quantity',
      'per cent',
    ],
    ['no number at all', 'nm;A\n400;OVER\n401;OVER\n', 'no-values', 'every point is missing'],
    [
      'two names that contradict each other',
      'Y axis: Absorbance\nMode: %T\n\nnm;run 1\n400;0.5\n401;0.6\n',
      'other-quantity',
      'lines 1, 2',
    ],
  ])('%s', (_, text, code, words) => {
    const refused = onlyRefusal(text);
    expect(refused.code).toBe(code);
    expect(refused.why).toContain(words);
  });

  it('a refused trace leaves the places of the others as they are in the file', () => {
    const { spectra } = readText('nm;mAU;Abs\n400;500;0.7\n401;510;0.8\n');
    expect(spectra.map(({ trace }) => trace)).toEqual([1]);
  });
});
