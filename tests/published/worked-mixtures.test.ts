import * as v from 'valibot';
import { describe, expect, it } from 'vitest';
import { factorise, type OrthogonalFactors } from '../../analysis/unmixing/orthogonal.ts';
import { type Example, file, relative, spreadOf, tight, workupSchema } from './mixtures.ts';

// Twelve worked mixtures of textbooks. Source and status (read, from memory, reproduced, computed) stand
// beside each in values/worked-mixtures.json; `computed` is mpmath, 40 digits, throughout.
const { examples } = file;

/**
 * What the textbooks print, by example and species, as they print it: the figures fix the tolerance,
 * half a unit of the last.
 */
const printed: Readonly<Record<string, readonly string[]>> = {
  'dichromate-permanganate-440-545': ['1.0e-3', '2.95e-4'],
  'cobalt-nickel-quinoxalinedithiol': ['1.13e-5', '1.17e-5'],
  'nickel-cobalt-salicylaldoxime': ['3.2e-5', '9.1e-5'],
  'nickel-cobalt-2cm-cell': ['9.35e-6', '1.47e-6'],
  'iron-copper-hexacyanoruthenate': ['1.8e-5', '1.26e-4'],
  'chromium-cobalt-400-505': ['8.86e-3', '3.60e-2'],
  'copper-edta-one': ['3.55e-3'],
  'copper-cobalt-edta-two': ['6.06e-3', '4.37e-3'],
  'copper-cobalt-nickel-edta-three': ['9.60e-3', '4.37e-3', '1.382e-2'],
  'permanganate-dichromate-five': ['8.36e-5', '1.78e-4'],
};

/** Printed figures that do not follow from the printed inputs: which, and why. */
const misprints: Readonly<Record<string, { positions: readonly number[]; why: string }>> = {
  'dichromate-permanganate-440-545': {
    positions: [1],
    why: 'the page rounds 2375 to 2380: with that it comes out as printed',
  },
  'nickel-cobalt-2cm-cell': {
    positions: [1],
    why: 'rounded on the way: the last digit is one off',
  },
  'copper-cobalt-edta-two': {
    positions: [0, 1],
    why: 'the printed answers do not satisfy the equations',
  },
  'copper-cobalt-nickel-edta-three': {
    positions: [0, 1, 2],
    why: 'the printed answers do not satisfy the equations',
  },
};

/** Agreement to the printed figures: half a unit of the last, rounding of ties included. */
function isAsPrinted(value: number | undefined, text: string): boolean {
  const [mantissa = '', exponent = '0'] = text.split('e');
  const decimals = (mantissa.split('.')[1] ?? '').length;
  const half = 0.5 * 10 ** (Number(exponent) - decimals);
  return Math.abs((value ?? Number.NaN) - Number(text)) <= half * (1 + 1e-9);
}

function signalOf({ absorbance, blank }: Example): Float64Array {
  return Float64Array.from(absorbance, (value, i) => value - (blank?.[i] ?? 0));
}

function factorsOf(example: Example): OrthogonalFactors {
  return factorise(
    example.absorptivity.map((values) =>
      Float64Array.from(values, (value) => value * example.pathLengthCm),
    ),
  );
}

function named(id: string): Example {
  const example = examples.find((each) => each.id === id);
  if (!example) throw new Error(`no example ${id}`);
  return example;
}

describe('worked mixtures from textbooks', () => {
  it('are twelve, ten of them with a printed answer', () => {
    expect(examples).toHaveLength(12);
    expect(new Set(Object.keys(printed).map(named)).size).toBe(10);
  });

  it.each(examples.map((example) => [example.id, example.status, example] as const))(
    '%s (%s)',
    (_, __, example) => {
      const answer = factorsOf(example).solve(signalOf(example));
      expect(answer).toHaveLength(example.computed.x.length);
      for (const [k, right] of example.computed.x.entries()) {
        expect(relative(answer[k], right)).toBeLessThan(tight);
      }
    },
  );

  it.each(Object.entries(printed))('%s: the printed figures, or why not', (id, texts) => {
    const example = named(id);
    const answer = factorsOf(example).solve(signalOf(example));
    const wrong = texts.flatMap((text, k) => (isAsPrinted(answer[k], text) ? [] : [k]));
    // a misprint that came right would be as telling as a figure that came out wrong
    expect(wrong, misprints[id]?.why).toEqual(misprints[id]?.positions ?? []);
    for (const [name, value] of Object.entries(example.publishedAnswer ?? {})) {
      expect(Number(texts[example.species.indexOf(name)])).toBe(value);
    }
  });

  it('dichromate and permanganate come out as printed with the rounding of that page', () => {
    const example = named('dichromate-permanganate-440-545');
    const [dichromate = [], [first = Number.NaN] = []] = example.absorptivity;
    const answer = factorise([Float64Array.from(dichromate), Float64Array.of(first, 2380)]).solve(
      signalOf(example),
    );
    expect(isAsPrinted(answer[0], '1.0e-3')).toBe(true);
    expect(isAsPrinted(answer[1], '2.95e-4')).toBe(true);
  });

  it('the equations of the two wrong answers are not met by what is printed', () => {
    for (const id of ['copper-cobalt-edta-two', 'copper-cobalt-nickel-edta-three']) {
      const { absorptivity, absorbance } = named(id);
      const amounts = (printed[id] ?? []).map(Number);
      const misses = absorbance.map((value, i) =>
        Math.abs(
          value - amounts.reduce((sum, amount, k) => sum + amount * (absorptivity[k]?.[i] ?? 0), 0),
        ),
      );
      // the absorbances are printed to 0.001: more than ten times that is no rounding
      expect(Math.max(...misses)).toBeGreaterThan(0.01);
    }
  });

  it.each(
    examples.flatMap((example) =>
      example.standards ? [[example.id, example, example.standards] as const] : [],
    ),
  )('%s: the same from the standards as from the absorptivities', (_, example, standards) => {
    const amounts = standards.map(({ molPerL, ppm }) => molPerL ?? ppm ?? Number.NaN);
    const shares = factorise(
      standards.map(({ absorbance }) => Float64Array.from(absorbance)),
    ).solve(signalOf(example));
    for (const [k, right] of example.computed.x.entries()) {
      expect(relative((shares[k] ?? Number.NaN) * (amounts[k] ?? Number.NaN), right)).toBeLessThan(
        tight,
      );
    }
  });

  it('the overdetermined ones have their standard deviations and correlation', () => {
    const overdetermined = examples.filter(({ computed }) => computed.sd !== undefined);
    expect(overdetermined.map(({ id }) => id)).toEqual([
      'titanium-vanadium-peroxide-five',
      'permanganate-dichromate-five',
    ]);
    for (const { absorptivity, absorbance, computed } of overdetermined) {
      const columns = absorptivity.map((values) => Float64Array.from(values));
      const signal = Float64Array.from(absorbance);
      const spread = spreadOf(columns, signal, factorise(columns).solve(signal));
      // residuals of 0.002 are differences of absorbances of 0.7: they lose three digits of sixteen
      expect(relative(spread.residualSd, computed.residualSd)).toBeLessThan(1e-12);
      expect(relative(spread.correlation, computed.correlation)).toBeLessThan(tight);
      for (const [k, right] of (computed.sd ?? []).entries()) {
        expect(relative(spread.sd[k], right)).toBeLessThan(1e-12);
      }
    }
  });

  it('cobalt and nickel in the sample, mg/kg (the ppm on the page are wrong)', () => {
    const example = named('cobalt-nickel-quinoxalinedithiol');
    const answer = factorsOf(example).solve(signalOf(example));
    const {
      sampleG,
      dissolvedMl,
      aliquotMl = 0,
      madeUpMl = 0,
      molarMass,
    } = v.parse(workupSchema, example.workup);
    const litres = (dissolvedMl / 1000) * (madeUpMl / aliquotMl);
    for (const [k, name] of (['Co', 'Ni'] as const).entries()) {
      const grams = (answer[k] ?? Number.NaN) * litres * (molarMass[name] ?? Number.NaN);
      expect(relative((grams / sampleG) * 1e6, example.massFractions?.[name])).toBeLessThan(tight);
    }
  });

  it('nickel and cobalt in the 2 cm cell, mass percent as printed', () => {
    const example = named('nickel-cobalt-2cm-cell');
    const answer = factorsOf(example).solve(signalOf(example));
    const { sampleG, dissolvedMl, molarMass } = v.parse(workupSchema, example.workup);
    for (const [k, [name, text]] of Object.entries({ Ni: '0.103', Co: '0.016' }).entries()) {
      const grams = (answer[k] ?? 0) * (dissolvedMl / 1000) * (molarMass[name] ?? Number.NaN);
      const percent = (grams / sampleG) * 100;
      expect(relative(percent, example.massPercentComputed?.[name])).toBeLessThan(tight);
      expect(example.publishedMassPercent?.[name]).toBe(Number(text));
      expect(isAsPrinted(percent, text)).toBe(true);
    }
  });

  it('chromium and manganese in steel: two chromium in a dichromate', () => {
    const example = named('chromium-manganese-in-steel');
    const answer = factorsOf(example).solve(signalOf(example));
    const { sampleG, dissolvedMl, molarMass } = v.parse(workupSchema, example.workup);
    for (const [k, [name, atoms]] of Object.entries({ Cr: 2, Mn: 1 }).entries()) {
      const grams = (answer[k] ?? 0) * atoms * (dissolvedMl / 1000) * (molarMass[name] ?? 0);
      expect(relative((grams / sampleG) * 100, example.massPercentComputed?.[name])).toBeLessThan(
        tight,
      );
    }
  });
});
