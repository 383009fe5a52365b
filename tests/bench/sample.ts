import {
  filesOf,
  openSheet,
  prepare,
  quantify,
  quantifyAliquot,
  readExport,
} from '../../analysis/index.ts';
import { makeSample } from '../../sample-data/scenario.ts';
import { percent, shareError } from './redraw.ts';

/** Median of the milliseconds that a call takes, after warming up. */
function median(work: () => void, rounds: number): number {
  for (let k = 0; k < 10; k++) work();
  const times = Array.from({ length: rounds }, () => {
    const start = performance.now();
    work();
    return performance.now() - start;
  });
  return times.sort((a, b) => a - b)[rounds >> 1] ?? Number.NaN;
}

function opened(seed: number) {
  const sample = makeSample(seed);
  const { sheet } = openSheet(JSON.stringify(sample.sheet));
  const read = () =>
    new Map(
      filesOf(sheet).map((file) => [
        file,
        readExport(sample.files.get(file) ?? new Uint8Array(), file),
      ]),
    );
  return { sheet, truth: sample.truth, read };
}

/** What the app does with the sample, in milliseconds and as ratios to reading its exports. */
export function timings(): void {
  const { sheet, read } = opened(20261201);
  const readings = read();
  const prepared = prepare(sheet, readings);
  const [aliquot] = sheet.aliquots ?? [];
  if (!aliquot) throw new Error('the sample has no aliquot');
  const reading = median(read, 40);
  const rows = [
    ['read the 9 exports of the sample', reading],
    ['make the standards ready', median(() => prepare(sheet, readings), 40)],
    [
      'one refit with intervals and doubts',
      median(() => quantifyAliquot(prepared, aliquot, readings), 40),
    ],
    ['the whole sheet, 6 aliquots', median(() => quantify(sheet, readings), 20)],
  ] as const;
  console.log('The sample                                ms   over reading');
  for (const [what, ms] of rows) {
    console.log(`  ${what.padEnd(38)} ${ms.toFixed(1).padStart(6)}   ${(ms / reading).toFixed(2)}`);
  }
}

/** Coverage of the mono fraction in the sample's clean aliquots, everything redrawn. */
export function sampleCoverage(draws: number): void {
  let [inside, all] = [0, 0];
  for (let seed = 1; seed <= draws; seed++) {
    const { sheet, truth, read } = opened(seed);
    for (const result of quantify(sheet, read()).results.aliquots) {
      const known = truth.aliquots.find((each) => each.aliquot === result.aliquot);
      const interval = result.split[0]?.fraction.interval95;
      if (!known || !interval || known.hiddenBand !== null) continue;
      all++;
      const [low, high] = interval;
      if ((low ?? 0) <= known.fractions.mono && known.fractions.mono <= (high ?? 1)) inside++;
    }
  }
  // the five clean aliquots of a redraw share the standards: they count as about one
  console.log(
    `Coverage of the mono fraction in the sample, ${draws} redraws: ${percent(inside / all)} of ${all} intervals (Monte Carlo error about ${percent(shareError(0.95, draws))})`,
  );
}
