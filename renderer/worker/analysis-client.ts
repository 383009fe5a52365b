import { proxy, type Remote, wrap } from 'comlink';
import type {
  MissingEstimate,
  Quantification,
  Reading,
  ReadOptions,
  RedrawCheck,
  Sheet,
  WindowMap,
} from '../../analysis/index.ts';
import type { AnalysisWorker, Outcome, ReportTexts } from './analysis.worker.ts';

interface Started {
  readonly worker: Worker;
  readonly calls: Remote<AnalysisWorker>;
  /** Rejects if the worker breaks, which no call of its own would ever tell. */
  readonly broken: Promise<never>;
}

let started: Started | null = null;

function start(): Started {
  const worker = new Worker(new URL('./analysis.worker.ts', import.meta.url), { type: 'module' });
  const broken = new Promise<never>((_, reject) => {
    worker.onerror = (event) => reject(new Error(event.message || 'the analysis did not start'));
  });
  broken.catch(() => {
    worker.terminate();
    if (started?.worker === worker) started = null;
  });
  return { worker, calls: wrap<AnalysisWorker>(worker), broken };
}

/** One call; after a break the next one gets a worker of its own. */
async function asked<T>(call: (calls: Remote<AnalysisWorker>) => Promise<T>): Promise<T> {
  started ??= start();
  return Promise.race([call(started.calls), started.broken]);
}

export const quantifySheet = (sheet: Sheet): Promise<Outcome<Quantification>> =>
  asked(async (calls) => calls.quantify(sheet));

export const readFileBytes = (
  name: string,
  bytes: Uint8Array,
  options: ReadOptions = {},
): Promise<Reading> => asked(async (calls) => calls.read({ name, bytes }, options));

export const reportTexts = (sheet: Sheet): Promise<Outcome<ReportTexts>> =>
  asked(async (calls) => calls.report(sheet, new Date().toISOString()));

export const estimateMissingSpectrum = (sheet: Sheet): Promise<Outcome<MissingEstimate>> =>
  asked(async (calls) => calls.estimateMissing(sheet));

export const mapWindows = (sheet: Sheet, aliquot: string): Promise<Outcome<WindowMap>> =>
  asked(async (calls) => calls.windowMap(sheet, aliquot));

/** Null if it was stopped, or if another check took its place. `onProgress` is given the draws done. */
export const redrawAliquot = (
  sheet: Sheet,
  aliquot: string,
  draws: number,
  onProgress: (done: number) => void,
): Promise<Outcome<RedrawCheck | null>> =>
  asked(async (calls) => calls.redraw(sheet, aliquot, draws, proxy(onProgress)));

/** A worker that is not there has nothing to stop. */
export function stopRedraws(): void {
  void started?.calls.stopRedraws();
}
