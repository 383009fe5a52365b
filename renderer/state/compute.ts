import { effect } from '@preact/signals';
import type { Quantification, Sheet } from '../../analysis/index.ts';
import type { Outcome } from '../worker/analysis.worker.ts';
import { latestOnly } from '../worker/latest.ts';
import { isOpen, isWorking, obstacle, quantification, sheet, sheetsShown } from './store.ts';

const longMs = 150;

/** Follows every change of the sheet with a new answer. */
export function startComputing(
  quantifySheet: (sheet: Sheet) => Promise<Outcome<Quantification>>,
  onFault: (error: unknown) => void,
): void {
  let slow: ReturnType<typeof setTimeout> | undefined;
  const settle = (): void => {
    clearTimeout(slow);
    isWorking.value = false;
  };
  const ask = latestOnly(
    ({ present }: { readonly present: Sheet; readonly shown: number }) => quantifySheet(present),
    (outcome, { present, shown }) => {
      if (shown !== sheetsShown.peek()) return;
      // with a newer question waiting, the page is still at work
      if (present === sheet.peek()) settle();
      obstacle.value = outcome.ok ? null : outcome.refusal;
      quantification.value = outcome.ok ? outcome.value : null;
    },
    (error) => {
      settle();
      quantification.value = null;
      onFault(error);
    },
  );
  effect(() => {
    const present = sheet.value;
    const shown = sheetsShown.value;
    if (!isOpen.value) return;
    clearTimeout(slow);
    slow = setTimeout(() => {
      isWorking.value = true;
    }, longMs);
    ask({ present, shown });
  });
}
