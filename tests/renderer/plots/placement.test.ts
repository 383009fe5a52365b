import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Doubt } from '../../../analysis/index.ts';
import { doubtBrackets, laneCount } from '../../../renderer/plots/doubt-brackets.ts';
import { boxAround, firstClear, isCrossed, overlap } from '../../../renderer/plots/label-boxes.ts';
import { tableRows, thinningText } from '../../../renderer/plots/thinned.ts';
import { edgeLimits, keyTarget, movedEdge } from '../../../renderer/plots/window-edge.ts';
import { movedBy, within, zoomedBy } from '../../../renderer/plots/zoom-range.ts';

const doubt = (...atNm: number[]): Doubt => ({ code: 'saturated', message: '', atNm });

describe('the places of doubts', () => {
  it('are numbered as in the list, those without a place counted', () => {
    const doubts: Doubt[] = [
      doubt(250, 255),
      { code: 'below-detection', message: '' },
      doubt(300, 310, 400, 410),
    ];
    const found = doubtBrackets(doubts, [200, 500]);
    expect(found.map(({ number, low }) => [number, low])).toEqual([
      [1, 250],
      [3, 300],
      [3, 400],
    ]);
    expect(laneCount(found)).toBe(1);
  });

  it('lie above each other where they would overlap', () => {
    const found = doubtBrackets([doubt(250, 300), doubt(260, 270), doubt(320, 330)], [200, 500]);
    expect(found.map(({ lane }) => lane)).toEqual([0, 1, 0]);
    expect(laneCount([])).toBe(1);
  });

  it('never share a stretch of a lane', () => {
    const range = fc.tuple(fc.integer({ min: 200, max: 490 }), fc.integer({ min: 0, max: 60 }));
    fc.assert(
      fc.property(fc.array(range, { maxLength: 12 }), (ranges) => {
        const doubts = ranges.map(([low, width]) => doubt(low, low + width));
        const found = doubtBrackets(doubts, [200, 500]);
        expect(found.length).toBe(ranges.length);
        for (const [i, a] of found.entries())
          for (const b of found.slice(i + 1))
            expect(a.lane !== b.lane || a.high < b.low || b.high < a.low).toBe(true);
      }),
    );
  });

  it('are cut to what is seen, and one at a single wavelength can be seen', () => {
    expect(doubtBrackets([doubt(100, 260), doubt(600, 700)], [250, 500])).toMatchObject([
      { low: 250, high: 260 },
    ]);
    expect(doubtBrackets([doubt(300, 300)], [250, 500])).toMatchObject([{ low: 300, high: 301 }]);
  });
});

describe('labels', () => {
  const panel = { width: 400, height: 200 };

  it('take the first place that is inside, and clear of other labels and of curves', () => {
    const outside = { x: 2, y: 100 };
    const underLabel = { x: 100, y: 100 };
    const onCurve = { x: 200, y: 50 };
    const clear = { x: 300, y: 100 };
    const curve = [
      { x: 0, y: 50 },
      { x: 400, y: 50 },
    ];
    const taken = [boxAround('other', { x: 110, y: 104 })];
    const places = [outside, underLabel, onCurve, clear];
    expect(firstClear('mono', places, panel, taken, [curve])).toBe(clear);
    expect(firstClear('mono', [onCurve], panel, taken, [curve])).toBe(onCurve);
    expect(firstClear('mono', [], panel, taken, [curve])).toBeUndefined();
  });

  it('see a curve that passes between two of its points', () => {
    const box = boxAround('bis', { x: 100, y: 100 });
    const steep = [
      { x: 99, y: 0 },
      { x: 101, y: 200 },
    ];
    expect(isCrossed(box, steep)).toBe(true);
    expect(
      isCrossed(box, [
        { x: 0, y: 10 },
        { x: 200, y: 10 },
      ]),
    ).toBe(false);
    expect(overlap(box, boxAround('bis', { x: 100, y: 130 }))).toBe(false);
  });
});

describe('zooming', () => {
  const all = [230, 470] as const;

  it('never shows what is not there, and keeps its width when moved', () => {
    const start = fc.double({ min: 230, max: 400, noNaN: true });
    fc.assert(
      fc.property(
        start,
        fc.double({ min: 2, max: 60, noNaN: true }),
        fc.double({ min: -2, max: 2, noNaN: true }),
        (low, span, part) => {
          const moved = movedBy([low, low + span], all, part);
          if (!moved) throw new Error('it is narrower than the whole');
          expect(moved[0]).toBeGreaterThanOrEqual(230);
          // the end is a sum of two rounded numbers near 470: one unit in its last place is 6e-14
          expect(moved[1]).toBeLessThanOrEqual(470 + 1e-12);
          expect(moved[1] - moved[0]).toBeCloseTo(span, 10);
        },
      ),
    );
  });

  it('halves and doubles about the middle, and ends at all of it', () => {
    expect(zoomedBy(all, all, 2)).toEqual([290, 410]);
    expect(zoomedBy([290, 410], all, 0.5)).toBeNull();
    expect(zoomedBy([240, 260], all, 0.5)).toEqual([230, 270]);
    expect(zoomedBy([300, 301], all, 2)).toEqual([299.5, 301.5]);
    expect(within([100, 900], all)).toBeNull();
  });
});

describe('an edge of the window', () => {
  it('stays within the spectrum and 1 nm from the other one', () => {
    expect(edgeLimits([240, 450], [230, 470], 0)).toEqual([230, 449]);
    expect(edgeLimits([240, 450], [230, 470], 1)).toEqual([241, 470]);
    // a window that was typed wider than the spectrum
    expect(edgeLimits([200, 600], [230, 470], 0)).toEqual([230, 469]);
    expect(edgeLimits([200, 600], [230, 470], 1)).toEqual([231, 470]);
    expect(movedEdge([240, 450], 1, 440)).toEqual([240, 440]);
  });

  it('moves by 1 nm, with shift by 10, and to its ends', () => {
    const to = (key: string, isShifted = false) => keyTarget(key, isShifted, 300, [230, 449]);
    expect([to('ArrowLeft'), to('ArrowRight'), to('ArrowUp', true), to('PageDown')]).toEqual([
      299, 301, 310, 290,
    ]);
    expect([to('Home'), to('End'), to('a'), to('Tab')]).toEqual([230, 449, null, null]);
  });
});

describe('the table of a plot', () => {
  it('shows every k-th point, and says so', () => {
    expect(tableRows(3)).toEqual([0, 1, 2]);
    expect(thinningText(60)).toBe('Every point');
    expect(tableRows(221)).toHaveLength(56);
    expect(tableRows(221).at(-1)).toBe(220);
    expect(thinningText(221)).toBe('Every 4th of 221 points');
    expect(thinningText(120)).toBe('Every 2nd of 120 points');
    expect(thinningText(661)).toBe('Every 12th of 661 points');
    expect(thinningText(1201)).toBe('Every 21st of 1201 points');
    expect(tableRows(0)).toEqual([]);
  });
});
