import { execFile, spawn } from 'node:child_process';
import { once } from 'node:events';
import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { promisify } from 'node:util';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { eachItems } from '../../../main/command/each-items.ts';
import { EachProgress } from '../../../main/command/each-progress.ts';
import { quantifyEachCommand } from '../../../main/command/quantify-each.ts';

const root = path.resolve(import.meta.dirname, '../../..');
const sheet = path.join(root, 'sample-data/piperazine.sheet.json');
const crude = path.join(root, 'sample-data/crude/arm-into-core.csv');
let folder = '';
const file = (name: string) => path.join(folder, name);

beforeAll(async () => {
  folder = await mkdtemp(path.join(tmpdir(), 'monobis-each-'));
  await writeFile(file('empty.csv'), '');
});
afterAll(() => rm(folder, { recursive: true }));

async function each(files: readonly string[], threads: number) {
  let [out, err] = ['', ''];
  const streams = {
    result: async (text: string) => {
      out += text;
    },
    say: (line: string) => {
      err += `${line}\n`;
    },
  };
  const code = await quantifyEachCommand({ sheet, files, json: true }, streams, threads);
  return { code, out, err };
}

describe('monobis quantify --each', () => {
  it('writes the same bytes in the same order on threads and without', async () => {
    // more groups than threads, and a refused file between others
    const many = Array.from({ length: 30 }, () => crude);
    const files = [...many, file('empty.csv'), crude, file('not-there.csv'), crude];
    const alone = await each(files, 0);
    const shared = await each(files, 2);
    expect(shared.code).toBe(3);
    expect(shared.out).toBe(alone.out);
    const aliquots = alone.out.split('\n').map((line) => line.slice(0, 300));
    expect(aliquots.findIndex((line) => line.includes('empty.csv'))).toBe(90);
    expect(aliquots.findIndex((line) => line.includes('not-there.csv'))).toBe(94);
  });

  it('exits 2 when nothing could be fitted', async () => {
    expect((await each([file('empty.csv')], 0)).code).toBe(2);
  });

  it('says the totals last, on standard error', async () => {
    const { err } = await each([crude, file('empty.csv')], 0);
    expect(err.trim().split('\n').at(-1)).toMatch(
      /^3 fitted, 1 refused in \d+\.\d s, [\d.]+ traces\/s$/,
    );
  });

  it('reads a file when its turn has come, and no sooner', async () => {
    const copy = file('copy.csv');
    await writeFile(copy, await readFile(crude));
    // a group is full before the copy's turn
    const items = eachItems([...Array.from({ length: 11 }, () => crude), copy]);
    const first = await items.next();
    expect(first.value).toHaveLength(32);
    await rm(copy);
    const second = await items.next();
    expect(second.value?.at(-1)).toMatchObject({ aliquot: copy, refused: { what: 'the file' } });
  });

  it('waits for the reader of standard output', async () => {
    let writes = 0;
    let takeMore = () => {};
    const streams = {
      result: () => {
        writes++;
        return new Promise<void>((resolve) => {
          takeMore = resolve;
        });
      },
      say: () => {},
    };
    const files = Array.from({ length: 25 }, () => crude);
    const done = quantifyEachCommand({ sheet, files, json: true }, streams, 0);
    const settled = Promise.race([
      done,
      new Promise((resolve) => setTimeout(resolve, 1500, 'waits')),
    ]);
    expect(await settled).toBe('waits');
    expect(writes).toBe(1);
    while ((await Promise.race([done, new Promise((r) => setTimeout(r, 20, null))])) === null) {
      takeMore();
    }
    expect(writes).toBe(3);
    expect(await done).toBe(0);
  });

  it('ends quietly when the reader goes away', async () => {
    const files = Array.from({ length: 40 }, () => crude);
    const child = spawn(
      process.execPath,
      ['main/command/launch.mjs', 'quantify', sheet, '--each', ...files, '--json'],
      { cwd: root },
    );
    let err = '';
    child.stderr.on('data', (text) => {
      err += text;
    });
    await once(child.stdout, 'data');
    child.stdout.destroy();
    const [code] = await once(child, 'exit');
    expect(code).toBe(0);
    expect(err).not.toMatch(/EPIPE|\bat .*\.ts/);
  });

  it('runs on threads straight from a clone', async () => {
    // blank lines take it past the size from which threads are worth their start
    const blank = `${' '.repeat(900_000)}\n`.repeat(3);
    await writeFile(file('long.csv'), `${await readFile(crude, 'latin1')}${blank}`, 'latin1');
    const { stdout, stderr } = await promisify(execFile)(
      process.execPath,
      ['main/command/launch.mjs', 'quantify', sheet, '--each', file('long.csv')],
      { cwd: root },
    );
    const lines = stdout.trim().split('\n');
    expect(lines.map((line) => line.split('  ')[0])).toEqual(
      [0, 1, 2].map((trace) => `${file('long.csv')}#${trace}`),
    );
    expect(stderr).toContain('3 fitted, 0 refused in');
  });
});

describe('the progress', () => {
  it('is said at most once a second, with count, rate and refused, and once at the end', () => {
    let ms = 0;
    const said: string[] = [];
    const progress = new EachProgress(
      (line) => said.push(line),
      () => ms,
    );
    for (ms = 100; ms <= 3000; ms += 100) progress.add({ fitted: 10, refused: 1 });
    ms = 3000;
    progress.finish();
    expect(said).toEqual([
      '100 fitted, 10 refused so far, 110 traces/s',
      '200 fitted, 20 refused so far, 110 traces/s',
      '300 fitted, 30 refused so far, 110 traces/s',
      '300 fitted, 30 refused in 3.0 s, 110 traces/s',
    ]);
  });
});
