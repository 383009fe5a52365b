import { signal } from '@preact/signals';

/** A question that stands on the page; `answer` settles it. */
export const question = signal<{ readonly answer: (goOn: boolean) => void } | null>(null);

/** Asks whether unsaved changes may go. */
export function confirmLoss(): Promise<boolean> {
  return new Promise((resolve) => {
    // one question at a time: the earlier one counts as declined
    question.value?.answer(false);
    question.value = {
      answer: (goOn) => {
        question.value = null;
        resolve(goOn);
      },
    };
  });
}
