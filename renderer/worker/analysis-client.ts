import { wrap } from 'comlink';
import type { Quantification, Reading, ReadOptions, Sheet } from '../../analysis/index.ts';
import type { AnalysisWorker, Outcome, ReportTexts } from './analysis.worker.ts';

const worker = new Worker(new URL('./analysis.worker.ts', import.meta.url), { type: 'module' });
const remote = wrap<AnalysisWorker>(worker);

export const quantifySheet = async (sheet: Sheet): Promise<Outcome<Quantification>> =>
  remote.quantify(sheet);

export const readFileBytes = (
  name: string,
  bytes: Uint8Array,
  options: ReadOptions = {},
): Promise<Reading> => remote.read({ name, bytes }, options);

export const reportTexts = async (sheet: Sheet): Promise<Outcome<ReportTexts>> =>
  remote.report(sheet, new Date().toISOString());
