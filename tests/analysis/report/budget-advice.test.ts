import { describe, expect, it } from 'vitest';
import { budgetAdvice, quantify, reportHtml, sheetSources } from '../../../analysis/index.ts';
import { escaped } from '../../../analysis/report/html.ts';
import { syntheticSheet } from '../synthetic.ts';

describe('the budget in the report', () => {
  it('ends with what to improve first, in the words of the screen', () => {
    const sheet = syntheticSheet();
    const quantification = quantify(sheet, new Map());
    const html = reportHtml(sheet, quantification, {
      madeOn: '2026-12-01T12:00:00Z',
      program: 'monobis test',
      sources: sheetSources(sheet, new Map()),
    });
    const advice = budgetAdvice(quantification.results.aliquots[0]?.budget ?? []);
    expect(advice).toContain('would shrink the interval by');
    expect(html).toContain(escaped(advice ?? 'none'));
  });
});
