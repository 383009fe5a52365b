import { alarms } from './bench/alarms.ts';
import { coverage, faultsTogether } from './bench/coverage.ts';
import { efficiency } from './bench/efficiency.ts';
import { instrument } from './bench/instrument.ts';
import { sampleCoverage, timings } from './bench/sample.ts';
import { speed } from './bench/speed.ts';

/**
 * Tables by simulation and timings as ratios within one run; nothing here is asserted.
 * `npm run bench` prints all of them with few redraws, `npm run bench -- coverage 3000` one with many.
 */
const tables = {
  timings: { draws: 0, print: timings },
  speed: { draws: 0, print: speed },
  sample: { draws: 100, print: sampleCoverage },
  efficiency: { draws: 500, print: efficiency },
  instrument: { draws: 200, print: instrument },
  alarms: { draws: 400, print: alarms },
  faults: { draws: 100, print: faultsTogether },
  coverage: { draws: 100, print: coverage },
};

const [wanted, draws] = process.argv.slice(2);
const names = Object.keys(tables) as (keyof typeof tables)[];
const chosen = wanted === undefined ? names : names.filter((name) => name === wanted);
if (chosen.length === 0) {
  console.error(`There is no table "${wanted}"; there are ${names.join(', ')}.`);
  process.exitCode = 2;
}
for (const name of chosen) {
  const table = tables[name];
  await table.print(Number(draws ?? table.draws));
  console.log('');
}
