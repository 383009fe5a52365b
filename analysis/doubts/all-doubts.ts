import { baselineLarge } from './baseline-large.ts';
import { belowDetection } from './below-detection.ts';
import { beyondStandards } from './beyond-standards.ts';
import type { Doubt } from './doubt.ts';
import type { DoubtTest, Evidence } from './evidence.ts';
import { lookalikeStandards } from './lookalike-standards.ts';
import { negativeAmount } from './negative-amount.ts';
import { nonlinearStandard } from './nonlinear-standard.ts';
import { saturated } from './saturated.ts';
import { strayLight } from './stray-light.ts';
import { uncertaintyNotGiven } from './uncertainty-not-given.ts';
import { unexplainedBand } from './unexplained-band.ts';
import { wavelengthOffset } from './wavelength-offset.ts';
import { windowSensitive } from './window-sensitive.ts';

/** Every doubt, in the order in which a chemist should look at them. */
const tests: readonly DoubtTest[] = [
  saturated,
  strayLight,
  wavelengthOffset,
  unexplainedBand,
  windowSensitive,
  lookalikeStandards,
  negativeAmount,
  baselineLarge,
  beyondStandards,
  nonlinearStandard,
  belowDetection,
  uncertaintyNotGiven,
];

export function allDoubts(evidence: Evidence): Doubt[] {
  return tests.flatMap((test) => test(evidence));
}
