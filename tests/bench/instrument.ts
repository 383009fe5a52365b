import type { Conditions } from '../analysis/simulated.ts';
import { coverageOf, percent, redrawn, shareError } from './redraw.ts';

/** Wavelength offset and stray light: found how well, and what is left of the bias they cause. */
export function instrument(draws: number): void {
  console.log(`Wavelength offset of 0.3 nm, ${draws} redraws`);
  const exact: Partial<Conditions> = { shiftNm: 0.3, stock: 0, dilution: 0 };
  const fits: readonly (readonly [string, Conditions['fit']])[] = [
    ['ignored', {}],
    ['fitted', { shift: 'common' }],
    ['fitted, prior 0.1 nm', { shift: 'common', shiftStandardUncertaintyNm: 0.1 }],
    ['fitted, prior 0.3 nm', { shift: 'common', shiftStandardUncertaintyNm: 0.3 }],
  ];
  console.log('  fit                    offset ± spread (u)        bias of mono : bis   spread');
  for (const [name, fit] of fits) {
    const shifts: number[] = [];
    const ratios: number[] = [];
    let u = 0;
    for (const { result } of redrawn(draws, { ...exact, fit })) {
      shifts.push(result.fit.shiftNm.value ?? 0);
      u += (result.fit.shiftNm.standardUncertainty ?? 0) / draws;
      ratios.push((result.ratios[0]?.value.value ?? Number.NaN) - 1);
    }
    const [shift, ratio] = [moments(shifts), moments(ratios)];
    console.log(
      `  ${name.padEnd(22)} ${shift.mean.toFixed(4)} ± ${shift.sd.toFixed(4)} (${u.toFixed(4)})   ${(100 * ratio.mean).toFixed(3).padStart(8)} %          ${(100 * ratio.sd).toFixed(3)} %`,
    );
  }
  console.log(
    `Stray light, absorbance 1.5, coverage over ${draws} redraws (error ${percent(shareError(0.95, draws))})`,
  );
  for (const strayLight of [0.0005, 0.002, 0.01]) {
    const each = (['ignored', 'stated', 'fitted'] as const).map((how) => {
      const fit: Conditions['fit'] =
        how === 'ignored' ? {} : { strayLight: how === 'stated' ? strayLight : 'fit' };
      const conditions = { strayLight, fit, absorbance: 1.5, fraction: 0.05 };
      return `${how} ${percent(coverageOf(draws, conditions).inside / draws)}`;
    });
    console.log(`  ${percent(strayLight)}: ${each.join(', ')}`);
  }
}

function moments(values: readonly number[]): { mean: number; sd: number } {
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
  const squares = values.reduce((sum, value) => sum + (value - mean) ** 2, 0);
  return { mean, sd: Math.sqrt(squares / (values.length - 1)) };
}
