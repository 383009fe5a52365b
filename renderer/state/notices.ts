import { signal } from '@preact/signals';
import { Refusal, type RefusalText, refusalSentence } from '../../analysis/index.ts';

export interface Notice {
  readonly id: number;
  /** A refusal or a fault interrupts a screen reader; news does not. */
  readonly kind: 'news' | 'refusal' | 'fault';
  readonly text: string;
  readonly details?: readonly string[];
}

export const notices = signal<readonly Notice[]>([]);
let next = 1;

export function notify(kind: Notice['kind'], text: string, details?: readonly string[]): void {
  notices.value = [...notices.value, { id: next++, kind, text, ...(details ? { details } : {}) }];
}

export function dismiss(id: number): void {
  notices.value = notices.value.filter((notice) => notice.id !== id);
}

export function tellRefusal(refusal: RefusalText): void {
  notify('refusal', refusalSentence(refusal));
}

/** Runs what a user asked for; a refusal is told in its words, anything else as a fault of ours. */
export async function attempt(work: () => Promise<void> | void): Promise<void> {
  try {
    await work();
  } catch (error) {
    if (error instanceof Refusal) tellRefusal(error.toText());
    else tellFault(error);
  }
}

export function tellFault(error: unknown): void {
  const details = error instanceof Error ? [`${error.name}: ${error.message}`] : [String(error)];
  notify(
    'fault',
    'A fault in the program, not in your files. Your sheet is as it was; save it, and report what stands below.',
    details,
  );
}
