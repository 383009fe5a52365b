import { describe, expect, it } from 'vitest';
import { ticks } from '../../../analysis/report/figures/axes.ts';
import { fitFigureSvg } from '../../../analysis/report/figures/fit-figure.ts';
import { hatchedPath } from '../../../analysis/report/figures/hatched.ts';
import { splitBarSvg } from '../../../analysis/report/figures/split-bar.ts';
import { standardsFigureSvg } from '../../../analysis/report/figures/standards-figure.ts';
import { curvesOf, quantification, quantified, sheet } from './fixture.ts';

const curves = curvesOf('a1');
const doubts = quantification.results.aliquots[0]?.doubts ?? [];

/** All pairs of coordinates in the "d" of the paths of a class. */
function pointsOf(svg: string, kind: string): [number, number][] {
  return Array.from(svg.matchAll(new RegExp(`class="${kind}" d="([^"]*)"`, 'g'))).flatMap(
    ([, d = '']) =>
      Array.from(d.matchAll(/[ML](-?[\d.]+) (-?[\d.]+)/g), ([, x, y]): [number, number] => [
        Number(x),
        Number(y),
      ]),
  );
}

describe('the figure of a fit', () => {
  const svg = fitFigureSvg(sheet, curves, doubts);

  it('names every species that contributes on the figure itself', () => {
    for (const name of ['chloride', 'mono', 'bis']) expect(svg).toContain(`>${name}</text>`);
  });

  it('hatches each stretch that was left out, and marks the ends of the window', () => {
    // above the upper absorbance, missing, excluded, without a standard
    expect(svg.match(/class="hatch"/g)?.length).toBe(4);
    expect(svg.match(/class="window-edge"/g)?.length).toBe(2);
  });

  it('numbers the doubts over their wavelengths as the list under it does', () => {
    const numbers = Array.from(
      svg.matchAll(/class="doubt-number"[^>]*>(\d+)</g),
      ([, number]) => number,
    );
    expect(numbers).toEqual(['1', '1']);
  });

  it('lays the measured curve on the top of the stack', () => {
    const measured = pointsOf(svg, 'measured');
    const used = Array.from(curves.use).filter((reason) => reason === 0).length;
    expect(measured.length).toBe(used);
    const [, topEdge = ''] =
      /fill-opacity="0.16"\/><path d="([^"]*)" fill="none"[^>]*\/>(?!<path d)/.exec(svg) ?? [];
    const edge = new Map(
      Array.from(topEdge.matchAll(/[ML]([\d.]+) ([\d.]+)/g), ([, x, y]) => [Number(x), Number(y)]),
    );
    for (const [x, y] of measured) {
      // residuals of up to 2.4 mAU are 1.5 pixels of 216 at the 0.35 of the highest band
      expect(Math.abs(y - (edge.get(x) ?? Number.NaN))).toBeLessThan(2);
    }
  });

  it('marks a residual that is beyond the strip', () => {
    const beyond = (spike: number): number => {
      const residual = curves.residual.map((value, i) => (i === 170 ? spike : value));
      const drawn = fitFigureSvg(sheet, { ...curves, residual }, []);
      return drawn.match(/class="beyond"/g)?.length ?? 0;
    };
    expect(beyond(0.5) - beyond(0)).toBe(1);
    expect(beyond(-0.5) - beyond(0)).toBe(1);
  });

  it('shows single points where they do not touch', () => {
    const every = (values: Float64Array) => values.filter((_, i) => i % 5 === 0);
    const sparse = fitFigureSvg(
      sheet,
      {
        ...curves,
        wavelengthNm: every(curves.wavelengthNm),
        measured: every(curves.measured),
        fitted: every(curves.fitted),
        baseline: every(curves.baseline),
        residual: every(curves.residual),
        expectedSd: every(curves.expectedSd),
        use: curves.use.filter((_, i) => i % 5 === 0),
        contributions: [],
      },
      [],
    );
    expect(sparse).toContain('class="point"');
    expect(sparse).not.toContain('class="measured"');
  });

  it('has no coordinate that is none, even without a point', () => {
    const none = new Float64Array(0);
    const empty = { ...curves, wavelengthNm: none, measured: none, fitted: none, baseline: none };
    const bare = fitFigureSvg(
      sheet,
      { ...empty, residual: none, expectedSd: none, use: new Uint8Array(0), contributions: [] },
      [],
    );
    for (const each of [svg, bare]) expect(each).not.toMatch(/NaN|Infinity|undefined/);
  });
});

describe('the other figures', () => {
  it('name every standard, none on another', () => {
    const same = quantification.standards.map((each) => ({
      ...each,
      molarAbsorptivity: quantification.standards[1]?.molarAbsorptivity ?? new Float64Array(0),
    }));
    const labels = Array.from(
      standardsFigureSvg(sheet, same).matchAll(/class="label" x="([\d.]+)" y="([\d.]+)"/g),
      ([, x, y]) => `${x} ${y}`,
    );
    expect(labels.length).toBe(3);
    expect(new Set(labels).size).toBe(3);
    expect(standardsFigureSvg(sheet, [])).toBe('');
  });

  it('give each product its share of the bar', () => {
    const bar = splitBarSvg(sheet, [
      { species: 'mono', fraction: quantified(0.75, 0.01, 0.73, 0.77) },
      { species: 'bis', fraction: quantified(0.25, 0.01, 0.23, 0.27) },
    ]);
    const widths = Array.from(bar.matchAll(/<rect[^>]*width="([\d.]+)"/g), ([, w]) => Number(w));
    expect(widths).toEqual([510, 170]);
    expect(splitBarSvg(sheet, [])).toBe('');
  });

  it('hatch within the rectangle only', () => {
    const path = hatchedPath({ left: 10, top: 20, width: 30, height: 12 });
    for (const [, x, y] of path.matchAll(/[ML]([\d.]+) ([\d.]+)/g)) {
      expect(Number(x)).toBeGreaterThanOrEqual(10);
      expect(Number(x)).toBeLessThanOrEqual(40);
      expect(Number(y)).toBeGreaterThanOrEqual(20);
      expect(Number(y)).toBeLessThanOrEqual(32);
    }
    expect(path).not.toBe('');
  });

  it('have round ticks within their range', () => {
    expect(ticks([0, 0.37], 5)).toEqual([0, 0.1, 0.2, 0.3]);
    expect(ticks([228, 452], 6)).toEqual([250, 300, 350, 400, 450]);
  });
});
