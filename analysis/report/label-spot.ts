import { type AliquotCurves, leftOut } from '../split/results.ts';

/** Middle of the layer at the wavelength where it is thickest, away from labels that are there. */
export function labelSpot(
  curves: Pick<AliquotCurves, 'wavelengthNm' | 'baseline' | 'contributions' | 'use'>,
  layer: number,
  [low, high]: readonly [number, number],
  top: number,
  placed: readonly { readonly x: number; readonly y: number }[],
): { readonly x: number; readonly y: number; readonly index: number } | null {
  const span = high - low;
  let best: { x: number; y: number; index: number } | null = null;
  let bestScore = 0;
  let before = 0;
  let xBefore = low;
  for (const [index, x] of curves.wavelengthNm.entries()) {
    if (x < low + 0.08 * span || x > high - 0.12 * span) continue;
    const thickness = curves.contributions[layer]?.absorbance[index] ?? 0;
    let below = curves.baseline[index] ?? 0;
    for (let k = 0; k < layer; k++) below += curves.contributions[k]?.absorbance[index] ?? 0;
    const y = below + thickness / 2;
    if (!(y < top) || curves.use[index] !== leftOut.used) continue;
    const crowd = placed.some(
      (spot) => Math.abs(spot.x - x) < 0.22 * span && Math.abs(spot.y - y) < 0.075 * top,
    );
    // on a steep flank a label would say little of where its layer lies
    const rise = (Math.abs(y - before) * (span / (x - xBefore || 1))) / top;
    before = y;
    xBefore = x;
    const score = (thickness * (crowd ? 0.2 : 1)) / (1 + 0.15 * rise * rise);
    if (score > bestScore) {
      bestScore = score;
      best = { x, y, index };
    }
  }
  return best;
}
