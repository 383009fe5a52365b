import type { Sheet } from '../../sheet/schema.ts';
import type { StandardCurves } from '../../split/results.ts';
import { lookOf } from '../species-look.ts';
import { axes, type Panel, pathOf, xAt, yAt } from './axes.ts';
import { figureLabel } from './figure-label.ts';

/** Molar absorptivity of every species, named at its highest point away from the edges, as SVG text. */
export function standardsFigureSvg(sheet: Sheet, standards: readonly StandardCurves[]): string {
  const panel = panelOf(standards);
  if (!panel) return '';
  const placed: Label[] = [];
  const curves = standards.map(({ species, wavelengthNm, molarAbsorptivity }) => {
    const { colour, dash } = lookOf(sheet, species);
    const pattern = dash === '' ? '' : ` stroke-dasharray="${dash}"`;
    const peak = peakOf(wavelengthNm, molarAbsorptivity);
    const { text, halfWidth } = figureLabel(sheet, species);
    const label = freeSpot(
      {
        x: xAt(panel, wavelengthNm[peak] ?? panel.x[0]),
        y: yAt(panel, Math.min(molarAbsorptivity[peak] ?? 0, panel.y[1])) - 6,
        halfWidth,
      },
      placed,
      panel,
    );
    placed.push(label);
    return `<path d="${pathOf(panel, wavelengthNm, molarAbsorptivity)}" fill="none" stroke="${colour}" stroke-width="1.5"${pattern}/><text class="label" x="${label.x.toFixed(1)}" y="${label.y.toFixed(1)}" fill="${colour}" text-anchor="middle">${text}</text>`;
  });
  return `<svg class="figure" viewBox="0 0 680 262" role="img" aria-label="Molar absorptivity of the standards">${axes(panel, 'wavelength, nm', 'ε, L mol⁻¹ cm⁻¹')}${curves.join('')}</svg>`;
}

function panelOf(standards: readonly StandardCurves[]): Panel | null {
  let [low, high, bottom, top] = [Number.POSITIVE_INFINITY, 0, 0, 0];
  for (const { wavelengthNm, molarAbsorptivity } of standards) {
    low = Math.min(low, wavelengthNm[0] ?? low);
    high = Math.max(high, wavelengthNm.at(-1) ?? high);
    for (const value of molarAbsorptivity) {
      if (!Number.isFinite(value)) continue;
      top = Math.max(top, value);
      bottom = Math.min(bottom, value);
    }
  }
  if (!(high > low)) return null;
  return {
    left: 62,
    top: 20,
    width: 608,
    height: 202,
    x: [low, high],
    y: [1.06 * bottom, 1.06 * top || 1],
  };
}

interface Label {
  readonly x: number;
  readonly y: number;
  readonly halfWidth: number;
}

const lineHeight = 12;

/** The nearest place above or under the wanted one where a label lies on none of the others. */
function freeSpot(wanted: Label, placed: readonly Label[], panel: Panel): Label {
  const isFree = (y: number): boolean =>
    y >= lineHeight &&
    y <= panel.top + panel.height &&
    !placed.some(
      (other) =>
        Math.abs(other.x - wanted.x) < other.halfWidth + wanted.halfWidth &&
        Math.abs(other.y - y) < lineHeight,
    );
  // each label can take two steps on either side
  for (let step = 0; step <= 4 * placed.length; step++) {
    const away = Math.ceil(step / 2) * lineHeight;
    const y = wanted.y + (step % 2 === 1 ? -away : away);
    if (isFree(y)) return { ...wanted, y };
  }
  return wanted;
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
