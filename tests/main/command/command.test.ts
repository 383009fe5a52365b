import { execFile } from 'node:child_process';
import { mkdtemp, readFile, rm, truncate, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { promisify } from 'node:util';
import * as v from 'valibot';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { syntheticSheet } from '../../analysis/synthetic.ts';
import { called } from './called.ts';

const root = path.resolve(import.meta.dirname, '../../..');
const sample = path.join(root, 'sample-data/piperazine.sheet.json');
const crude = path.join(root, 'sample-data/crude/arm-into-core.csv');

const number = v.number();
const bound = v.nullable(number);
const q = v.object({
  value: bound,
  standardUncertainty: bound,
  interval95: v.tuple([bound, bound]),
});
/** SHEET.md, "Results", member by member. */
const aliquotSchema = v.object({
  aliquot: v.string(),
  run: v.nullable(v.string()),
  concentrations: v.array(
    v.object({ species: v.string(), cuvetteMolPerL: q, flaskMolPerL: q, detected: v.boolean() }),
  ),
  split: v.array(v.object({ species: v.string(), fraction: q })),
  ratios: v.array(v.object({ of: v.string(), to: v.string(), value: q })),
  budget: v.array(v.object({ source: v.string(), share: number })),
  fit: v.object({
    points: number,
    windowNm: v.tuple([number, number]),
    residualRms: number,
    reducedChiSquare: bound,
    shiftNm: q,
    baseline: v.array(v.unknown()),
  }),
  doubts: v.array(
    v.object({ code: v.string(), message: v.string(), atNm: v.optional(v.array(number)) }),
  ),
});
const resultsSchema = v.object({
  format: v.literal('monobis-results'),
  version: v.literal(1),
  program: v.pipe(v.string(), v.startsWith('monobis ')),
  aliquots: v.array(aliquotSchema),
  runs: v.array(
    v.object({
      run: v.string(),
      aliquots: number,
      split: v.array(v.unknown()),
      ratios: v.array(v.unknown()),
      balance: v.object({ coresFound: v.nullable(q), armsFound: v.nullable(q) }),
    }),
  ),
  comparisons: v.array(
    v.object({
      runs: v.tuple([v.string(), v.string()]),
      of: v.string(),
      to: v.string(),
      ratioOfRatios: q,
      pValue: bound,
    }),
  ),
});
const readingSchema = v.object({
  format: v.literal('monobis-reading'),
  version: v.literal(1),
  file: v.string(),
  sha256: v.string(),
  encoding: v.string(),
  delimiter: v.string(),
  decimal: v.string(),
  spectra: v.array(
    v.object({
      name: v.string(),
      xUnit: v.string(),
      quantity: v.string(),
      points: number,
      wavelengthNm: v.array(number),
      absorbance: v.array(bound),
      assumptions: v.array(v.string()),
    }),
  ),
  refused: v.array(v.object({ what: v.string(), why: v.string(), line: bound })),
});

let folder = '';
const file = (name: string): string => path.join(folder, name);

beforeAll(async () => {
  folder = await mkdtemp(path.join(tmpdir(), 'monobis-command-'));
  await writeFile(file('empty.csv'), '');
  await writeFile(
    file('photo.csv'),
    Buffer.from([0xff, 0xd8, 0xff, 0xe0, 0, 16, 0x4a, 0x46, 0x49, 0x46, 0, 1, 2, 3]),
  );
  await writeFile(
    file('binary.csv'),
    Buffer.from(Array.from({ length: 4000 }, (_, i) => (i * 7919) % 251)),
  );
  await writeFile(file('right.docx'), await readFile(crude));
  await writeFile(file('huge.csv'), '');
  await truncate(file('huge.csv'), 100 * 1024 * 1024);
  await writeFile(file('broken.sheet.json'), '{"format": "monobis-sheet",\n "version": 1,');
  const sheet = syntheticSheet();
  await writeFile(
    file('missing.sheet.json'),
    JSON.stringify({ ...sheet, aliquots: [{ id: 'a1', spectrum: { file: 'nowhere/crude.csv' } }] }),
  );
  const [good] = sheet.aliquots ?? [];
  const embedded = good?.spectrum.embedded;
  const far = { ...embedded, wavelengthNm: embedded?.wavelengthNm.map((nm) => nm + 600) };
  await writeFile(
    file('one-refused.sheet.json'),
    JSON.stringify({
      ...sheet,
      fit: {},
      colour: 'blue',
      aliquots: [good, { id: 'far', spectrum: { embedded: far } }],
    }),
  );
});

afterAll(async () => {
  await rm(folder, { recursive: true, force: true });
});

describe('monobis quantify', () => {
  it('gives results to the letter of the contract, and nothing else on standard output', async () => {
    const { code, out, err } = await called('quantify', sample, '--json');
    expect(code).toBe(0);
    expect(err).toBe('');
    const results = v.parse(resultsSchema, JSON.parse(out));
    expect(results.aliquots).toHaveLength(6);
    expect(results.runs.map(({ aliquots }) => aliquots)).toEqual([3, 3]);
    expect(results.comparisons).toHaveLength(1);
    for (const { split, budget } of results.aliquots) {
      expect(split.reduce((sum, { fraction }) => sum + (fraction.value ?? 0), 0)).toBeCloseTo(1, 9);
      expect(budget.reduce((sum, { share }) => sum + share, 0)).toBeCloseTo(1, 9);
    }
  });

  it('prints a table for people without --json', async () => {
    const { code, out } = await called('quantify', sample);
    expect(code).toBe(0);
    expect(out).toContain('Invented data');
    expect(out).toMatch(/flask, mmol\/L/);
    expect(out).toContain('! unexplained-band');
  });

  it('exits 3 when an aliquot was refused, lists it, and reports what it does not know', async () => {
    const { code, out, err } = await called('quantify', file('one-refused.sheet.json'), '--json');
    expect(code).toBe(3);
    expect(err).toContain('aliquot far');
    expect(err).toContain('"colour"');
    expect(v.parse(resultsSchema, JSON.parse(out)).aliquots).toHaveLength(1);
  });

  it('exits 2 for a sheet with a missing file and names it, with nothing on standard output', async () => {
    const { code, out, err } = await called('quantify', file('missing.sheet.json'), '--json');
    expect({ code, out }).toEqual({ code: 2, out: '' });
    expect(err).toContain('nowhere/crude.csv');
    expect(err).toContain('Put');
  });

  it('exits 2 for a half-written sheet and names the line', async () => {
    const { code, err } = await called('quantify', file('broken.sheet.json'));
    expect(code).toBe(2);
    expect(err).toContain('broken.sheet.json, line 2');
  });

  it.each([[crude], [file('not-there.json')]])(
    'exits 2 for %s, which is no sheet',
    async (name) => {
      const { code, err } = await called('quantify', name);
      expect(code).toBe(2);
      expect(err).not.toMatch(/\bat .*\.ts/);
    },
  );

  it('fits every trace of every file with --each, one line each, in input order', async () => {
    const { code, out } = await called(
      'quantify',
      sample,
      '--each',
      crude,
      file('empty.csv'),
      crude,
      '--json',
    );
    const lines = out
      .trim()
      .split('\n')
      .map((line): unknown => JSON.parse(line));
    expect(code).toBe(3);
    expect(lines).toHaveLength(7);
    expect(v.parse(aliquotSchema, lines[0]).aliquot).toBe(`${crude}#0`);
    expect(lines[3]).toMatchObject({ aliquot: file('empty.csv') });
    expect(v.parse(aliquotSchema, lines[6]).aliquot).toBe(`${crude}#2`);
  });
});

describe('monobis read', () => {
  it('gives a reading to the letter of the contract', async () => {
    const { code, out } = await called('read', crude, '--json');
    expect(code).toBe(0);
    const [reading] = v.parse(v.array(readingSchema), JSON.parse(out));
    expect(reading?.spectra).toHaveLength(3);
    const nm = reading?.spectra[0]?.wavelengthNm ?? [];
    expect(nm.every((value, i) => i === 0 || value > nm[i - 1]!)).toBe(true);
    // over range is null, never zero
    expect(reading?.spectra[0]?.absorbance.filter((value) => value === null)).toHaveLength(13);
    expect(reading?.spectra[0]?.absorbance).not.toContain(0);
  });

  it('does not care for the ending of the name', async () => {
    const { code, out } = await called('read', file('right.docx'), '--json');
    expect(code).toBe(0);
    expect(v.parse(v.array(readingSchema), JSON.parse(out))[0]?.spectra).toHaveLength(3);
  });

  it.each([
    ['empty.csv', /empty/i],
    ['photo.csv', /picture/i],
    ['binary.csv', /text/i],
    ['huge.csv', /MiB/],
    ['not-there.csv', /no such file/i],
  ])('exits 2 for %s with a clear message', async (name, words) => {
    const { code, err } = await called('read', file(name));
    expect(code).toBe(2);
    expect(err).toMatch(words);
    expect(err).toContain(name);
  });

  it('exits 3 when only some could be read', async () => {
    expect((await called('read', crude, file('empty.csv'))).code).toBe(3);
  });
});

describe('monobis report', () => {
  it.each(['.html', '.csv', '.json'])('writes %s whole and prints its path', async (ending) => {
    const to = file(`report${ending}`);
    const { code, out } = await called('report', sample, '--to', to);
    expect(code).toBe(0);
    expect(out).toBe(`${to}\n`);
    const text = await readFile(to, 'utf8');
    if (ending === '.json') v.parse(resultsSchema, JSON.parse(text));
    else expect(text).toContain('r2-a3');
  });

  it('refuses an ending it cannot write, and a folder that is not there', async () => {
    expect((await called('report', sample, '--to', file('report.docx'))).code).toBe(2);
    const { code, err } = await called(
      'report',
      sample,
      '--to',
      file('no/such/folder/report.html'),
    );
    expect(code).toBe(2);
    expect(err).toContain('untouched');
  });
});

describe('the README', () => {
  it('shows what the command prints for the sample', async () => {
    const readme = await readFile(path.join(root, 'README.md'), 'utf8');
    const [, shown = ''] = /```text\n([\s\S]*?)```/.exec(readme) ?? [];
    const { out } = await called('quantify', sample);
    const parts = shown
      .split('…')
      .map((part) => part.trim())
      .filter((part) => part !== '');
    expect(parts.length).toBeGreaterThan(1);
    for (const part of parts) expect(out).toContain(part);
  });
});

describe('the call itself', () => {
  it.each([
    [[]],
    [['dance']],
    [['read']],
    [['quantify']],
    [['quantify', sample, '--loud']],
    [['report', sample]],
  ])('exits 2 with the usage for %j', async (args) => {
    const { code, out, err } = await called(...args);
    expect({ code, out }).toEqual({ code: 2, out: '' });
    expect(err).toContain('Usage:');
  });

  it('runs from a clone without a build step', async () => {
    const { stdout } = await promisify(execFile)(
      'npm',
      ['run', '-s', 'monobis', '--', '--version'],
      { cwd: root },
    );
    const { version } = v.parse(
      v.object({ version: v.string() }),
      JSON.parse(await readFile(path.join(root, 'package.json'), 'utf8')),
    );
    expect(stdout).toBe(`monobis ${version}\n`);
  });
});
