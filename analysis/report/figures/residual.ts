import { type AliquotCurves, leftOut } from '../../split/results.ts';
import { areaOf, type Panel, pathOf, xAt } from './axes.ts';

/** The residual of the points used with the band of ±2σ, in milliabsorbance; what is beyond the strip is marked at its edge. */
export function residualSvg(curves: AliquotCurves, panel: Panel): string {
  const { wavelengthNm, residual, expectedSd, use } = curves;
  const milli = (of: Float64Array, factor: number): Float64Array =>
    of.map((value, i) => (use[i] === leftOut.used ? 1000 * factor * value : Number.NaN));
  const values = milli(residual, 1);
  const band = areaOf(panel, wavelengthNm, milli(expectedSd, -2), milli(expectedSd, 2));
  const marks = Array.from(wavelengthNm.keys()).map((i) => {
    const value = values[i] ?? Number.NaN;
    const x = xAt(panel, wavelengthNm[i] ?? 0);
    if (value > panel.y[1]) return triangle(x, panel.top, -4);
    if (value < panel.y[0]) return triangle(x, panel.top + panel.height, 4);
    return '';
  });
  return `<path class="band" d="${band}"/><path class="residual" d="${pathOf(panel, wavelengthNm, values)}"/>${marks.join('')}`;
}

/** So that the strip shows the noise: a few points at a steep edge may lie beyond it. */
export function residualRange({ residual, expectedSd, use }: AliquotCurves): [number, number] {
  const sizes: number[] = [];
  for (const [i, reason] of use.entries()) {
    const size = 1000 * Math.max(Math.abs(residual[i] ?? 0), 2 * (expectedSd[i] ?? 0));
    if (reason === leftOut.used && Number.isFinite(size)) sizes.push(size);
  }
  sizes.sort((a, b) => a - b);
  const reach = 1.3 * Math.max(sizes[Math.floor(0.94 * (sizes.length - 1))] ?? 0, 0.5);
  return [-reach, reach];
}

function triangle(x: number, y: number, rise: number): string {
  const at = (dx: number, dy: number): string => `${(x + dx).toFixed(1)} ${(y + dy).toFixed(1)}`;
  return `<path class="beyond" d="M${at(-2.5, 0)}L${at(2.5, 0)}L${at(0, rise)}Z"/>`;
}
