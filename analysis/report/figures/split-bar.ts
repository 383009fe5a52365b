import type { Sheet } from '../../sheet/schema.ts';
import type { SplitFraction } from '../../split/results.ts';
import { quantifiedText } from '../numbers.ts';
import { lookOf } from '../species-look.ts';
import { figureLabel } from './figure-label.ts';
import { hatchedPath } from './hatched.ts';

const width = 680;

/** The split as a bar; every second part is hatched, and the parts are named above it in their order. */
export function splitBarSvg(sheet: Sheet, split: readonly SplitFraction[]): string {
  const total = split.reduce((sum, { fraction }) => sum + Math.max(fraction.value ?? 0, 0), 0);
  if (!(total > 0)) return '';
  let left = 0;
  const parts = split.map(({ species, fraction }, k) => {
    const area = {
      left,
      top: 0,
      width: (width * Math.max(fraction.value ?? 0, 0)) / total,
      height: 9,
    };
    left += area.width;
    const { colour } = lookOf(sheet, species);
    const hatch = k % 2 === 1 ? `<path class="on-fill" d="${hatchedPath(area)}"/>` : '';
    return `<rect x="${area.left.toFixed(1)}" y="0" width="${area.width.toFixed(1)}" height="${area.height}" fill="${colour}"/>${hatch}`;
  });
  const names = split.map(({ species, fraction }) => {
    const { value } = quantifiedText(fraction, { unit: 'percent' });
    const { colour } = lookOf(sheet, species);
    return `<tspan fill="${colour}">${figureLabel(sheet, species).text} ${value} %</tspan>`;
  });
  return `<svg class="figure split-bar" viewBox="0 0 ${width} 24" role="img" aria-label="Split of the products">${parts.join('')}<text class="label" x="0" y="21">${names.join('<tspan fill="#4f5b60"> : </tspan>')}</text></svg>`;
}
