/** Where sheets in the making are kept: a few values by name. */
export interface KeptStore {
  readonly put: (key: string, value: unknown) => Promise<void>;
  readonly remove: (key: string) => Promise<void>;
  readonly all: () => Promise<readonly (readonly [string, unknown])[]>;
}

const storeName = 'kept';

/** The browser's own database; outlives the page, its crash and the machine's. */
export const browserStore: KeptStore = {
  put: async (key, value) => {
    await request('readwrite', (store) => store.put(value, key));
  },
  remove: async (key) => {
    await request('readwrite', (store) => store.delete(key));
  },
  all: async () => {
    const keys = await request('readonly', (store) => store.getAllKeys());
    return Promise.all(
      keys.map(
        async (key) => [String(key), await request('readonly', (store) => store.get(key))] as const,
      ),
    );
  },
};

async function request<T>(
  mode: IDBTransactionMode,
  ask: (store: IDBObjectStore) => IDBRequest<T>,
): Promise<T> {
  const database = await openDatabase();
  try {
    const transaction = database.transaction(storeName, mode);
    const done = new Promise<void>((resolve, reject) => {
      transaction.oncomplete = () => resolve();
      transaction.onabort = () => reject(transaction.error);
    });
    const result = await promised(ask(transaction.objectStore(storeName)));
    // a request may succeed and its transaction still fail, for want of room
    await done;
    return result;
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
