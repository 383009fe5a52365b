import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readExport } from '../../../analysis/reading/read-export.ts';
import type { Reading } from '../../../analysis/reading/reading.ts';
import { readingToJson } from '../../../analysis/reading/reading-to-json.ts';
import { type ExportShape, encode, type PrintedSpectra, writeText } from './write-export.ts';

/**
 * Damage of known truth. A damaged file must give the truth, or say that something is amiss: a
 * refusal, or an assumption that the undamaged file did not have. Numbers that were never in the
 * file must not appear in silence.
 */
const POINTS = 24;
const truth: PrintedSpectra = {
  wavelengths: Array.from({ length: POINTS }, (_, i) => String(320 + 2 * i)),
  traces: [0.21, 0.57].map((height, t) => ({
    name: `invented ${t + 1}`,
    values: Array.from({ length: POINTS }, (_, i) =>
      (0.004 * t + height * Math.exp(-(((i - 9 - 4 * t) / 5) ** 2))).toFixed(5),
    ),
  })),
};

const shapes: readonly ExportShape[] = (['comma', 'semicolon', 'tab', 'space'] as const).flatMap(
  (delimiter) =>
    (['point', 'comma'] as const)
      .filter((decimal) => !(delimiter === 'comma' && decimal === 'comma'))
      .flatMap((decimal) =>
        (['nothing', 'header and footer'] as const).map((around) => ({
          delimiter,
          decimal,
          around,
          lineEnd: '\n' as const,
          encoding: 'utf-8' as const,
          order: 'ascending' as const,
          quantity: 'absorbance' as const,
          headings: 'one row' as const,
        })),
      ),
);

const sign = (shape: ExportShape) =>
  ({ comma: ',', semicolon: ';', tab: '\t', space: '  ' })[shape.delimiter];

type Damage = (text: string, at: number, other: number, shape: ExportShape) => string;

const lineAt = (lines: readonly string[], at: number) => Math.floor(at * lines.length);

const splice = 'the end of one in the middle of another';

/** Each takes one or two places as fractions of the text. */
const damages: Record<string, Damage> = {
  'cut anywhere': (text, at) => text.slice(0, Math.floor(at * text.length)),
  'a line of text put in': (text, at) => {
    const lines = text.split('\n');
    lines.splice(lineAt(lines, at), 0, 'lamp changed');
    return lines.join('\n');
  },
  'a line turned into text': (text, at) => {
    const lines = text.split('\n');
    lines[lineAt(lines, at)] = 'lamp changed';
    return lines.join('\n');
  },
  'a line twice': (text, at) => {
    const lines = text.split('\n');
    const i = lineAt(lines, at);
    lines.splice(i, 0, lines[i] ?? '');
    return lines.join('\n');
  },
  'two lines changed over': (text, at, other) => {
    const lines = text.split('\n');
    const [i, j] = [lineAt(lines, at), lineAt(lines, other)];
    [lines[i], lines[j]] = [lines[j] ?? '', lines[i] ?? ''];
    return lines.join('\n');
  },
  'a line end lost': (text, at) => {
    const i = text.indexOf('\n', Math.floor(at * text.length));
    return i === -1 ? text : text.slice(0, i) + text.slice(i + 1);
  },
  'a delimiter lost': (text, at, _, shape) => {
    const i = text.indexOf(sign(shape), Math.floor(at * text.length));
    return i === -1 ? text : text.slice(0, i) + text.slice(i + sign(shape).length);
  },
  'a delimiter doubled': (text, at, _, shape) => {
    const i = text.indexOf(sign(shape), Math.floor(at * text.length));
    return i === -1 ? text : text.slice(0, i) + sign(shape) + text.slice(i);
  },
  'a cell emptied': (text, at, _, shape) => {
    const start = text.indexOf(sign(shape), Math.floor(at * text.length));
    const from = start + sign(shape).length;
    const rest = text.slice(from).search(/[,;\t\n]| {2}/);
    return start === -1 || rest === -1 ? text : text.slice(0, from) + text.slice(from + rest);
  },
  'a letter in a number': (text, at) => {
    const i = Math.floor(at * text.length);
    return `${text.slice(0, i)}o${text.slice(i + 1)}`;
  },
  [splice]: (text, at, other) => {
    const [i, j] = [Math.floor(at * text.length), Math.floor(other * text.length)];
    return text.slice(0, i) + text.slice(j);
  },
  'zero bytes in the middle': (text, at) => {
    const i = Math.floor(at * text.length);
    return `${text.slice(0, i)}\u0000\u0000${text.slice(i)}`;
  },
};

const read = (text: string) => readExport(encode(text, 'utf-8'), 'export.csv');

/** Whether all that was read stands in the truth at its wavelength, and nothing of it is lacking. */
const isWholeTruth = (reading: Reading) => isTruth(reading, POINTS);

/** A file cut exactly at the end of a row is a shorter file; what it holds must be the truth. */
const isTrueStart = (reading: Reading) => isTruth(reading, reading.spectra[0]?.points ?? 0);

function isTruth(reading: Reading, points: number): boolean {
  return (
    reading.spectra.length === truth.traces.length &&
    reading.spectra.every((spectrum, t) => {
      const values = Array.from(spectrum.absorbance ?? []);
      const expected = truth.traces[t]?.values.slice(0, points).map(Number);
      return (
        JSON.stringify(Array.from(spectrum.wavelengthNm)) ===
          JSON.stringify(truth.wavelengths.slice(0, points).map(Number)) &&
        JSON.stringify(values) === JSON.stringify(expected)
      );
    })
  );
}

/** Whether no number was read at a wavelength that has another one in truth. */
function hasNoWrongNumber(reading: Reading): boolean {
  return reading.spectra.every((spectrum) =>
    Array.from(spectrum.wavelengthNm).every((nm, i) => {
      const value = spectrum.absorbance?.[i] ?? Number.NaN;
      const place = truth.wavelengths.indexOf(String(nm));
      const expected = truth.traces[spectrum.trace ?? 0]?.values[place];
      return Number.isNaN(value) || value === Number(expected);
    }),
  );
}

const notesOf = (reading: Reading) =>
  new Set(reading.spectra.flatMap(({ assumptions }) => assumptions));

/** Refused in part or whole, or an assumption that the sound file does not need. */
function isTold(reading: Reading, sound: Reading): boolean {
  if (reading.refused.length > 0) return true;
  const usual = notesOf(sound);
  return [...notesOf(reading)].some((note) => !usual.has(note));
}

const place = fc.double({ min: 0, max: 1, maxExcluded: true, noNaN: true });

describe('damage is told', () => {
  it.each(Object.entries(damages))('%s', (kind, damage) => {
    fc.assert(
      fc.property(fc.constantFrom(...shapes), place, place, (shape, at, other) => {
        const text = writeText(truth, shape);
        const reading = read(damage(text, at, other, shape));
        const isTrue = kind === 'cut anywhere' ? isTrueStart(reading) : isWholeTruth(reading);
        expect(isTrue || isTold(reading, read(text))).toBe(true);
        // Two halves of numbers may join to a number that the file then does print.
        if (kind !== splice) expect(hasNoWrongNumber(reading)).toBe(true);
      }),
      { numRuns: 400, seed: 4711 },
    );
  });

  it('the sound files give the whole truth (else the claims above would be empty)', () => {
    for (const shape of shapes) expect(isWholeTruth(read(writeText(truth, shape)))).toBe(true);
  });
});

describe('nothing makes reading throw or give a broken reading', () => {
  const soundness = (bytes: Uint8Array) => {
    const reading = readExport(bytes, 'export.csv');
    expect(reading.spectra.length + reading.refused.length).toBeGreaterThan(0);
    for (const { wavelengthNm, points, absorbance, molarAbsorptivity } of reading.spectra) {
      expect(points).toBe(wavelengthNm.length);
      expect((absorbance ?? molarAbsorptivity)?.length).toBe(points);
      expect(wavelengthNm.every((nm, i) => i === 0 || nm > (wavelengthNm[i - 1] ?? 0))).toBe(true);
    }
    for (const { why, mend } of reading.refused) expect(why.endsWith(mend)).toBe(true);
    JSON.stringify(readingToJson(reading));
  };

  it('random bytes', () => {
    fc.assert(fc.property(fc.uint8Array({ maxLength: 400 }), soundness), {
      numRuns: 3000,
      seed: 4712,
    });
  });

  it('random text of the characters that exports are made of', () => {
    const letter = fc.constantFrom(...'0123456789.,;\t \n\r"-+eE%()ATabsnmλ−\uFEFF');
    const text = fc.array(letter, { maxLength: 200 }).map((letters) => letters.join(''));
    fc.assert(
      fc.property(text, (written) => soundness(encode(written, 'utf-8'))),
      { numRuns: 5000, seed: 4713 },
    );
  });

  it('random tables of numbers, marks and words', () => {
    const cell = fc.oneof(
      fc.integer({ min: 0, max: 4000 }).map(String),
      fc.double({ min: -3, max: 120, noNaN: true }).map((value) => value.toPrecision(4)),
      fc.constantFrom('OVER', '', '1,234', '1.234,5', 'nm', 'Abs', '%T', 'ε', '1e999', '-', '"'),
    );
    const table = fc
      .tuple(
        fc.constantFrom(',', ';', '\t', ' '),
        fc.array(fc.array(cell, { minLength: 1, maxLength: 4 }), { maxLength: 12 }),
      )
      .map(([delimiter, lines]) => lines.map((cells) => cells.join(delimiter)).join('\n'));
    fc.assert(
      fc.property(table, (written) => soundness(encode(written, 'utf-8'))),
      { numRuns: 5000, seed: 4714 },
    );
  });
});
