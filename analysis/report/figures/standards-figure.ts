import { speciesLabel } from '../../sheet/defaults.ts';
import type { Sheet } from '../../sheet/schema.ts';
import type { StandardCurves } from '../../split/results.ts';
import { escaped } from '../html.ts';
import { speciesLook } from '../species-look.ts';
import { axes, type Panel, pathOf, xAt, yAt } from './axes.ts';

/** Molar absorptivity of every species, named at its highest point away from the edges, as SVG text. */
export function standardsFigureSvg(sheet: Sheet, standards: readonly StandardCurves[]): string {
  let [low, high, top] = [Number.POSITIVE_INFINITY, 0, 0];
  for (const { wavelengthNm, molarAbsorptivity } of standards) {
    low = Math.min(low, wavelengthNm[0] ?? low);
    high = Math.max(high, wavelengthNm.at(-1) ?? high);
    for (const value of molarAbsorptivity) if (value > top) top = value;
  }
  if (!(high > low)) return '';
  const panel: Panel = {
    left: 62,
    top: 12,
    width: 608,
    height: 210,
    x: [low, high],
    y: [0, 1.06 * top || 1],
  };
  const curves = standards.map(({ species, wavelengthNm, molarAbsorptivity }, k) => {
    const { colour, dash } = speciesLook(k);
    const pattern = dash === '' ? '' : ` stroke-dasharray="${dash}"`;
    const peak = peakOf(wavelengthNm, molarAbsorptivity);
    const [x, y] = [xAt(panel, wavelengthNm[peak] ?? 0), yAt(panel, molarAbsorptivity[peak] ?? 0)];
    return `<path d="${pathOf(panel, wavelengthNm, molarAbsorptivity)}" fill="none" stroke="${colour}" stroke-width="1.5"${pattern}/><text class="label" x="${x.toFixed(1)}" y="${(y - 6).toFixed(1)}" fill="${colour}" text-anchor="middle">${escaped(speciesLabel(sheet, species))}</text>`;
  });
  return `<svg class="figure" viewBox="0 0 680 262" role="img" aria-label="Molar absorptivity of the standards">${axes(panel, 'wavelength, nm', 'ε, L mol⁻¹ cm⁻¹')}${curves.join('')}</svg>`;
}

function peakOf(wavelengthNm: Float64Array, values: Float64Array): number {
  const from = Math.floor(0.12 * wavelengthNm.length);
  let best = from;
  for (let i = from; i < Math.floor(0.92 * wavelengthNm.length); i++) {
    const value = values[i] ?? 0;
    const isPeak = value >= (values[i - 1] ?? 0) && value >= (values[i + 1] ?? 0);
    if (isPeak && (best === from || value > (values[best] ?? 0))) best = i;
  }
  return best;
}
