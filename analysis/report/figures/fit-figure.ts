import type { Doubt } from '../../doubts/doubt.ts';
import { speciesLabel } from '../../sheet/defaults.ts';
import type { Sheet } from '../../sheet/schema.ts';
import { type AliquotCurves, leftOut } from '../../split/results.ts';
import { escaped } from '../html.ts';
import { labelSpot } from '../label-spot.ts';
import { speciesLook } from '../species-look.ts';
import { areaOf, axes, type Panel, pathOf, xAt, yAt } from './axes.ts';

const width = 680;
const height = 400;

/** The measured curve on the stacked contributions, and the residual with its ±2σ band, as SVG text. */
export function fitFigureSvg(
  sheet: Sheet,
  curves: AliquotCurves,
  doubts: readonly Doubt[],
): string {
  const { wavelengthNm } = curves;
  const x = [(wavelengthNm[0] ?? 0) - 2, (wavelengthNm.at(-1) ?? 1) + 2] as const;
  const upper: Panel = {
    left: 54,
    top: 22,
    width: 616,
    height: 236,
    x,
    y: absorbanceRange(curves),
  };
  const lower: Panel = { left: 54, top: 278, width: 616, height: 78, x, y: residualRange(curves) };
  const parts = [
    leftOutBands(curves, upper, lower),
    axes(upper, null, 'absorbance'),
    axes(lower, 'wavelength, nm', 'residual, mAU', 4),
    stack(curves, upper),
    measured(curves, upper),
    residual(curves, lower),
    labels(sheet, curves, upper),
    brackets(doubts, upper),
  ];
  return `<svg class="figure" viewBox="0 0 ${width} ${height}" role="img" aria-label="${escaped(`Fit of aliquot ${curves.aliquot}`)}">${parts.join('')}</svg>`;
}

function stack(curves: AliquotCurves, panel: Panel): string {
  const { wavelengthNm, baseline, contributions } = curves;
  let below = baseline;
  return contributions
    .map(({ absorbance }, k) => {
      const top = below.map((value, i) => value + (absorbance[i] ?? Number.NaN));
      const area = areaOf(panel, wavelengthNm, below, top);
      const edge = pathOf(panel, wavelengthNm, top);
      const { colour, dash } = speciesLook(k);
      below = top;
      const pattern = dash === '' ? '' : ` stroke-dasharray="${dash}"`;
      return `<path d="${area}" fill="${colour}" fill-opacity="0.16"/><path d="${edge}" fill="none" stroke="${colour}" stroke-width="1.2"${pattern}/>`;
    })
    .join('');
}

function measured(
  { wavelengthNm, measured: values, fitted, use }: AliquotCurves,
  panel: Panel,
): string {
  const used = fitted.map((value, i) => (use[i] === leftOut.used ? value : Number.NaN));
  const points = Array.from(wavelengthNm.keys()).flatMap((i) => {
    const [nm, value] = [wavelengthNm[i] ?? 0, values[i] ?? Number.NaN];
    if (Number.isNaN(value) || value > panel.y[1]) return [];
    const kind = use[i] === leftOut.used ? 'point' : 'point out';
    return [
      `<circle class="${kind}" cx="${xAt(panel, nm).toFixed(1)}" cy="${yAt(panel, value).toFixed(1)}" r="1.5"/>`,
    ];
  });
  return `<path class="fitted" d="${pathOf(panel, wavelengthNm, used)}"/>${points.join('')}`;
}

function residual(
  { wavelengthNm, residual: values, expectedSd, use }: AliquotCurves,
  panel: Panel,
): string {
  const milli = (of: Float64Array, factor: number): Float64Array =>
    of.map((value, i) => (use[i] === leftOut.used ? 1000 * factor * value : Number.NaN));
  const band = areaOf(panel, wavelengthNm, milli(expectedSd, -2), milli(expectedSd, 2));
  const line = pathOf(panel, wavelengthNm, milli(values, 1));
  return `<path class="band" d="${band}"/><path class="fitted" d="${line}"/>`;
}

function leftOutBands({ wavelengthNm, use }: AliquotCurves, upper: Panel, lower: Panel): string {
  const bottom = lower.top + lower.height;
  return Array.from(wavelengthNm.keys())
    .flatMap((i) => {
      const reason = use[i];
      const isLost =
        reason === leftOut.excluded ||
        reason === leftOut.missing ||
        reason === leftOut.aboveUpperAbsorbance;
      if (!isLost) return [];
      const nm = wavelengthNm[i] ?? 0;
      const step = ((wavelengthNm[i + 1] ?? nm + 1) - nm) / 2;
      const left = xAt(upper, nm - step);
      return [
        `<rect class="out" x="${left.toFixed(1)}" y="${upper.top}" width="${(xAt(upper, nm + step) - left).toFixed(1)}" height="${bottom - upper.top}"/>`,
      ];
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
      const { colour } = speciesLook(k);
      const line = isThin
        ? `<line x1="${x.toFixed(1)}" y1="${y.toFixed(1)}" x2="${tx.toFixed(1)}" y2="${(ty + 3).toFixed(1)}" stroke="${colour}"/>`
        : '';
      return `${line}<text class="label" x="${tx.toFixed(1)}" y="${ty.toFixed(1)}" fill="${colour}" text-anchor="middle" dy="0.3em">${escaped(speciesLabel(sheet, species))}</text>`;
    })
    .join('');
}

function brackets(doubts: readonly Doubt[], panel: Panel): string {
  return doubts
    .flatMap(({ atNm = [] }, index) => {
      const marks: string[] = [];
      for (let i = 0; i + 1 < atNm.length; i += 2) {
        const [low, high] = [xAt(panel, atNm[i] ?? 0), xAt(panel, atNm[i + 1] ?? 0)];
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
      top = Math.max(top, value);
      bottom = Math.min(bottom, value);
    }
  }
  return [bottom - 0.02 * top, 1.06 * top];
}

function residualRange({ residual: values, expectedSd, use }: AliquotCurves): [number, number] {
  const sizes: number[] = [];
  for (const [i, reason] of use.entries()) {
    if (reason === leftOut.used)
      sizes.push(1000 * Math.max(Math.abs(values[i] ?? 0), 2 * (expectedSd[i] ?? 0)));
  }
  sizes.sort((a, b) => a - b);
  const reach = 1.3 * Math.max(sizes[Math.floor(0.94 * (sizes.length - 1))] ?? 0, 0.5);
  return [-reach, reach];
}
