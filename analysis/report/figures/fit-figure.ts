import type { Doubt } from '../../doubts/doubt.ts';
import type { Sheet } from '../../sheet/schema.ts';
import { type AliquotCurves, leftOut } from '../../split/results.ts';
import { escaped } from '../html.ts';
import { labelSpot } from '../label-spot.ts';
import { lookOf } from '../species-look.ts';
import { areaOf, axes, type Panel, pathOf, xAt, yAt } from './axes.ts';
import { figureLabel } from './figure-label.ts';
import { leftOutSvg } from './left-out.ts';
import { residualRange, residualSvg } from './residual.ts';

const width = 680;
const height = 376;
/** With more points than this they would touch: the measured curve is drawn as a line. */
const mostPoints = 110;

/** The measured curve on the stacked contributions, and the residual with its ±2σ band, as SVG text. */
export function fitFigureSvg(
  sheet: Sheet,
  curves: AliquotCurves,
  doubts: readonly Doubt[],
): string {
  const { wavelengthNm } = curves;
  const x = [(wavelengthNm[0] ?? 0) - 2, (wavelengthNm.at(-1) ?? 1) + 2] as const;
  const frame = { left: 54, width: 618, x };
  const upper: Panel = { ...frame, top: 22, height: 216, y: absorbanceRange(curves) };
  const lower: Panel = { ...frame, top: 254, height: 80, y: residualRange(curves) };
  const parts = [
    leftOutSvg(curves, upper, lower),
    axes(upper, null, 'absorbance'),
    axes(lower, 'wavelength, nm', 'residual, mAU', 4),
    stack(sheet, curves, upper),
    measured(curves, upper),
    residualSvg(curves, lower),
    labels(sheet, curves, upper),
    brackets(doubts, upper),
  ];
  return `<svg class="figure" viewBox="0 0 ${width} ${height}" role="img" aria-label="${escaped(`Fit of aliquot ${curves.aliquot}`)}">${parts.join('')}</svg>`;
}

/** What the signs of the figure mean, for under it. */
export const fitFigureCaption =
  'Measured absorbance (dark) on the contributions of the species laid on one another; below, what is left, with the band of ±2 σ that noise explains. Hatched: left out. Triangles: beyond the strip.';

function stack(sheet: Sheet, curves: AliquotCurves, panel: Panel): string {
  const { wavelengthNm, baseline, contributions } = curves;
  let below = baseline;
  return contributions
    .map(({ species, absorbance }) => {
      const top = below.map((value, i) => value + (absorbance[i] ?? Number.NaN));
      const area = areaOf(panel, wavelengthNm, below, top);
      // beyond the panel there is no edge to draw, while the area goes up to its top
      const shown = top.map((value) => (value > panel.y[1] ? Number.NaN : value));
      const edge = pathOf(panel, wavelengthNm, shown);
      const { colour, dash } = lookOf(sheet, species);
      below = top;
      const pattern = dash === '' ? '' : ` stroke-dasharray="${dash}"`;
      return `<path d="${area}" fill="${colour}" fill-opacity="0.16"/><path d="${edge}" fill="none" stroke="${colour}" stroke-width="1.3"${pattern}/>`;
    })
    .join('');
}

function measured(curves: AliquotCurves, panel: Panel): string {
  const { wavelengthNm, measured: values, use } = curves;
  const only = (isWanted: boolean): Float64Array =>
    values.map((value, i) => {
      const isIn = value >= panel.y[0] && value <= panel.y[1];
      return isIn && (use[i] === leftOut.used) === isWanted ? value : Number.NaN;
    });
  const [used, out] = [only(true), only(false)];
  const outside = `<path class="measured out" d="${pathOf(panel, wavelengthNm, out)}"/>`;
  if (wavelengthNm.length > mostPoints) {
    return `${outside}<path class="measured" d="${pathOf(panel, wavelengthNm, used)}"/>`;
  }
  return Array.from(wavelengthNm.keys())
    .map((i) => {
      const value = used[i] ?? Number.NaN;
      const shown = Number.isNaN(value) ? (out[i] ?? Number.NaN) : value;
      if (Number.isNaN(shown)) return '';
      const [x, y] = [xAt(panel, wavelengthNm[i] ?? 0).toFixed(1), yAt(panel, shown).toFixed(1)];
      return `<circle class="${Number.isNaN(value) ? 'point out' : 'point'}" cx="${x}" cy="${y}" r="1.7"/>`;
    })
    .join('');
}

function labels(sheet: Sheet, curves: AliquotCurves, panel: Panel): string {
  const placed: { x: number; y: number }[] = [];
  return curves.contributions
    .map(({ species, absorbance }, k) => {
      const spot = labelSpot(curves, k, panel.x, panel.y[1], placed);
      if (!spot) return '';
      placed.push(spot);
      const isThin = (absorbance[spot.index] ?? 0) < 0.055 * panel.y[1];
      const [x, y] = [xAt(panel, spot.x), yAt(panel, spot.y)];
      const [tx, ty] = isThin ? [x + 22, y - 26] : [x, y];
      const { colour } = lookOf(sheet, species);
      const line = isThin
        ? `<line x1="${x.toFixed(1)}" y1="${y.toFixed(1)}" x2="${tx.toFixed(1)}" y2="${(ty + 3).toFixed(1)}" stroke="${colour}"/>`
        : '';
      return `${line}<text class="label" x="${tx.toFixed(1)}" y="${ty.toFixed(1)}" fill="${colour}" text-anchor="middle" dy="0.3em">${figureLabel(sheet, species).text}</text>`;
    })
    .join('');
}

/** The wavelengths of each doubt over the figure, with its number in the list of doubts. */
function brackets(doubts: readonly Doubt[], panel: Panel): string {
  const within = (nm: number): number =>
    Math.min(Math.max(xAt(panel, nm), panel.left), panel.left + panel.width);
  return doubts
    .flatMap(({ atNm = [] }, index) => {
      const marks: string[] = [];
      for (let i = 0; i + 1 < atNm.length; i += 2) {
        const [low, high] = [within(atNm[i] ?? 0), within(atNm[i + 1] ?? 0)];
        marks.push(
          `<line class="doubt-mark" x1="${low.toFixed(1)}" x2="${Math.max(high, low + 3).toFixed(1)}" y1="16" y2="16"/><text class="doubt-number" x="${((low + high) / 2).toFixed(1)}" y="11" text-anchor="middle">${index + 1}</text>`,
        );
      }
      return marks;
    })
    .join('');
}

function absorbanceRange({ measured: values, fitted, use }: AliquotCurves): [number, number] {
  let top = 0.05;
  let bottom = 0;
  for (const [i, reason] of use.entries()) {
    if (reason !== leftOut.used) continue;
    for (const value of [values[i] ?? 0, fitted[i] ?? 0]) {
      if (!Number.isFinite(value)) continue;
      top = Math.max(top, value);
      bottom = Math.min(bottom, value);
    }
  }
  return [bottom - 0.02 * top, 1.06 * top];
}
