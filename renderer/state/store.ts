import { batch, computed, signal } from '@preact/signals';
import {
  newSheet,
  type Quantification,
  type RefusalText,
  type Sheet,
} from '../../analysis/index.ts';
import { begun, changed, type History, redone, undone } from './history.ts';

/** All that the page is drawn from. Signals are written here and in `compute.ts` only. */

const history = signal<History>(begun(newSheet()));
/** Null while the page still shows how to begin. */
const opened = signal(false);
const saved = signal<Sheet | null>(null);

export const sheet = computed(() => history.value.present);
export const isOpen = computed(() => opened.value);
export const undoLabel = computed(() => history.value.past.at(-1)?.label ?? null);
export const redoLabel = computed(() => history.value.future.at(-1)?.label ?? null);
/** True if the sheet differs from what was last saved or opened. */
export const isUnsaved = computed(() => opened.value && sheet.value !== saved.value);

/** Name of the file, for the title and for saving; null before it has one. */
export const fileName = signal<string | null>(null);
/** Where a save goes without asking; a platform's own. */
export const saveHandle = signal<unknown>(null);

const chosen = signal<string | null>(null);
/** The aliquot that Fit and Split show: the one chosen, or the first there is. */
export const aliquot = computed(() => {
  const aliquots = sheet.value.aliquots ?? [];
  return aliquots.some(({ id }) => id === chosen.value) ? chosen.value : (aliquots[0]?.id ?? null);
});

export const quantification = signal<Quantification | null>(null);
/** Why the sheet as a whole cannot be computed yet. */
export const obstacle = signal<RefusalText | null>(null);
/** True while an answer has been long in coming. */
export const isWorking = signal(false);

/** The one way in which the sheet changes. */
export function change(label: string, edit: (sheet: Sheet) => Sheet, gesture?: string): void {
  batch(() => {
    history.value = changed(history.value, label, edit(sheet.value), gesture);
    opened.value = true;
  });
}

export function undo(): void {
  history.value = undone(history.value);
}

export function redo(): void {
  history.value = redone(history.value);
}

export function chooseAliquot(id: string): void {
  chosen.value = id;
}

/** Counts the sheets that the page has shown: an answer to an earlier one must not stand under a later. */
export const sheetsShown = signal(0);

/** Puts another sheet on the page; what was there is gone from the history, and its answer with it. */
export function replaceSheet(
  next: Sheet,
  place: { readonly name: string | null; readonly handle: unknown; readonly isSaved: boolean },
): void {
  batch(() => {
    history.value = begun(next);
    opened.value = true;
    saved.value = place.isSaved ? next : null;
    fileName.value = place.name;
    saveHandle.value = place.handle;
    chosen.value = null;
    quantification.value = null;
    obstacle.value = null;
    sheetsShown.value += 1;
  });
}

export function markSaved(written: Sheet, name: string, handle: unknown): void {
  batch(() => {
    saved.value = written;
    fileName.value = name;
    saveHandle.value = handle;
  });
}
