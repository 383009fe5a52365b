import { effect } from '@preact/signals';
import { openSheet, Refusal, type Sheet, sheetText } from '../../analysis/index.ts';
import { fileName, isUnsaved, sheet } from './store.ts';

/** The sheet in the making, kept in the browser's own store so that a crash loses nothing. */
export interface Kept {
  readonly sheet: Sheet;
  readonly name: string | null;
  /** ISO time at which it was kept. */
  readonly at: string;
}

const storeName = 'kept';
const key = 'sheet';
const delayMs = 400;

/** Keeps every unsaved sheet shortly after it changes; forgets it once it is saved. */
export function startKeeping(onTrouble: (error: unknown) => void): void {
  let timer: ReturnType<typeof setTimeout> | undefined;
  effect(() => {
    const [present, unsaved, name] = [sheet.value, isUnsaved.value, fileName.value];
    clearTimeout(timer);
    timer = setTimeout(() => {
      const kept = { text: sheetText(present), name, at: new Date().toISOString() };
      (unsaved ? put(kept) : clearKept()).catch(onTrouble);
    }, delayMs);
  });
}

/** What was kept and not saved; null if nothing was, or if it can no longer be read. */
export async function keptSheet(): Promise<Kept | null> {
  const value: unknown = await request('readonly', (store) => store.get(key));
  if (typeof value !== 'object' || value === null) return null;
  if (!('text' in value) || typeof value.text !== 'string') return null;
  const name = 'name' in value && typeof value.name === 'string' ? value.name : null;
  const at = 'at' in value && typeof value.at === 'string' ? value.at : '';
  try {
    return { sheet: openSheet(value.text).sheet, name, at };
  } catch (error) {
    if (error instanceof Refusal) return null;
    throw error;
  }
}

export async function clearKept(): Promise<void> {
  await request('readwrite', (store) => store.delete(key));
}

async function put(kept: object): Promise<void> {
  await request('readwrite', (store) => store.put(kept, key));
}

async function request<T>(
  mode: IDBTransactionMode,
  ask: (store: IDBObjectStore) => IDBRequest<T>,
): Promise<T> {
  const database = await openDatabase();
  try {
    return await promised(ask(database.transaction(storeName, mode).objectStore(storeName)));
  } finally {
    database.close();
  }
}

function openDatabase(): Promise<IDBDatabase> {
  const opening = indexedDB.open('monobis', 1);
  opening.onupgradeneeded = () => opening.result.createObjectStore(storeName);
  return promised(opening);
}

function promised<T>(asked: IDBRequest<T>): Promise<T> {
  return new Promise((resolve, reject) => {
    asked.onsuccess = () => resolve(asked.result);
    asked.onerror = () => reject(asked.error);
  });
}
