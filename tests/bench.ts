import {
  filesOf,
  openSheet,
  prepare,
  quantify,
  quantifyAliquot,
  readExport,
} from '../analysis/index.ts';
import { makeSample } from '../sample-data/scenario.ts';

/** Timings as ratios within one run, and the coverage of the sample by simulation. Nothing here is asserted. */

const sample = makeSample(20261201);
const { sheet } = openSheet(JSON.stringify(sample.sheet));
const bytesOf = (file: string): Uint8Array => sample.files.get(file) ?? new Uint8Array();
const read = () => new Map(filesOf(sheet).map((file) => [file, readExport(bytesOf(file), file)]));
const readings = read();

/** Median of the milliseconds that a call takes, after warming up. */
function median(work: () => void, rounds = 40): number {
  for (let k = 0; k < 10; k++) work();
  const times = Array.from({ length: rounds }, () => {
    const start = performance.now();
    work();
    return performance.now() - start;
  });
  return times.sort((a, b) => a - b)[rounds >> 1] ?? Number.NaN;
}

const prepared = prepare(sheet, readings);
const [aliquot] = sheet.aliquots ?? [];
if (!aliquot) throw new Error('the sample has no aliquot');
const reading = median(() => {
  read();
});
const refit = median(() => {
  quantifyAliquot(prepared, aliquot, readings);
});
const whole = median(() => {
  quantify(sheet, readings);
}, 20);
const rows = [
  ['read the 9 exports of the sample', reading, 1],
  ['one refit with intervals and doubts', refit, refit / reading],
  ['the whole sheet, 6 aliquots', whole, whole / reading],
] as const;
console.log('what                                      ms   over reading');
for (const [what, ms, ratio] of rows) {
  console.log(`${what.padEnd(38)} ${ms.toFixed(1).padStart(6)}   ${ratio.toFixed(2)}`);
}

const seeds = Number(process.argv[2] ?? 300);
let [inside, all] = [0, 0];
for (let seed = 1; seed <= seeds; seed++) {
  const redrawn = makeSample(seed);
  const drawnSheet = openSheet(JSON.stringify(redrawn.sheet)).sheet;
  const drawn = new Map([...redrawn.files].map(([file, bytes]) => [file, readExport(bytes, file)]));
  for (const result of quantify(drawnSheet, drawn).results.aliquots) {
    const truth = redrawn.truth.aliquots.find((each) => each.aliquot === result.aliquot);
    const interval = result.split[0]?.fraction.interval95;
    if (!truth || !interval || truth.hiddenBand !== null) continue;
    all++;
    if ((interval[0] ?? 0) <= truth.fractions.mono && truth.fractions.mono <= (interval[1] ?? 1))
      inside++;
  }
}
// the five clean aliquots of a redraw share the standards: they count as about one
const error = Math.sqrt((0.05 * 0.95) / seeds);
console.log(
  `coverage of the mono fraction: ${((100 * inside) / all).toFixed(1)} % of ${all} intervals (Monte Carlo error about ${(100 * error).toFixed(1)} %)`,
);
