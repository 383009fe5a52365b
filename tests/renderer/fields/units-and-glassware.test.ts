import { describe, expect, it } from 'vitest';
import { keptDilution, parseDilution } from '../../../renderer/fields/parse-dilution.ts';
import { parsePathLength } from '../../../renderer/fields/parse-entry.ts';

describe('a path length', () => {
  it('is in cm, or in the unit that was typed', () => {
    expect(parsePathLength('0,5 cm')).toEqual({ ok: true, value: 0.5 });
    expect(parsePathLength('2 mm')).toEqual({ ok: true, value: 0.2 });
    expect(parsePathLength('1')).toEqual({ ok: true, value: 1 });
    expect(parsePathLength('')).toEqual({ ok: true, value: undefined });
  });

  it('of another unit, or none at all, is refused', () => {
    expect(parsePathLength('1 m').ok).toBe(false);
    expect(parsePathLength('0 mm').ok).toBe(false);
  });
});

describe('a dilution typed anew', () => {
  const typed = (text: string) => {
    const entry = parseDilution(text);
    if (!entry.ok) throw new Error(entry.message);
    return entry.value;
  };
  const before = {
    relativeStandardUncertainty: 0.005,
    steps: [
      { takeMl: 1, takeWith: 'pipette-A', toMl: 100, toWith: 'flask-A' },
      { takeMl: 5, takeWith: 'pipette-B', toMl: 50 },
    ],
  };

  it('reads "then" between its steps', () => {
    expect(typed('1 → 100 mL, then 5 -> 50 mL')).toEqual({
      steps: [
        { takeMl: 1, toMl: 100 },
        { takeMl: 5, toMl: 50 },
      ],
    });
  });

  it('keeps its uncertainty, and the glassware of the steps that stay', () => {
    expect(keptDilution(before, typed('1 → 100; 5 → 25'))).toEqual({
      relativeStandardUncertainty: 0.005,
      steps: [before.steps[0], { takeMl: 5, toMl: 25 }],
    });
  });

  it('as a factor lets the steps go and keeps the uncertainty', () => {
    expect(keptDilution(before, typed('2000'))).toEqual({
      relativeStandardUncertainty: 0.005,
      factor: 2000,
    });
  });

  it('as nothing is no dilution', () => {
    expect(keptDilution(before, typed(''))).toBeUndefined();
  });
});
