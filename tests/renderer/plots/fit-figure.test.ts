import { describe, expect, it } from 'vitest';
import { type AliquotCurves, leftOut, quantify } from '../../../analysis/index.ts';
import type { FitFigureInput } from '../../../renderer/plots/figure.ts';
import { fitFigure, fitMargin } from '../../../renderer/plots/fit-figure.ts';
import { residualRange, residualTick } from '../../../renderer/plots/fit-ranges.ts';
import { leftOutLooks, pointText } from '../../../renderer/plots/left-out.ts';
import { measuredCurves } from '../../../renderer/sections/fit/measured-curves.ts';
import { doubtfulSheet, theme, yAt } from '../fixture.ts';

const sheet = doubtfulSheet();
const { curves, results } = quantify(sheet, new Map());
const fitted = curves[0]!;
const doubts = results.aliquots[0]!.doubts;
const at = (nm: number): number => fitted.wavelengthNm.indexOf(nm);

function drawn(changes: Partial<FitFigureInput> = {}) {
  const input: FitFigureInput = {
    labels: new Map(),
    excludeNm: sheet.fit?.excludeNm ?? [],
    curves: fitted,
    doubts,
    theme,
    rangeNm: [226, 474],
    widthPx: 920,
    heightPx: 480,
    ...changes,
  };
  const figure = fitFigure(input);
  return {
    ...figure,
    named: (name: string) => figure.data.find((trace) => trace.name === name),
    names: figure.data.map(({ name }) => name),
  };
}

/** The curves with some points given another fate. */
function withUse(fates: ReadonlyMap<number, number>): AliquotCurves {
  return { ...fitted, use: fitted.use.map((reason, i) => fates.get(i) ?? reason) };
}

describe('the fit plot', () => {
  it('stacks the contributions up to the fitted curve', () => {
    const { named } = drawn();
    // sums of the same numbers in another order
    expect(yAt(named('bis'), at(350))).toBeCloseTo(yAt(named('fitted'), at(350)), 12);
  });

  it('breaks the fitted line, the residual and its band where points are left out', () => {
    const { named } = drawn();
    for (const name of ['fitted', 'residual, mAU'])
      expect([yAt(named(name), at(302)), Number.isNaN(yAt(named(name), at(306)))]).toEqual([
        Number.NaN,
        false,
      ]);
  });

  it('shows the residual and ±2σ in mAU', () => {
    const { named } = drawn();
    const i = at(350);
    expect(yAt(named('residual, mAU'), i)).toBe(1000 * fitted.residual[i]!);
    const band = named('±2σ');
    if (!band || !('x' in band) || !(band.x instanceof Float64Array)) throw new Error('no band');
    const edges = [...band.x.keys()].filter((k) => yAt(band, k) && band.x?.[k] === 350);
    const half = 2000 * fitted.expectedSd[i]!;
    expect(edges.map((k) => yAt(band, k))).toEqual([half, -half]);
    expect([...band.x].some((nm) => nm >= 300 && nm <= 304)).toBe(false);
  });

  it('draws every reading once: used, or left out with its reason', () => {
    const { named } = drawn();
    const marks = ['measured', 'outside the window', 'excluded'].map(named);
    for (const [i, value] of fitted.measured.entries()) {
      const shown = marks.map((trace) => yAt(trace, i)).filter((y) => !Number.isNaN(y));
      expect(shown).toEqual([value]);
    }
  });

  it('marks each reason in its own way, and speaks of none that is not there', () => {
    const symbols = [...leftOutLooks.values()].map(({ symbol }) => symbol);
    expect(new Set(symbols).size).toBe(symbols.length);
    const reasons = Object.values(leftOut).filter((reason) => reason !== leftOut.used);
    expect([...leftOutLooks.keys()].sort()).toEqual([...reasons].sort());
    expect(drawn().names).not.toContain('above the upper absorbance');
    const over = withUse(new Map([[at(350), leftOut.aboveUpperAbsorbance]]));
    expect(drawn({ curves: over }).names).toContain('above the upper absorbance');
    expect(pointText(leftOut.used)).toBe('used');
    expect(pointText(undefined)).not.toBe('used');
  });

  it('shades what is excluded and, half-way to the neighbours, what cannot be used', () => {
    const lost = withUse(
      new Map([
        [at(350), leftOut.missing],
        [at(351), leftOut.missing],
      ]),
    );
    const rects = drawn({ curves: lost }).layout.shapes?.filter(({ type }) => type === 'rect');
    expect(rects?.map(({ x0, x1 }) => [x0, x1])).toEqual([
      [300, 304],
      [349.5, 351.5],
    ]);
  });

  it('says on the residual axis how large the residual is', () => {
    const { layout } = drawn();
    const [low, high] = residualRange(fitted, [226, 474]);
    const tick = residualTick(high);
    expect(layout.yaxis2?.tickvals).toEqual([-tick, 0, tick]);
    expect(tick).toBeLessThanOrEqual(high);
    expect(tick).toBeGreaterThan(high / 2.6);
    expect(low).toBe(-high);
    expect([0.63, 1.9, 2, 4.99, 17, 100].map(residualTick)).toEqual([0.5, 1, 2, 2, 10, 100]);
  });

  it('marks at the edge of the strip what lies beyond it', () => {
    const spike = fitted.residual.map((value, i) => (i === at(350) ? -5 : value));
    const { named } = drawn({ curves: { ...fitted, residual: spike } });
    const [, reach] = residualRange({ ...fitted, residual: spike }, [226, 474]);
    expect(reach).toBeLessThan(100);
    const marks = drawn({ curves: { ...fitted, residual: spike } }).data.filter(
      ({ name }) => name === 'beyond the strip',
    );
    expect(marks.some((trace) => yAt(trace, at(350)) < -0.9 * reach)).toBe(true);
    expect(yAt(named('residual, mAU'), at(350))).toBe(-5000);
  });

  it('follows what is seen with both panels when it is zoomed', () => {
    const tail = drawn({ rangeNm: [420, 470] }).layout;
    const top = (range: unknown): number => (Array.isArray(range) ? Number(range[1]) : Number.NaN);
    expect(top(tail.yaxis?.range)).toBeLessThan(0.2 * top(drawn().layout.yaxis?.range));
    expect([tail.yaxis?.fixedrange, tail.yaxis2?.fixedrange]).toEqual([true, true]);
  });

  it('names each species, in its own colour', () => {
    const { layout } = drawn({ labels: new Map([['mono', 'half-way']]) });
    const texts = layout.annotations?.map(({ text }) => text);
    expect(texts).toEqual(expect.arrayContaining(['arm', 'half-way', 'bis']));
    const colours = layout.annotations
      ?.filter(({ text }) => ['arm', 'half-way', 'bis'].includes(text ?? ''))
      .map(({ font }) => font?.color);
    expect(new Set(colours).size).toBe(3);
  });

  it('gives the doubts their numbers in the list, and room', () => {
    const numbered = drawn().layout.annotations?.filter(({ yref }) => yref === 'paper');
    const placed = doubts.flatMap(({ atNm = [] }, k) => (atNm.length > 0 ? [`${k + 1}`] : []));
    expect(placed.length).toBeGreaterThan(0);
    expect(new Set(numbered?.map(({ text }) => text))).toEqual(new Set(placed));
    const doubled = [...doubts, ...doubts];
    expect(fitMargin(doubled, [226, 474]).t).toBeGreaterThan(fitMargin(doubts, [226, 474]).t);
  });
});

describe('a spectrum that cannot be fitted', () => {
  const measured = measuredCurves(sheet, 'a1');

  it('is drawn as it was measured, with nothing that looks like a fit', () => {
    if (!measured) throw new Error('the spectrum is embedded');
    expect(Array.from(measured.measured)).toEqual(Array.from(fitted.measured));
    const { data, layout, named } = drawn({ curves: measured, doubts: [] });
    expect(yAt(named('measured'), at(302))).toBe(fitted.measured[at(302)]);
    for (const name of ['fitted', 'residual, mAU', 'baseline'])
      expect(fitted.wavelengthNm.every((_, i) => Number.isNaN(yAt(named(name), i)))).toBe(true);
    expect(data.map(({ name }) => name)).not.toContain('mono');
    expect(named('±2σ')).toMatchObject({ x: new Float64Array(), y: new Float64Array() });
    expect(layout.yaxis2?.visible).toBe(false);
  });

  it('keeps a missing reading missing, and puts wavelengths in order', () => {
    const backwards = {
      ...sheet,
      aliquots: [
        {
          id: 'a1',
          spectrum: { embedded: { name: 'x', wavelengthNm: [302, 301], absorbance: [null, 0.5] } },
        },
      ],
    };
    const curves = measuredCurves(backwards, 'a1');
    expect(curves && [...curves.wavelengthNm]).toEqual([301, 302]);
    expect(curves && [...curves.measured]).toEqual([0.5, Number.NaN]);
    expect(curves && [...curves.use]).toEqual([leftOut.used, leftOut.missing]);
  });

  it('is not drawn where the sheet does not hold it', () => {
    expect(measuredCurves(sheet, 'a9')).toBeNull();
    expect(measuredCurves(sheet, null)).toBeNull();
    const elsewhere = { ...sheet, aliquots: [{ id: 'a1', spectrum: { file: 'a.csv' } }] };
    expect(measuredCurves(elsewhere, 'a1')).toBeNull();
  });
});
