import { describe, expect, it } from 'vitest';
import { reportHtml } from '../../../analysis/index.ts';
import { escaped } from '../../../analysis/report/html.ts';
import { hostile, madeHostile, options, quantification, sheet } from './fixture.ts';
import { tagsOf } from './tags.ts';

const { results } = quantification;
const html = reportHtml(sheet, quantification, options);

/** The report as a reader sees it: no tags, no style, signs instead of their numbers. */
function readText(page: string): string {
  return page
    .replace(/<style>[\s\S]*?<\/style>/g, '')
    .replace(/<wbr>/g, '')
    .replace(/<[^>]*>/g, ' ')
    .replace(/&#(\d+);/g, (_, code: string) => String.fromCharCode(Number(code)))
    .replace(/\s+/g, ' ');
}

describe('the report as HTML', () => {
  const text = readText(html);

  it('is well formed', () => {
    expect(tagsOf(html).unclosed).toEqual([]);
  });

  it('allows nothing but its own style', () => {
    expect(html).toContain(
      `<meta http-equiv="Content-Security-Policy" content="default-src 'none'; style-src 'unsafe-inline'; img-src data:">`,
    );
    expect(html).not.toMatch(/<script|<link|<img|<iframe|@import|url\(|https?:|\son\w+=|\sstyle=/);
  });

  it('has the sections of the sheet in their order, then method, provenance and cautions', () => {
    const headings = Array.from(html.matchAll(/<h2[^>]*>(.*?)<\/h2>/g), ([, heading]) => heading);
    expect(headings).toEqual([
      'Reaction',
      'Standards',
      'Aliquots',
      'Fit and split',
      'Runs compared',
      'Method',
      'Provenance',
      'Left unused',
      'Cautions',
    ]);
  });

  it('leaves out the comparison where there is none', () => {
    const alone = { ...quantification, results: { ...results, comparisons: [] } };
    expect(reportHtml(sheet, alone, options)).not.toContain('Runs compared');
  });

  it('holds every doubt, note, refusal, warning and checksum', () => {
    const { aliquots, refused } = results;
    const said = [
      ...aliquots.flatMap(({ doubts, notes }) => [...doubts.map((d) => d.message), ...notes]),
      ...refused.flatMap(({ what, why }) => [what, why]),
      ...options.warnings,
      ...options.sources.flatMap(({ sha256, decisions }) => [sha256, ...decisions]),
    ];
    for (const each of said) expect(text).toContain(each);
    expect(text).toContain('not known');
  });

  it('gives the answer of every run and aliquot, in words where a product is not to be seen', () => {
    expect(html).toContain('<p class="answer">mono : bis = 2.376 : 1</p>');
    expect(html).toContain('<p class="answer">no bis to be seen</p>');
    expect(text).toContain('less than 0.36 % of the products (95 %)');
    expect(text).toContain('Run arm into core (r1), 1 aliquot mono : bis = 2.376 : 1');
  });

  it('gives an amount below detection as a limit, without a value', () => {
    expect(html).toMatch(
      /below detection<\/em><\/span><\/span><\/td><td class="number">—<\/td><td class="interval-cell">less than 0\.062</,
    );
  });

  it('writes no number that is none, and none as a machine would', () => {
    const seen = readText(html.replaceAll(/sha256|[0-9a-f]{64}/g, ''));
    expect(html).not.toMatch(/NaN|Infinity|undefined|\[object|null/);
    expect(seen).not.toMatch(/\d[eE][-+]?\d|\u22120(\.0+)?[^.\d]|[^\w\u2212-]-\d/);
  });

  it('refuses to print a result that is not a number', () => {
    const [first] = results.aliquots;
    if (!first) throw new Error('no aliquot in the fixture');
    const fit = { ...first.fit, reducedChiSquare: Number.NaN };
    const broken = { ...quantification, results: { ...results, aliquots: [{ ...first, fit }] } };
    expect(() => reportHtml(sheet, broken, options)).toThrow(/reducedChiSquare/);
  });

  it('is the same bytes for the same sheet', () => {
    expect(reportHtml(structuredClone(sheet), structuredClone(quantification), options)).toBe(html);
  });

  it('marks invented data at the top and in the header of each page, and only those', () => {
    expect(text).toContain('Invented data, for demonstration');
    expect(html).toContain('@top-right { content: "Invented data"');
    const { invented: _, ...real } = sheet;
    expect(reportHtml(real, quantification, options)).not.toMatch(/invented data/i);
  });

  it('says what is missing rather than fail where nothing was quantified', () => {
    const empty = {
      results: { ...results, aliquots: [], runs: [], comparisons: [], refused: [] },
      curves: [],
      standards: [],
    };
    const bare = reportHtml(
      { ...sheet, title: '', species: [], standards: [], aliquots: [], runs: [], stocks: [] },
      empty,
      { ...options, sources: [], warnings: [] },
    );
    expect(tagsOf(bare).unclosed).toEqual([]);
    expect(bare).toContain('Untitled sheet');
    expect(bare).not.toMatch(/NaN|Infinity|undefined/);
  });
});

describe('hostile texts in the report', () => {
  const { sheet: bad, quantification: worse } = madeHostile();
  const page = reportHtml(bad, worse, {
    ...options,
    madeOn: hostile,
    program: hostile,
    warnings: [hostile],
    sources: [{ file: hostile, sha256: hostile, what: hostile, decisions: [hostile] }],
  });

  it('are shown as they are and are never markup', () => {
    const { names, unclosed } = tagsOf(page);
    expect(unclosed).toEqual([]);
    const ours = new Set([...tagsOf(html).names, 'wbr']);
    for (const name of names) expect(ours).toContain(name);
    expect(names).not.toContain('script');
    expect(readText(page)).toContain(hostile.replace('\u2028', ' '));
    expect(page.split('</style>').length).toBe(2);
  });

  it('cannot end the string of the running header', () => {
    const title = '"; } body { display: none } /* \\\n</style><script>';
    const style = /<style>([\s\S]*?)<\/style>/.exec(
      reportHtml({ ...sheet, title }, quantification, options),
    )?.[1];
    expect(style).toContain('@top-left { content: "\\22 \\3b  \\7d  body \\7b  display');
    expect(style).not.toContain('display: none');
  });

  it('of any length leave places to break a line in tables', () => {
    const id = 'x'.repeat(200);
    const species = sheet.species.map((each) => ({ ...each, name: id }));
    const long = reportHtml({ ...sheet, species }, quantification, options);
    const cells = long.match(/<td>.*?<\/td>/g) ?? [];
    for (const cell of cells) expect(cell).not.toMatch(/x{40}/);
  });

  it('are escaped sign by sign', () => {
    expect(escaped(`<a href="x" id='y'>&`)).toBe(
      '&#60;a href=&#34;x&#34; id=&#39;y&#39;&#62;&#38;',
    );
  });
});
