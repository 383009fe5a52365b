import { effect } from '@preact/signals';
import { quantifySheet } from '../worker/analysis-client.ts';
import { latestOnly } from '../worker/latest.ts';
import { tellFault } from './notices.ts';
import { isOpen, isWorking, obstacle, quantification, sheet } from './store.ts';

const longMs = 150;

/** Follows every change of the sheet with a new answer. */
export function startComputing(): void {
  let slow: ReturnType<typeof setTimeout> | undefined;
  const settle = (): void => {
    clearTimeout(slow);
    isWorking.value = false;
  };
  const ask = latestOnly(
    quantifySheet,
    (outcome) => {
      settle();
      obstacle.value = outcome.ok ? null : outcome.refusal;
      quantification.value = outcome.ok ? outcome.value : null;
    },
    (error) => {
      settle();
      quantification.value = null;
      tellFault(error);
    },
  );
  effect(() => {
    const present = sheet.value;
    if (!isOpen.value) return;
    clearTimeout(slow);
    slow = setTimeout(() => {
      isWorking.value = true;
    }, longMs);
    ask(present);
  });
}
