import { readdirSync, readFileSync } from 'node:fs';
import * as v from 'valibot';
import { describe, expect, it } from 'vitest';
import { readExport } from '../../../analysis/reading/read-export.ts';

const folder = new URL('./corpus/', import.meta.url);

const expectedSchema = v.strictObject({
  encoding: v.string(),
  delimiter: v.string(),
  decimal: v.string(),
  spectra: v.array(
    v.strictObject({
      name: v.string(),
      quantity: v.string(),
      xUnit: v.string(),
      wavelengthNm: v.array(v.number()),
      values: v.array(v.nullable(v.number())),
      notes: v.array(v.string()),
    }),
  ),
  refused: v.array(
    v.strictObject({ code: v.string(), line: v.nullable(v.number()), what: v.string() }),
  ),
});

const files = readdirSync(folder).filter(
  (name) => !/(?:\.expected\.json|README\.md|\.gitattributes)$/.test(name),
);

describe('the corpus is read as a careful reader would', () => {
  it('has its files', () => expect(files.length).toBeGreaterThan(15));

  it.each(files)('%s', (name) => {
    const written = readFileSync(new URL(`${name}.expected.json`, folder), 'utf-8');
    const expected = v.parse(expectedSchema, JSON.parse(written));
    const reading = readExport(readFileSync(new URL(name, folder)), name);
    const { encoding, delimiter, decimal } = reading;
    expect(reading.refused.map(({ code, line, what }) => ({ code, line, what }))).toEqual(
      expected.refused,
    );
    expect({ encoding, delimiter, decimal }).toEqual({
      encoding: expected.encoding,
      delimiter: expected.delimiter,
      decimal: expected.decimal,
    });
    const read = reading.spectra.map(({ name, quantity, xUnit, ...spectrum }) => ({
      name,
      quantity,
      xUnit,
      wavelengthNm: Array.from(spectrum.wavelengthNm),
      values: Array.from(spectrum.absorbance ?? spectrum.molarAbsorptivity ?? [], (value) =>
        Number.isNaN(value) ? null : value,
      ),
    }));
    expect(read).toEqual(expected.spectra.map(({ notes: _, ...spectrum }) => spectrum));
    expected.spectra.forEach(({ notes }, index) => {
      const assumptions = reading.spectra[index]?.assumptions ?? [];
      for (const note of notes) expect(assumptions.join('\n')).toContain(note);
      if (notes.length === 0) expect(assumptions).toEqual([]);
    });
  });
});
