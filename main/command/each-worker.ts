import { parentPort, workerData } from 'node:worker_threads';
import { prepare } from '../../analysis/index.ts';
import type { EachWork } from './each-fitter.ts';
import { type EachItem, linesOf } from './each-line.ts';

const { opened, json }: EachWork = workerData;
const prepared = prepare(opened.sheet, opened.readings);

parentPort?.on('message', (group: readonly EachItem[]) => {
  parentPort?.postMessage(linesOf(prepared, group, { json }));
});
