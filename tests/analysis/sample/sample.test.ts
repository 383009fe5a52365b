import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import * as v from 'valibot';
import { describe, expect, test } from 'vitest';
import { sheetSchema } from '../../../analysis/sheet/schema.ts';
import { absorbingSpecies, molarAbsorptivity } from '../../../sample-data/bands.ts';
import { noiseDeviation } from '../../../sample-data/noise.ts';
import {
  aliquotDilutionRelativeUncertainty,
  committedSeed,
  overRange,
  photometricNoise,
  stockRelativeUncertainty,
} from '../../../sample-data/parameters.ts';
import { makeSample, sheetFile, truthFile } from '../../../sample-data/scenario.ts';
import { decodeExport, textOf } from './decode-export.ts';

const folder = join(import.meta.dirname, '../../../sample-data');
const sample = makeSample(committedSeed);
const { truth, sheet } = sample;

describe('the committed sample', () => {
  test('the committed seed gives exactly the committed bytes', () => {
    for (const [path, bytes] of sample.files) {
      expect(Buffer.compare(readFileSync(join(folder, path)), bytes), path).toBe(0);
    }
    expect(readFileSync(join(folder, 'piperazine.sheet.json'), 'utf8')).toBe(sheetFile(sample));
    expect(readFileSync(join(folder, 'truth.json'), 'utf8')).toBe(truthFile(sample));
  });

  test('no spectrum file lies in the folders that the script does not make', () => {
    const lying = ['standards', 'crude'].flatMap((part) =>
      readdirSync(join(folder, part)).map((name) => `${part}/${name}`),
    );
    expect(lying.sort()).toEqual([...sample.files.keys()].sort());
  });

  test('the same seed gives the same bytes and another seed other bytes, in every file', () => {
    const again = makeSample(committedSeed);
    const other = makeSample(committedSeed + 1);
    for (const [path, bytes] of sample.files) {
      expect(again.files.get(path), path).toEqual(bytes);
      expect(other.files.get(path), path).not.toEqual(bytes);
    }
    expect(sheetFile(other)).toBe(sheetFile(sample));
    expect(truthFile(other)).not.toBe(truthFile(sample));
  });

  test('a seed that is no whole number of 32 bits is turned down', () => {
    for (const seed of [-1, 0.5, 2 ** 32, Number.NaN]) {
      expect(() => makeSample(seed)).toThrow(RangeError);
    }
  });

  test('every file, the sheet and the truth say that the data are invented', () => {
    for (const [path, bytes] of sample.files) expect(textOf(path, bytes)).toContain('Invented');
    expect(sheet.invented).toBe(true);
    expect(sheet.title).toContain('Invented');
    expect(truth.invented).toBe(true);
    expect(readFileSync(join(folder, 'README.md'), 'utf8')).toContain('invented');
  });
});

describe('the sheet of the sample', () => {
  test('keeps to the schema', () => {
    expect(v.safeParse(sheetSchema, sheet).issues).toBeUndefined();
  });

  test('points every standard and aliquot at a trace of its own that is there', () => {
    const places = [...(sheet.standards ?? []), ...(sheet.aliquots ?? [])].map(
      ({ id, spectrum }) => {
        const held = sample.drawn.get(spectrum.file ?? '')?.[spectrum.trace ?? 0];
        expect(held?.id, id).toBe(id);
        return `${spectrum.file}#${spectrum.trace}`;
      },
    );
    expect(new Set(places).size).toBe(places.length);
    const traces = [...sample.drawn.values()].flat();
    expect(places.length).toBe(traces.length);
  });
});

describe('the exports', () => {
  test.each([...sample.files])('%s holds the drawn traces to the printed digits', (path, bytes) => {
    const decoded = decodeExport(path, bytes);
    const drawn = sample.drawn.get(path) ?? [];
    expect(decoded.length).toBe(drawn.length);
    decoded.forEach((trace, i) => {
      const { wavelengthNm, absorbance } = drawn[i] ?? expect.unreachable();
      expect(trace.wavelengthNm).toEqual([...wavelengthNm]);
      const decimals = path.startsWith('standards/bis') || path.includes('arm-into-core') ? 4 : 5;
      absorbance.forEach((value, point) => {
        const printed = trace.absorbance[point] ?? expect.unreachable();
        if (path.includes('arm-into-core') && value > overRange.above) {
          expect(printed).toBeNaN();
          return;
        }
        // Half of the last printed digit; 1e-12 is far above the rounding of doubles near 3. A
        // transmittance of 8 % or more, to 4 decimals of a percent, is kept to 3e-6 in absorbance.
        expect(Math.abs(printed - value)).toBeLessThanOrEqual(0.5 * 10 ** -decimals + 1e-12);
      });
    });
  });

  test('the saturated region is in one run alone, and 250 to 450 nm stay below the limit', () => {
    const marked = [...sample.files]
      .filter(([path, bytes]) => textOf(path, bytes).includes(overRange.mark))
      .map(([path]) => path);
    expect(marked).toEqual(['crude/arm-into-core.csv']);
    for (const traces of sample.drawn.values()) {
      for (const { wavelengthNm, absorbance } of traces) {
        const usable = absorbance.filter((_, i) => {
          const nm = wavelengthNm[i] ?? 0;
          return nm >= 250 && nm <= 450;
        });
        expect(Math.max(...usable)).toBeLessThan(2);
      }
    }
  });
});

describe('the truth', () => {
  test('fractions of the products sum to one and agree with ratio and concentrations', () => {
    for (const { fractions, ratioMonoToBis, flaskMolPerL } of [...truth.runs, ...truth.aliquots]) {
      expect(fractions.mono + fractions.bis).toBeCloseTo(1, 12);
      expect(fractions.mono / fractions.bis).toBeCloseTo(ratioMonoToBis, 12);
      expect(flaskMolPerL.mono / flaskMolPerL.bis).toBeCloseTo(ratioMonoToBis, 12);
    }
  });

  test('cores and arms charged are all found again, the lost arms as the by-product', () => {
    for (const run of sheet.runs ?? []) {
      const flask = truth.runs.find((one) => one.run === run.id)?.flaskMolPerL;
      if (flask === undefined) expect.unreachable();
      const volume = run.volumeL ?? Number.NaN;
      const cores = (flask.piperazine + flask.mono + flask.bis) * volume;
      const arms = (flask.arm + flask.mono + 2 * flask.bis + flask.hydrolysis) * volume;
      // Run r2's lost share is met by halving an interval 40 times, to 1e-12 of a rate of order
      // 0.1; everything else is closed to rounding.
      expect(cores / (run.chargedMol?.piperazine ?? 0)).toBeCloseTo(1, 9);
      expect(arms / (run.chargedMol?.arm ?? 0)).toBeCloseTo(1, 9);
    }
  });

  test('the scenario is the one that was asked for', () => {
    const [first, second] = truth.runs;
    expect(first?.armConversion).toBeCloseTo(0.97, 12);
    expect(second?.fractions.mono).toBeGreaterThan(0.05);
    expect(second?.fractions.mono).toBeLessThan(0.15);
    for (const { armShareLost } of truth.runs) {
      expect(armShareLost).toBeGreaterThanOrEqual(0.01);
      expect(armShareLost).toBeLessThanOrEqual(0.03);
    }
    const hidden = truth.aliquots.filter(({ hiddenBand }) => hiddenBand !== null);
    expect(hidden.map(({ aliquot }) => aliquot)).toEqual(['r2-a3']);
  });

  test('a cuvette holds the flask divided by the true dilution', () => {
    for (const { cuvetteMolPerL, flaskMolPerL, dilutionFactor } of truth.aliquots) {
      for (const id of absorbingSpecies) {
        expect((cuvetteMolPerL[id] * dilutionFactor) / flaskMolPerL[id]).toBeCloseTo(1, 12);
      }
    }
  });
});

describe('the draws', () => {
  const many = Array.from({ length: 400 }, (_, seed) => makeSample(seed));

  test('traces are the true spectra with the stated noise, in crude and standards', () => {
    const squares: number[] = [];
    for (const [id, absorbanceAt] of trueSpectra()) {
      const drawn = [...sample.drawn.values()].flat().find((trace) => trace.id === id);
      if (drawn === undefined) expect.unreachable();
      drawn.wavelengthNm.forEach((nm, i) => {
        const a = absorbanceAt(nm);
        const z = ((drawn.absorbance[i] ?? 0) - a) / noiseDeviation(photometricNoise, a);
        squares.push(z * z);
      });
    }
    // The mean of n squared normal deviates has the standard deviation sqrt(2/n); five of them.
    const mean = squares.reduce((sum, square) => sum + square, 0) / squares.length;
    expect(Math.abs(mean - 1)).toBeLessThan(5 * Math.sqrt(2 / squares.length));
  });

  test('stocks and dilutions are off by as much as the sheet says, and no more', () => {
    const dilutions = many.flatMap(({ truth: { aliquots } }) =>
      aliquots.map(({ run, dilutionFactor }) => {
        const nominal = run === 'r1' ? 2400 : 4000;
        return (dilutionFactor / nominal - 1) / aliquotDilutionRelativeUncertainty;
      }),
    );
    expectStandardNormalSpread(dilutions);
  });

  test('solutions of one stock share its error, and solutions of two stocks do not', () => {
    const covariance = (a: string, b: string): number => {
      const products = many.map((one) => relativeError(one, a) * relativeError(one, b));
      return products.reduce((sum, product) => sum + product, 0) / many.length;
    };
    // 400 draws: a covariance of errors of 0.72 % each is known to about (0.72 %)²/20 = 2.6e-6;
    // five of those part it from the stock's 3.6e-5 and from 0.
    const tolerance = 1.3e-5;
    const shared = stockRelativeUncertainty ** 2;
    expect(Math.abs(covariance('mono-A1', 'mono-A2') - shared)).toBeLessThan(tolerance);
    expect(Math.abs(covariance('mono-A1', 'mono-B1'))).toBeLessThan(tolerance);
    expect(Math.abs(covariance('mono-A1', 'bis-A1'))).toBeLessThan(tolerance);
  });
});

/** The noiseless absorbance of every trace, from the truth and the stated bands. */
function trueSpectra(): readonly (readonly [string, (nm: number) => number])[] {
  const standards = truth.standards.map(({ standard, concentrationMolPerL }) => {
    const species = absorbingSpecies.find((id) => standard.startsWith(`${id}-`));
    if (species === undefined) expect.unreachable();
    return [
      standard,
      (nm: number) => concentrationMolPerL * molarAbsorptivity(species, nm),
    ] as const;
  });
  const aliquots = truth.aliquots.map(({ aliquot, cuvetteMolPerL, offset, hiddenBand }) => {
    const at = (nm: number): number => {
      const known = absorbingSpecies.map((id) => cuvetteMolPerL[id] * molarAbsorptivity(id, nm));
      const z = (nm - (hiddenBand?.centreNm ?? 0)) / (hiddenBand?.standardDeviationNm ?? 1);
      const hidden = (hiddenBand?.absorbance ?? 0) * Math.exp(-0.5 * z * z);
      return known.reduce((sum, a) => sum + a, offset + hidden);
    };
    return [aliquot, at] as const;
  });
  return [...standards, ...aliquots];
}

function relativeError(one: typeof sample, standard: string): number {
  const stated = one.sheet.standards?.find(({ id }) => id === standard)?.concentrationMolPerL;
  const drawn = one.truth.standards.find((each) => each.standard === standard);
  return (drawn?.concentrationMolPerL ?? Number.NaN) / (stated ?? Number.NaN) - 1;
}

/** Mean 0 and variance 1, each within five of its own standard deviations. */
function expectStandardNormalSpread(deviates: readonly number[]): void {
  const n = deviates.length;
  const mean = deviates.reduce((sum, z) => sum + z, 0) / n;
  const variance = deviates.reduce((sum, z) => sum + z * z, 0) / n;
  expect(Math.abs(mean)).toBeLessThan(5 / Math.sqrt(n));
  expect(Math.abs(variance - 1)).toBeLessThan(5 * Math.sqrt(2 / n));
}
