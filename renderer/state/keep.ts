import { effect } from '@preact/signals';
import { openSheet, Refusal, type Sheet } from '../../analysis/index.ts';
import type { KeptStore } from './kept-store.ts';
import { fileName, isUnsaved, sheet } from './store.ts';

/** A sheet in the making that a page left behind when it came to its end. */
export interface Kept {
  /** The page that left it. */
  readonly page: string;
  readonly sheet: Sheet;
  readonly name: string | null;
  /** ISO time at which it was kept. */
  readonly at: string;
}

const delayMs = 400;

interface Keeping {
  /** Keeps at once what still waits to be kept: the page is about to go. */
  readonly keepNow: () => Promise<void>;
}

/**
 * Keeps this page's unsaved sheet shortly after each change, and forgets it once it is saved. Every
 * page keeps its own: what another has left behind stays until someone takes it up or discards it.
 */
export function startKeeping(
  page: string,
  store: KeptStore,
  onTrouble: (error: unknown) => void,
): Keeping {
  let timer: ReturnType<typeof setTimeout> | undefined;
  let isTold = false;
  const keepNow = async (): Promise<void> => {
    clearTimeout(timer);
    try {
      if (isUnsaved.peek()) {
        const [present, name] = [sheet.peek(), fileName.peek()];
        await store.put(page, { sheet: present, name, at: new Date().toISOString() });
      } else await store.remove(page);
    } catch (error) {
      // told once: it would come again with every key
      if (!isTold) onTrouble(error);
      isTold = true;
    }
  };
  effect(() => {
    // what is looked at here is what starts the clock again
    void [sheet.value, isUnsaved.value, fileName.value];
    clearTimeout(timer);
    timer = setTimeout(() => void keepNow(), delayMs);
  });
  return { keepNow };
}

/** What pages that are no more have left, the newest first. What cannot be read stays where it is. */
export async function leftBehind(
  store: KeptStore,
  living: ReadonlySet<string>,
): Promise<readonly Kept[]> {
  const kept = (await store.all())
    .filter(([page]) => !living.has(page))
    .flatMap(([page, value]) => keptFrom(page, value) ?? []);
  return kept.sort((one, other) => other.at.localeCompare(one.at));
}

function keptFrom(page: string, value: unknown): Kept | null {
  if (typeof value !== 'object' || value === null || !('sheet' in value)) return null;
  const name = 'name' in value && typeof value.name === 'string' ? value.name : null;
  const at = 'at' in value && typeof value.at === 'string' ? value.at : '';
  try {
    // as strictly as a file: it may be from an older program
    return { page, sheet: openSheet(JSON.stringify(value.sheet)).sheet, name, at };
  } catch (error) {
    if (error instanceof Refusal) return null;
    throw error;
  }
}
