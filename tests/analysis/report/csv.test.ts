import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { reportCsv } from '../../../analysis/index.ts';
import { csvCells } from './csv-cells.ts';
import { madeHostile, quantification, sheet } from './fixture.ts';

const { results } = quantification;

/** Rows as records by heading. */
function rowsOf(csv: string): Record<string, string>[] {
  const [headings = [], ...rows] = csvCells(csv.replace(/^\uFEFF/, ''));
  return rows.map((cells) => {
    expect(cells.length).toBe(headings.length);
    return Object.fromEntries(cells.map(({ value }, i) => [headings[i]?.value ?? '', value]));
  });
}

/** Every number anywhere below a value. */
function numbersIn(value: unknown): number[] {
  if (typeof value === 'number') return [value];
  if (value === null || typeof value !== 'object') return [];
  return Object.values(value).flatMap(numbersIn);
}

describe('the results as CSV', () => {
  const csv = reportCsv(sheet, quantification);

  it('begin with a byte-order mark and end every line with CRLF', () => {
    expect(csv.startsWith('\uFEFFaliquot,run,quantity,')).toBe(true);
    expect(csv.endsWith('\r\n')).toBe(true);
    expect(csv.replaceAll('\r\n', '')).not.toMatch(/[\r\n]/);
  });

  it('hold every number of the results in full precision, never quoted', () => {
    const bare = new Set(
      csvCells(csv.slice(1))
        .flat()
        .filter(({ isQuoted }) => !isQuoted)
        .map(({ value }) => value),
    );
    const { version: _, ...held } = results;
    const numbers = numbersIn(held);
    expect(numbers.length).toBeGreaterThan(100);
    for (const number of numbers) expect(bare).toContain(String(number));
  });

  it('leave the cell of an end that is not bounded empty', () => {
    const ratio = rowsOf(csv).find(
      ({ aliquot, quantity }) => aliquot === 'a2' && quantity === 'ratio',
    );
    expect(ratio).toMatchObject({ value: '', u: '', low: '276.8', high: '' });
  });

  it('have a row for each range of a doubt, for each refusal, note and warning', () => {
    const rows = rowsOf(csv);
    const [doubt] = results.aliquots[0]?.doubts ?? [];
    expect(rows.filter(({ quantity }) => quantity === 'doubt:unexplained-band')).toMatchObject([
      { aliquot: 'a1', low: '318', high: '342', unit: 'nm', text: doubt?.message },
      { aliquot: 'a1', low: '408', high: '412', unit: 'nm', text: doubt?.message },
    ]);
    expect(rows.find(({ quantity }) => quantity === 'doubt:below-detection')).toMatchObject({
      species: 'chloride',
      low: '',
    });
    expect(rows.find(({ quantity }) => quantity === 'refused')?.text).toContain('aliquot a3');
    expect(rows.some(({ text }) => text?.startsWith('No path length'))).toBe(true);
    expect(rows.some(({ text }) => text?.startsWith('Invented data'))).toBe(true);
  });

  it('let no text become a formula, whatever stands before it', () => {
    fc.assert(
      fc.property(
        fc.stringMatching(/^[ \t\n\r\u00a0]{0,3}[=+\-@\t\r][^\0]{0,12}$/),
        (title: string) => {
          const text = reportCsv(sheet, { ...quantification, results: { ...results, title } });
          const cell = rowsOf(text).find(({ quantity }) => quantity === 'title')?.text;
          expect(cell).toBe(`'${title}`);
        },
      ),
    );
  });

  it('give any text back as it was', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'grapheme', maxLength: 30 }), (title: string) => {
        const text = reportCsv(sheet, { ...quantification, results: { ...results, title } });
        const cell = rowsOf(text).find(({ quantity }) => quantity === 'title')?.text;
        expect([title, `'${title}`]).toContain(cell);
      }),
    );
  });

  it('stay in their columns with hostile names', () => {
    const { sheet: bad, quantification: worse } = madeHostile();
    expect(rowsOf(reportCsv(bad, worse)).length).toBe(rowsOf(csv).length);
  });

  it('refuse to write a number that is none', () => {
    const [first] = results.aliquots;
    if (!first) throw new Error('no aliquot in the fixture');
    const broken = {
      ...quantification,
      results: {
        ...results,
        aliquots: [{ ...first, fit: { ...first.fit, residualRms: Number.NaN } }],
      },
    };
    expect(() => reportCsv(sheet, broken)).toThrow(/not finite/);
  });
});
