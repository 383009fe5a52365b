import type { Conditions } from '../analysis/simulated.ts';
import { percent, redrawn, shareError } from './redraw.ts';

function raised(code: string, draws: number, changes: Partial<Conditions>): number {
  let count = 0;
  for (const { result } of redrawn(draws, changes)) {
    if (result.doubts.some((doubt) => doubt.code === code)) count++;
  }
  return count / draws;
}

const tenfold = { constant: 3e-3, transmittance: 2e-3 };

/** False alarms of the doubts that are tests, where the model is right, and the power of the hidden-band test. */
export function alarms(draws: number): void {
  console.log(`False alarms, ${draws} redraws (error at 1 % ${percent(shareError(0.01, draws))})`);
  const clean: readonly (readonly [string, Partial<Conditions>])[] = [
    ['white noise', {}],
    ['white noise, 2 nm', { stepNm: 2 }],
    ['smoothed over 5 points', { smoothing: 5 }],
    ['smoothed over 5 points, 2 nm', { smoothing: 5, stepNm: 2 }],
    ['offset of 0.1 nm', { shiftNm: 0.1 }],
    ['absorbance 1.5', { absorbance: 1.5 }],
    ['noise stated', { noiseStated: true }],
  ];
  const codes = [
    'unexplained-band',
    'wavelength-offset',
    'nonlinear-standard',
    'window-sensitive',
    'saturated',
    'negative-amount',
  ];
  console.log(`  ${'conditions'.padEnd(30)} ${codes.map((code) => code.padStart(19)).join('')}`);
  for (const [name, changes] of clean) {
    const counts = new Map(codes.map((code) => [code, 0]));
    for (const { result } of redrawn(draws, changes)) {
      for (const code of new Set(result.doubts.map((doubt) => doubt.code as string))) {
        if (counts.has(code)) counts.set(code, (counts.get(code) ?? 0) + 1);
      }
    }
    const shown = codes.map((code) => percent((counts.get(code) ?? 0) / draws).padStart(19));
    console.log(`  ${name.padEnd(30)} ${shown.join('')}`);
  }
  console.log('Power of unexplained-band');
  const hidden: readonly (readonly [string, Partial<Conditions>])[] = [
    ['2 % at 300 nm, width 12 nm', { hidden: [300, 12, 0.02] }],
    ['2 % at 300 nm, smoothed', { hidden: [300, 12, 0.02], smoothing: 5 }],
    ['2 % at 395 nm, width 8 nm', { hidden: [395, 8, 0.02] }],
    ['5 % at 300 nm, noise tenfold', { hidden: [300, 12, 0.05], noise: tenfold }],
    ['5 % at 395 nm, noise tenfold', { hidden: [395, 8, 0.05], noise: tenfold }],
  ];
  const fewer = Math.ceil(draws / 4);
  for (const [name, changes] of hidden) {
    const power = raised('unexplained-band', fewer, { ...changes, absorbance: 0.8 });
    console.log(`  ${name.padEnd(30)} ${percent(power)}`);
  }
}
