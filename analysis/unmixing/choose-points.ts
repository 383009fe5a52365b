import type { FitSettings } from '../sheet/defaults.ts';
import type { Spectrum } from '../spectrum/spectrum.ts';
import type { MolarAbsorptivity } from '../standards/molar-absorptivity.ts';

/** Why a point of the crude is not fitted; 0 is used. */
export const pointUse = {
  used: 0,
  outsideWindow: 1,
  excluded: 2,
  missing: 3,
  aboveUpperAbsorbance: 4,
  noStandard: 5,
} as const;

/** One entry per point of the crude: a value of `pointUse`. The first reason that holds is given. */
export function choosePoints(
  crude: Spectrum,
  standards: readonly MolarAbsorptivity[],
  settings: FitSettings,
): Uint8Array {
  const use = new Uint8Array(crude.values.length);
  const [low, high] = settings.windowNm ?? [0, Number.POSITIVE_INFINITY];
  for (let i = 0; i < use.length; i++) {
    const nm = crude.wavelengthNm[i]!;
    const absorbance = crude.values[i]!;
    if (nm < low || nm > high) use[i] = pointUse.outsideWindow;
    else if (settings.excludeNm.some(([from, to]) => nm >= from && nm <= to)) {
      use[i] = pointUse.excluded;
    } else if (standards.some(({ epsilon }) => Number.isNaN(epsilon[i]))) {
      use[i] = pointUse.noStandard;
    } else if (Number.isNaN(absorbance)) use[i] = pointUse.missing;
    else if (absorbance > settings.upperAbsorbance) use[i] = pointUse.aboveUpperAbsorbance;
  }
  return use;
}

/** Positions of the points that are fitted. */
export function usedPoints(use: Uint8Array): Int32Array {
  const found = new Int32Array(use.length);
  let count = 0;
  for (let i = 0; i < use.length; i++) if (use[i] === pointUse.used) found[count++] = i;
  return found.slice(0, count);
}
