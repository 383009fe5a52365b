import { describe, expect, it } from 'vitest';
import { factorise } from '../../analysis/unmixing/orthogonal.ts';
import { file, relative, spreadOf, tight } from './mixtures.ts';

// Sources and status stand beside each in values/worked-mixtures.json; what is checked against is
// mpmath's, 40 digits.
describe("the trade's own pairs", () => {
  it('the equations for chlorophyll a and b are the pseudo-inverse of their absorptivities (from memory)', () => {
    const pair = file.chlorophyll.find(({ millimolarAbsorptivity }) => millimolarAbsorptivity);
    const { a = [], b = [] } = pair?.millimolarAbsorptivity ?? {};
    const rows = factorise([Float64Array.from(a), Float64Array.from(b)]).pseudoInverse();
    const right = [pair?.inverseComputed?.a ?? [], pair?.inverseComputed?.b ?? []];
    expect(right.flat()).toHaveLength(4);
    for (const [k, row] of right.entries()) {
      for (const [i, value] of row.entries()) {
        // per mmol/L there, per µmol/L (nmol/mL) in the trade's equations
        expect(relative((rows[k]?.[i] ?? Number.NaN) * 1000, value)).toBeLessThan(tight);
      }
    }
  });

  it('oxy- and deoxyhaemoglobin, condition 37 (table read on a found page)', () => {
    const { rows, check } = file.haemoglobin;
    const columns = [
      Float64Array.from(rows, ([, oxy]) => oxy),
      Float64Array.from(rows, ([, , deoxy]) => deoxy),
    ];
    const signal = Float64Array.from(check.absorbance);
    const factors = factorise(columns);
    const answer = factors.solve(signal);
    for (const [k, right] of check.leastSquares.x.entries()) {
      // the refined answer; the rounding of the absorbances to doubles is multiplied by the condition
      expect(relative(answer[k], right)).toBeLessThan(37 * Number.EPSILON);
    }
    const spread = spreadOf(columns, signal, answer);
    // residuals of 3e-5 are differences of absorbances of 1: they lose five digits of sixteen
    expect(relative(spread.residualSd, check.leastSquares.residualSd)).toBeLessThan(1e-10);
    for (const [k, right] of check.leastSquares.sd.entries()) {
      expect(relative(spread.sd[k], right)).toBeLessThan(1e-10);
    }
    // 1 minus the correlation is 1.5e-3: three digits go
    expect(relative(1 + spread.correlation, 1 + check.leastSquares.correlation)).toBeLessThan(
      1e-11,
    );
    expect(relative(factors.condition, check.conditionColumnScaled)).toBeLessThan(1e-12);
  });
});
