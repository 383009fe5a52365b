import { describe, expect, it } from 'vitest';
import {
  quantify,
  reportCsv,
  reportHtml,
  resultsJson,
  type Sheet,
  sheetSources,
} from '../../../analysis/index.ts';
import { syntheticSheet } from '../synthetic.ts';

const hostile = `"><script>alert(1)</script>&'`;

function reported(change: (sheet: Sheet) => Sheet = (sheet) => sheet) {
  const sheet = change(
    syntheticSheet({
      aliquots: [
        { arm: 8e-6, mono: 2e-5, bis: 0 },
        { arm: 8e-6, mono: 1e-5, bis: 2e-5 },
      ],
    }),
  );
  const quantification = quantify(sheet, new Map());
  const options = {
    madeOn: '2026-12-01T12:00:00Z',
    program: 'monobis test',
    sources: sheetSources(sheet, new Map()),
  };
  return {
    sheet,
    quantification,
    html: reportHtml(sheet, quantification, options),
    csv: reportCsv(sheet, quantification),
  };
}

describe('the report as HTML', () => {
  it('is one file with no script, no style attribute and nothing from outside', () => {
    const { html } = reported();
    expect(html).not.toMatch(/<script|\sstyle=|https?:\/\/(?!www\.w3\.org)|<link|<img|\son\w+=/);
  });

  it('escapes what the user typed, wherever it stands', () => {
    const { html } = reported((sheet) => ({
      ...sheet,
      title: hostile,
      species: sheet.species.map((species) => ({ ...species, name: species.id + hostile })),
      runs: [{ id: 'r1', name: hostile }],
    }));
    expect(html).not.toContain('<script');
    expect(html).not.toContain("&'");
    expect(html).toContain('&#60;script&#62;');
  });

  it('closes every tag that it opens', () => {
    const { html } = reported();
    const open: string[] = [];
    const empty = new Set(['meta', 'br', 'line', 'path', 'circle', 'rect', 'wbr']);
    for (const [, slash, name = '', rest = ''] of html.matchAll(
      /<(\/?)([a-z][a-z0-9]*)([^>]*)>/g,
    )) {
      if (slash === '/') expect(open.pop()).toBe(name);
      else if (!rest.endsWith('/') && !empty.has(name)) open.push(name);
    }
    expect(open).toEqual([]);
  });

  it('holds every doubt, every section and the cautions, and no number that is none', () => {
    const { html, quantification } = reported();
    for (const { doubts } of quantification.results.aliquots) {
      for (const { message } of doubts)
        expect(html).toContain(message.slice(0, 40).replaceAll("'", '&#39;'));
    }
    for (const heading of [
      'Reaction',
      'Standards',
      'Aliquots',
      'Fit and split',
      'Method',
      'Provenance',
      'Cautions',
    ]) {
      expect(html).toContain(`<h2>${heading}</h2>`);
    }
    expect(html).not.toMatch(/NaN|Infinity|undefined|\[object/);
  });

  it('is the same bytes for the same sheet', () => {
    expect(reported().html).toBe(reported().html);
  });

  it('marks invented data', () => {
    expect(reported((sheet) => ({ ...sheet, invented: true })).html).toContain('Invented data');
    expect(reported().html).not.toContain('Invented data');
  });
});

describe('the results as CSV', () => {
  it('hold every fraction in full precision, one number a row', () => {
    const { csv, quantification } = reported();
    for (const { aliquot, split } of quantification.results.aliquots) {
      for (const { species, fraction } of split) {
        expect(csv).toContain(`${aliquot},r1,fraction of products,${species},${fraction.value},`);
      }
    }
  });

  it('never let a text become a formula', () => {
    const { csv } = reported((sheet) => ({
      ...sheet,
      title: '=HYPERLINK("http://x")',
      aliquots: (sheet.aliquots ?? []).map((aliquot, i) => ({
        ...aliquot,
        id: `${['@', '+'][i]}SUM(1)`,
      })),
    }));
    for (const line of csv.split('\r\n')) {
      for (const cell of line.split(',')) expect(cell.replace(/^"/, '')).not.toMatch(/^\s*[=@+]/);
    }
    expect(csv).toContain("'@SUM(1)");
  });
});

describe('the results as JSON', () => {
  it('refuse to write a number that is none', () => {
    const { quantification } = reported();
    const [first] = quantification.results.aliquots;
    const broken = {
      ...quantification.results,
      aliquots: [{ ...first!, fit: { ...first!.fit, residualRms: Number.NaN } }],
    };
    expect(() => resultsJson(broken)).toThrow(/residualRms/);
  });
});
