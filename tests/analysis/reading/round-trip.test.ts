import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readExport } from '../../../analysis/reading/read-export.ts';
import type { Quantity, Reading } from '../../../analysis/reading/reading.ts';
import {
  type ExportShape,
  needsQuotedCells,
  type PrintedSpectra,
  type WrittenEncoding,
  writeExport,
} from './write-export.ts';

const delimiters = ['comma', 'semicolon', 'tab', 'space'] as const;
const decimals = ['point', 'comma'] as const;
const lineEnds = ['\n', '\r\n', '\r', 'mixed'] as const;
const encodings = [
  'utf-8',
  'utf-8 with byte-order mark',
  'utf-16le',
  'utf-16le with byte-order mark',
  'utf-16be',
  'utf-16be with byte-order mark',
  'latin-1',
] as const satisfies readonly WrittenEncoding[];
const orders = ['ascending', 'descending'] as const;
const arounds = ['nothing', 'header', 'footer', 'header and footer'] as const;
const quantities = [
  'absorbance',
  'percent-transmittance',
  'transmittance',
  'molar-absorptivity',
] as const satisfies readonly Quantity[];
const headingKinds = ['one row', 'quoted', 'units row', 'none'] as const;
const languages = ['English', 'German'] as const;
const rowKinds = [
  'plain',
  'trailing delimiter',
  'blank lines between',
  'running number first',
] as const;
const lastLines = ['closed', 'open'] as const;

/** Values as an instrument prints them for each quantity: fixed decimals, sign and size of the kind. */
const printedRange: Record<Quantity, { low: number; high: number; decimals: number }> = {
  absorbance: { low: -2000, high: 42_000, decimals: 4 },
  'percent-transmittance': { low: 1, high: 10_200, decimals: 2 },
  transmittance: { low: 1, high: 10_200, decimals: 4 },
  'molar-absorptivity': { low: 0, high: 900_000, decimals: 1 },
};

const print = (whole: number, decimalPlaces: number) =>
  (whole / 10 ** decimalPlaces).toFixed(decimalPlaces);

/** Without a heading only absorbance can be read. */
function isWritable(shape: ExportShape): boolean {
  if (shape.headings === 'none' && shape.quantity !== 'absorbance') return false;
  if (shape.rows === 'trailing delimiter' && shape.delimiter === 'space') return false;
  return true;
}

/** Absorbance the other way round from the program: through natural logarithms. */
function absorbanceOf(printed: string, quantity: Quantity): number {
  const value = Number(printed);
  if (quantity === 'transmittance') return -Math.log(value) / Math.LN10;
  if (quantity === 'percent-transmittance') return -Math.log(value / 100) / Math.LN10;
  return value;
}

/** Logarithms of both bases and the quotient are each good to an ulp or so of a value below 5. */
const LOG_TOLERANCE = 4 * 5 * Number.EPSILON;

function expectTruth(reading: Reading, spectra: PrintedSpectra, shape: ExportShape): void {
  expect(reading.refused).toEqual([]);
  expect(reading.delimiter).toBe(shape.delimiter);
  expect(reading.decimal).toBe(shape.decimal);
  const marked = 'with byte-order mark';
  const isUtf16 = shape.encoding.startsWith('utf-16');
  expect([shape.encoding, shape.encoding.replace(` ${marked}`, ''), 'utf-8']).toContain(
    reading.encoding,
  );
  if (isUtf16) expect(reading.encoding).toBe(shape.encoding.replace(` ${marked}`, ''));
  expect(reading.spectra.length).toBe(spectra.traces.length);
  reading.spectra.forEach((spectrum, index) => {
    const printed = spectra.traces[index]?.values ?? [];
    expect(spectrum.quantity).toBe(shape.quantity);
    expect(spectrum.points).toBe(printed.length);
    expect(Array.from(spectrum.wavelengthNm)).toEqual(spectra.wavelengths.map(Number));
    const values =
      shape.quantity === 'molar-absorptivity' ? spectrum.molarAbsorptivity : spectrum.absorbance;
    const isExact = shape.quantity === 'absorbance' || shape.quantity === 'molar-absorptivity';
    printed.forEach((cell, point) => {
      const read = values?.[point] ?? Number.NEGATIVE_INFINITY;
      if (cell === null) expect(read).toBeNaN();
      else if (isExact) expect(read).toBe(Number(cell) + 0);
      else expect(Math.abs(read - absorbanceOf(cell, shape.quantity))).toBeLessThan(LOG_TOLERANCE);
    });
    const missing = printed.includes(null);
    expect(spectrum.assumptions.some((text) => text.includes('missing'))).toBe(missing);
  });
}

function* everyShape(): Generator<ExportShape> {
  for (const delimiter of delimiters)
    for (const decimal of decimals)
      for (const lineEnd of lineEnds)
        for (const encoding of encodings)
          for (const order of orders)
            for (const around of arounds)
              for (const quantity of quantities)
                yield {
                  delimiter,
                  decimal,
                  lineEnd,
                  encoding,
                  order,
                  around,
                  quantity,
                  headings: 'one row',
                };
}

/** A small absorption band with one missing point, printed for the quantity. */
function sample(quantity: Quantity, traces: number): PrintedSpectra {
  const { low, high, decimals: places } = printedRange[quantity];
  const points = 7;
  return {
    wavelengths: Array.from({ length: points }, (_, i) => (250.5 + 0.5 * i).toFixed(1)),
    traces: Array.from({ length: traces }, (_, t) => ({
      name: `run ${t + 1}`,
      values: Array.from({ length: points }, (_, i) =>
        i === 3 + t
          ? null
          : print(low + Math.round(((high - low) * (i + 1)) / (points + t + 1)), places),
      ),
    })),
  };
}

describe('a spectrum survives writing and reading', () => {
  it('in every combination of delimiter, decimal, line end, encoding, order, surroundings, quantity and number of traces', () => {
    let tried = 0;
    for (const shape of everyShape()) {
      for (const traces of [1, 3]) {
        const spectra = sample(shape.quantity, traces);
        try {
          expectTruth(readExport(writeExport(spectra, shape), 'export'), spectra, shape);
        } catch (error) {
          throw new Error(`misread: ${JSON.stringify({ ...shape, traces })}`, { cause: error });
        }
        tried += 1;
      }
    }
    expect(tried).toBe(4 * 2 * 4 * 7 * 2 * 4 * 4 * 2);
  });

  it('in any structure with any values', () => {
    fc.assert(
      fc.property(anyExport, ({ shape, spectra }) => {
        expectTruth(readExport(writeExport(spectra, shape), 'export'), spectra, shape);
      }),
      { numRuns: 3000, seed: 20_261_201 },
    );
  });
});

const anyShape: fc.Arbitrary<ExportShape> = fc
  .record({
    delimiter: fc.constantFrom(...delimiters),
    decimal: fc.constantFrom(...decimals),
    lineEnd: fc.constantFrom(...lineEnds),
    encoding: fc.constantFrom(...encodings),
    order: fc.constantFrom(...orders),
    around: fc.constantFrom(...arounds),
    quantity: fc.constantFrom(...quantities),
    headings: fc.constantFrom(...headingKinds),
    language: fc.constantFrom(...languages),
    rows: fc.constantFrom(...rowKinds),
    lastLine: fc.constantFrom(...lastLines),
  })
  .filter(isWritable);

const anyExport = anyShape.chain((shape) =>
  fc
    .record({
      start: fc.integer({ min: 1800, max: 9000 }),
      step: fc.integer({ min: 1, max: 50 }),
      points: fc.integer({ min: 3, max: 12 }),
      traces: fc.integer({ min: 1, max: 4 }),
      extraPlaces: fc.integer({ min: 0, max: 4 }),
    })
    .chain(({ start, step, points, traces, extraPlaces }) => {
      const { low, high, decimals } = printedRange[shape.quantity];
      // Molar absorptivities with three decimals may be thousands: they are refused by design.
      const extra = shape.quantity === 'molar-absorptivity' ? 0 : extraPlaces;
      const scale = 10 ** extra;
      const value = fc.option(
        fc
          .integer({ min: low * scale, max: high * scale })
          .map((whole) => print(whole, decimals + extra)),
        { freq: 6 },
      );
      const trace = fc
        .array(value, { minLength: points, maxLength: points })
        // A trace without any value is refused, which is another test's claim.
        .filter((values) => values.some((cell) => cell !== null));
      return fc.record({
        shape: fc.constant(shape),
        spectra: fc.record({
          wavelengths: fc.constant(
            Array.from({ length: points }, (_, i) => print(start + step * i, 1)),
          ),
          traces: fc
            .array(trace, { minLength: traces, maxLength: traces })
            .map((all) => all.map((values, i) => ({ name: `cuvette ${i + 1}`, values }))),
        }),
      });
    }),
);

it('cells are quoted only where a comma has to do for both', () => {
  const shape = { ...defaultShape, delimiter: 'comma', decimal: 'comma' } as const;
  expect(needsQuotedCells(shape)).toBe(true);
  expect(needsQuotedCells({ ...shape, delimiter: 'tab' })).toBe(false);
});

const defaultShape: ExportShape = {
  delimiter: 'comma',
  decimal: 'point',
  lineEnd: '\n',
  encoding: 'utf-8',
  order: 'ascending',
  around: 'nothing',
  quantity: 'absorbance',
  headings: 'one row',
};
