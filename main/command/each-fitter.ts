import { availableParallelism } from 'node:os';
import { Worker } from 'node:worker_threads';
import { prepare } from '../../analysis/index.ts';
import { type EachItem, type EachLines, linesOf } from './each-line.ts';
import type { SheetFile } from './sheet-file.ts';

/** What a thread is given at its start. */
export interface EachWork {
  readonly opened: Pick<SheetFile, 'sheet' | 'readings'>;
  readonly json: boolean;
}

/** Fits groups of traces; each group's lines come as one promise. */
export interface EachFitter {
  readonly lines: (group: readonly EachItem[]) => Promise<EachLines>;
  /** So many groups may be on their way at once. */
  readonly ahead: number;
  readonly close: () => Promise<void>;
}

/** Below so many bytes of text the fits are done before a thread has started. */
const worthThreads = 2 << 20;
/** More would wait for the one thread that reads. */
const mostThreads = 8;
/** Enough to keep a thread busy while the next file is read, few enough to weigh nothing. */
const groupsAThread = 16;

/** @param bytes of text to be fitted in all */
export function threadsFor(bytes: number): number {
  const threads = Math.min(availableParallelism(), mostThreads);
  return bytes < worthThreads || threads < 2 ? 0 : threads;
}

/** Throws a `Refusal` where the sheet's standards cannot be used. */
export function eachFitter(work: EachWork, threads: number): EachFitter {
  // where the standards cannot be used, that is told here, before a thread is started
  const prepared = prepare(work.opened.sheet, work.opened.readings);
  if (threads > 0) return onThreads(work, threads);
  return {
    lines: async (group) => linesOf(prepared, group, work),
    ahead: 1,
    close: async () => {},
  };
}

interface Waiting {
  readonly resolve: (lines: EachLines) => void;
  readonly reject: (error: unknown) => void;
}

function onThreads(work: EachWork, threads: number): EachFitter {
  const all = Array.from({ length: threads }, () => new Thread(work));
  return {
    lines: (group) => all.reduce((a, b) => (b.load < a.load ? b : a)).lines(group),
    ahead: threads * groupsAThread,
    close: async () => {
      await Promise.all(all.map((thread) => thread.close()));
    },
  };
}

class Thread {
  private readonly worker: Worker;
  /** In the order in which their groups were sent, which is the order of the answers. */
  private readonly waiting: Waiting[] = [];
  private failure: unknown;

  constructor(work: EachWork) {
    this.worker = new Worker(new URL('./each-worker.mjs', import.meta.url), {
      workerData: work,
      // what the command itself was started with (a script in its arguments, say) is not for its threads
      execArgv: [],
    });
    this.worker.on('message', (lines: EachLines) => this.waiting.shift()?.resolve(lines));
    this.worker.on('error', (error) => this.fail(error));
    this.worker.on('exit', () => this.fail(new Error('A thread ended before its work was done.')));
  }

  get load(): number {
    return this.waiting.length;
  }

  lines(group: readonly EachItem[]): Promise<EachLines> {
    // nothing would answer
    if (this.failure !== undefined) return Promise.reject(this.failure);
    return new Promise((resolve, reject) => {
      this.waiting.push({ resolve, reject });
      this.worker.postMessage(group);
    });
  }

  async close(): Promise<void> {
    await this.worker.terminate();
  }

  private fail(error: unknown): void {
    this.failure ??= error;
    for (const { reject } of this.waiting.splice(0)) reject(error);
  }
}
