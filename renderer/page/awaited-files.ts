import { signal } from '@preact/signals';

/** Files that the open sheet names and that were not to be had: the page asks for them. */
export const awaited = signal<readonly string[]>([]);
