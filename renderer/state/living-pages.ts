/** This page's name among all that are open, or were when they came to their end. */
export const pageName = crypto.randomUUID();

const prefix = 'monobis-page-';

/** Holds a lock for as long as the page lives; no end, however sudden, leaves it behind. */
export function holdPageLock(): void {
  void navigator.locks.request(`${prefix}${pageName}`, () => new Promise(() => {}));
}

export async function livingPages(): Promise<ReadonlySet<string>> {
  const { held = [] } = await navigator.locks.query();
  const names = held.map(({ name = '' }) => name).filter((name) => name.startsWith(prefix));
  return new Set(names.map((name) => name.slice(prefix.length)));
}
