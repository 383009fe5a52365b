import { signal } from '@preact/signals';
import { programName, Refusal, type RefusalText, refusalSentence } from '../../analysis/index.ts';

export interface Notice {
  readonly id: number;
  /** A refusal or a fault interrupts a screen reader; news does not. */
  readonly kind: 'news' | 'refusal' | 'fault';
  readonly text: string;
  readonly details?: readonly string[];
  /** What a report of a fault needs, to be copied; never shown. */
  readonly copy?: string;
}

type Telling = Pick<Notice, 'kind' | 'text' | 'details' | 'copy'>;

export const notices = signal<readonly Notice[]>([]);
let next = 1;

export function notify(kind: Notice['kind'], text: string, details?: readonly string[]): void {
  tell({ kind, text, ...(details ? { details } : {}) });
}

/** The same words told again replace those before: a fault that comes with every key stands once. */
function tell(telling: Telling): number {
  const words = ({ kind, text, details = [] }: Telling): string =>
    JSON.stringify([kind, text, details]);
  const others = notices.value.filter((notice) => words(notice) !== words(telling));
  const id = next++;
  notices.value = [...others, { ...telling, id }];
  return id;
}

const passingMs = 10_000;

/** News that the page shows elsewhere too ("saved"): it goes by itself after a while. */
export function mention(text: string): void {
  const id = tell({ kind: 'news', text });
  setTimeout(() => dismiss(id), passingMs);
}

export function dismissAll(): void {
  notices.value = [];
}

export function dismiss(id: number): void {
  notices.value = notices.value.filter((notice) => notice.id !== id);
}

export function tellRefusal(refusal: RefusalText): void {
  notify('refusal', refusalSentence(refusal));
}

/** Runs what a user asked for; a refusal is told in its words, anything else as a fault of ours. */
export async function attempt(work: () => unknown): Promise<void> {
  try {
    await work();
  } catch (error) {
    if (error instanceof Refusal) tellRefusal(error.toText());
    else tellFault(error);
  }
}

export function tellFault(error: unknown): void {
  const details = error instanceof Error ? [`${error.name}: ${error.message}`] : [String(error)];
  const stack = error instanceof Error ? (error.stack ?? '') : '';
  tell({
    kind: 'fault',
    text: 'A fault in the program, not in your files. Your sheet is as it was; save it, and report what stands below.',
    details,
    copy: [programName, ...details, stack].join('\n'),
  });
}
