import type { Sheet } from '../../analysis/index.ts';

/** The sheet as it was and as it may become again. */
export interface History {
  readonly past: readonly Step[];
  readonly present: Sheet;
  readonly future: readonly Step[];
}

interface Step {
  /** Names the change for people: "move window". */
  readonly label: string;
  /** The sheet on the other side of the change. */
  readonly sheet: Sheet;
  /** Changes of one gesture fold into one step; '' never folds. */
  readonly gesture: string;
}

const mostSteps = 500;

export function begun(sheet: Sheet): History {
  return { past: [], present: sheet, future: [] };
}

export function changed(history: History, label: string, sheet: Sheet, gesture = ''): History {
  if (sheet === history.present) return history;
  const last = history.past.at(-1);
  if (last && gesture !== '' && last.gesture === gesture) {
    return { ...history, present: sheet, future: [] };
  }
  const step = { label, sheet: history.present, gesture };
  return { past: [...history.past, step].slice(-mostSteps), present: sheet, future: [] };
}

export function undone({ past, present, future }: History): History {
  const last = past.at(-1);
  if (!last) return { past, present, future };
  const step = { label: last.label, sheet: present, gesture: '' };
  return { past: past.slice(0, -1), present: last.sheet, future: [...future, step] };
}

export function redone({ past, present, future }: History): History {
  const next = future.at(-1);
  if (!next) return { past, present, future };
  const step = { label: next.label, sheet: present, gesture: '' };
  return { past: [...past, step], present: next.sheet, future: future.slice(0, -1) };
}
