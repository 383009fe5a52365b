import { expose } from 'comlink';
import {
  checkByRedraws,
  estimateMissing,
  type MissingEstimate,
  type Quantification,
  quantify,
  type Reading,
  type ReadOptions,
  type RedrawCheck,
  Refusal,
  type RefusalText,
  readExport,
  reportCsv,
  reportHtml,
  resultsJson,
  type Sheet,
  sheetSources,
  type WindowMap,
  windowMap,
} from '../../analysis/index.ts';
import { inSlices } from './in-slices.ts';

/** The science off the screen's thread. Errors lose their fields on the way, so refusals cross as data. */
export type Outcome<T> =
  | { readonly ok: true; readonly value: T }
  | { readonly ok: false; readonly refusal: RefusalText };

export interface ReportTexts {
  readonly html: string;
  readonly csv: string;
  readonly json: string;
}

const noFiles: ReadonlyMap<string, Reading> = new Map();

/** The check that runs; another one, or a stop, takes its place and so ends it. */
let redrawing = 0;

const analysis = {
  read: (
    file: { readonly name: string; readonly bytes: Uint8Array },
    options: ReadOptions,
  ): Reading => readExport(file.bytes, file.name, options),

  quantify: (sheet: Sheet): Outcome<Quantification> => outcome(() => quantify(sheet, noFiles)),

  /** Null if it was stopped. Other calls are answered between its slices. */
  redraw: async (
    sheet: Sheet,
    aliquot: string,
    draws: number,
    onProgress: (done: number) => void,
  ): Promise<Outcome<RedrawCheck | null>> => {
    redrawing += 1;
    const mine = redrawing;
    try {
      const check = checkByRedraws(sheet, noFiles, aliquot, { draws });
      const value = await inSlices(check, { onProgress, isStopped: () => redrawing !== mine });
      return { ok: true, value };
    } catch (error) {
      return refused(error);
    }
  },

  stopRedraws: (): void => {
    redrawing += 1;
  },

  estimateMissing: (sheet: Sheet): Outcome<MissingEstimate> =>
    outcome(() => estimateMissing(sheet, noFiles)),

  windowMap: (sheet: Sheet, aliquot: string): Outcome<WindowMap> =>
    outcome(() => windowMap(sheet, noFiles, aliquot)),

  report: (sheet: Sheet, madeOn: string): Outcome<ReportTexts> =>
    outcome(() => {
      const quantification = quantify(sheet, noFiles);
      const { results } = quantification;
      return {
        html: reportHtml(sheet, quantification, {
          madeOn,
          program: results.program,
          warnings: results.warnings,
          sources: sheetSources(sheet, noFiles),
        }),
        csv: reportCsv(sheet, quantification),
        json: resultsJson(results),
      };
    }),
};

export type AnalysisWorker = typeof analysis;

function outcome<T>(work: () => T): Outcome<T> {
  try {
    return { ok: true, value: work() };
  } catch (error) {
    return refused(error);
  }
}

function refused(error: unknown): Outcome<never> {
  if (error instanceof Refusal) return { ok: false, refusal: error.toText() };
  throw error;
}

expose(analysis);
