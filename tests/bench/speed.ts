import { execFile, spawn } from 'node:child_process';
import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { pathToFileURL } from 'node:url';
import { promisify } from 'node:util';
import { fcnnls } from 'ml-fcnnls';
import { openSheet, prepare, quantifyAliquot, readExport } from '../../analysis/index.ts';
import { orthonormal, projectedOut } from '../../analysis/spectrum/vectors.ts';
import { commonWeights } from '../../analysis/unmixing/batch/common-weights.ts';
import { ownWeights } from '../../analysis/unmixing/batch/own-weights.ts';
import { bands, simulated, usual } from '../analysis/simulated.ts';
import { epsilonAt, normal } from '../analysis/synthetic.ts';

const points = 401;
const count = 10_000;
const tracesAFile = 1000;
const nm = Float64Array.from({ length: points }, (_, i) => 250 + 0.5 * i);
const species = (['arm', 'mono', 'bis'] as const).map((name) =>
  nm.map((at) => epsilonAt(bands[name], at)),
);
const baseline = [nm.map(() => 1), nm.map((at) => (at - 350) / 200)];
const columns = [...species, ...baseline];
const free = [false, false, false, true, true];

/** Speeds as ratios within one run; nothing is asserted. */
export async function speed(): Promise<void> {
  const folder = await mkdtemp(path.join(tmpdir(), 'monobis-speed-'));
  try {
    const spectra = madeSpectra();
    await solvers(spectra, folder);
    await wholeCommand(spectra, folder);
  } finally {
    await rm(folder, { recursive: true });
  }
}

/** 10,000 mixtures one after the other, a tenth of each species' amounts nothing. */
function madeSpectra(): Float64Array {
  const gauss = normal(7);
  const uniform = () => Math.abs(gauss() / 3) % 1;
  const { constant, transmittance } = usual.noise;
  const spectra = new Float64Array(count * points);
  for (let s = 0; s < count; s++) {
    const amounts = columns.map((_, k) => {
      if (k > 2) return 5e-4 * gauss();
      return uniform() < 0.1 ? 0 : 2e-5 * uniform();
    });
    for (let i = 0; i < points; i++) {
      let absorbance = 0;
      for (let k = 0; k < columns.length; k++) {
        absorbance += (amounts[k] ?? 0) * (columns[k]?.[i] ?? 0);
      }
      const sd = Math.hypot(constant, transmittance * 10 ** absorbance);
      spectra[s * points + i] = absorbance + sd * gauss();
    }
  }
  return spectra;
}

async function solvers(spectra: Float64Array, folder: string): Promise<void> {
  const memory = perSecond(() => readOnce(spectra), count);
  const scipy = await scipyPerSecond(spectra, folder);
  const some = 1000;
  const rows: (readonly [string, number | null])[] = [
    ['reading the data once from memory', memory],
    [
      'ours, common weights, non-negative',
      perSecond(() => commonWeights(columns, spectra, free), count),
    ],
    [
      'ours, own weights, covariance, intervals',
      perSecond(() => ownWeights(columns, spectra, usual.noise), count),
    ],
    [
      `ml-fcnnls, baseline taken out first (${some})`,
      perSecond(() => byFcnnls(spectra, some), some, 2),
    ],
    ['scipy.optimize.nnls in a loop, 7 columns', scipy],
  ];
  console.log(
    `Solvers: ${count} spectra x ${points} points, 3 non-negative species, offset and line, one thread`,
  );
  console.log('  method                                       spectra/s  of memory  over scipy');
  for (const [what, rate] of rows) {
    if (rate === null) {
      console.log(`  ${what.padEnd(43)}  not at hand: python3 with scipy was not found`);
      continue;
    }
    const over = scipy === null ? '-' : (rate / scipy).toFixed(2);
    console.log(
      `  ${what.padEnd(43)} ${Math.round(rate).toString().padStart(10)} ${(rate / memory).toFixed(4).padStart(10)} ${over.padStart(11)}`,
    );
  }
}

/** Best of a few rounds, after one to warm up: what else the machine does only takes away. */
function perSecond(work: () => unknown, spectra: number, rounds = 7): number {
  work();
  let best = Number.POSITIVE_INFINITY;
  for (let round = 0; round < rounds; round++) {
    const start = performance.now();
    work();
    best = Math.min(best, performance.now() - start);
  }
  return (1000 * spectra) / best;
}

/** Four sums at once, so that no addition waits for the one before. */
function readOnce(values: Float64Array): number {
  let [a, b, c, d] = [0, 0, 0, 0];
  for (let i = 0; i + 3 < values.length; i += 4) {
    a += values[i] ?? 0;
    b += values[i + 1] ?? 0;
    c += values[i + 2] ?? 0;
    d += values[i + 3] ?? 0;
  }
  return a + b + c + d;
}

function byFcnnls(spectra: Float64Array, some: number): unknown {
  const basis = orthonormal(baseline);
  const rest = species.map((column) => projectedOut(basis, column));
  const mixed = Array.from({ length: some }, (_, s) =>
    projectedOut(basis, spectra.subarray(s * points, (s + 1) * points)),
  );
  const rows = (vectors: readonly Float64Array[]) =>
    Array.from(nm, (_, i) => vectors.map((vector) => vector[i] ?? 0));
  return fcnnls(rows(rest), rows(mixed));
}

const scipyLoop = `
import sys, time
import numpy as np
from scipy.optimize import nnls
a = np.fromfile(sys.argv[1]).reshape(5, ${points}).T
a = np.ascontiguousarray(np.hstack([a, -a[:, 3:]]))
y = np.fromfile(sys.argv[2]).reshape(-1, ${points})
best = 1e9
for _ in range(2):
    start = time.perf_counter()
    for row in y: nnls(a, row)
    best = min(best, time.perf_counter() - start)
print(len(y) / best)
`;

async function scipyPerSecond(spectra: Float64Array, folder: string): Promise<number | null> {
  const [a, y] = [path.join(folder, 'columns'), path.join(folder, 'spectra')];
  const flat = new Float64Array(columns.length * points);
  for (const [k, column] of columns.entries()) flat.set(column, k * points);
  await writeFile(a, flat);
  await writeFile(y, spectra);
  try {
    const { stdout } = await promisify(execFile)('python3', ['-c', scipyLoop, a, y]);
    return Number(stdout);
  } catch {
    return null;
  }
}

async function wholeCommand(spectra: Float64Array, folder: string): Promise<void> {
  const sheetText = JSON.stringify({
    ...simulated({ stepNm: 0.5, fit: { windowNm: [250, 450], baseline: 'line' } }).sheet,
    aliquots: [],
  });
  const sheet = path.join(folder, 'batch.sheet.json');
  await writeFile(sheet, sheetText);
  const texts = Array.from({ length: count / tracesAFile }, (_, f) =>
    exportText(spectra, f * tracesAFile),
  );
  const files = texts.map((_, f) => path.join(folder, `batch-${f}.csv`));
  for (const [f, text] of texts.entries()) await writeFile(files[f] ?? '', text);
  console.log(`Whole command: text exports of ${tracesAFile} traces x ${points} points`);
  console.log('  command                         traces   seconds  traces/s  peak MB');
  const seconds: number[] = [];
  for (const [what, args] of [
    ['read', ['read', ...files.slice(0, 1)]],
    ['read', ['read', ...files]],
    ['quantify --each --json', ['quantify', sheet, '--json', '--each', ...files.slice(0, 1)]],
    ['quantify --each --json', ['quantify', sheet, '--json', '--each', ...files]],
  ] as const) {
    const traces = tracesAFile * args.filter((arg) => arg.endsWith('.csv')).length;
    const run = await timed(folder, args);
    seconds.push(run.seconds);
    console.log(
      `  ${what.padEnd(28)} ${String(traces).padStart(9)} ${run.seconds.toFixed(1).padStart(9)} ${Math.round(
        traces / run.seconds,
      )
        .toString()
        .padStart(9)} ${Math.round(run.peakMb).toString().padStart(8)}`,
    );
  }
  const [, readAll = 0, , eachAll = 1] = seconds;
  console.log(
    `  the whole command runs at ${(readAll / eachAll).toFixed(2)} of the speed of only reading the text (aim 0.5)`,
  );
  console.log(`  one refit with intervals and doubts: ${oneRefit(sheetText, texts[0] ?? '')}`);
}

function exportText(spectra: Float64Array, from: number): string {
  const traces = Array.from({ length: tracesAFile }, (_, k) => from + k);
  const lines = [`Wavelength (nm),${traces.map((s) => `Absorbance ${s + 1}`).join(',')}`];
  for (let i = 0; i < points; i++) {
    const values = traces.map((s) => (spectra[s * points + i] ?? 0).toFixed(6));
    lines.push(`${nm[i]?.toFixed(1)},${values.join(',')}`);
  }
  return `${lines.join('\n')}\n`;
}

const launch = path.resolve(import.meta.dirname, '../../main/command/launch.mjs');
const watched = `
process.on('exit', () => process.stderr.write('peak ' + process.resourceUsage().maxRSS));
await import(${JSON.stringify(pathToFileURL(launch).href)});
`;

/** One call of the command line in a process of its own, its output thrown away. */
async function timed(
  folder: string,
  args: readonly string[],
): Promise<{ seconds: number; peakMb: number }> {
  const script = path.join(folder, 'watched.mjs');
  await writeFile(script, watched);
  const start = performance.now();
  const child = spawn(process.execPath, [script, ...args], { stdio: ['ignore', 'ignore', 'pipe'] });
  let said = '';
  child.stderr.on('data', (text) => {
    said += text;
  });
  const code = await new Promise((resolve) => child.on('close', resolve));
  const seconds = (performance.now() - start) / 1000;
  // a run that failed is no measurement
  if (code !== 0) throw new Error(`${args[0]} ended with ${code}: ${said}`);
  return { seconds, peakMb: Number(/peak (\d+)$/.exec(said)?.[1]) / 1024 };
}

function oneRefit(sheetText: string, text: string): string {
  const { sheet } = openSheet(sheetText);
  const prepared = prepare(sheet, new Map());
  const reading = readExport(new TextEncoder().encode(text), 'batch.csv');
  const readings = new Map([['batch.csv', reading]]);
  const times = Array.from({ length: 300 }, (_, trace) => {
    const start = performance.now();
    const spectrum = { file: 'batch.csv', trace };
    quantifyAliquot(prepared, { id: 'refit', spectrum }, readings);
    return performance.now() - start;
  });
  // the first ones warm up
  const sorted = times.slice(50).sort((a, b) => a - b);
  const [median, late] = [0.5, 0.95].map((share) => sorted[Math.floor(share * sorted.length)]);
  return `${median?.toFixed(1)} ms (median), ${late?.toFixed(1)} ms (95 %)`;
}
