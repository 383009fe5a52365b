import { randomUUID } from 'node:crypto';

/**
 * The places on disk that the user chose in a dialog, and the handles by which the screen may name
 * them again. The screen never sees or sends a path.
 */
export class Places {
  readonly #paths = new Map<string, string>();

  handleOf(path: string): string {
    for (const [handle, known] of this.#paths) if (known === path) return handle;
    const handle = randomUUID();
    this.#paths.set(handle, path);
    return handle;
  }

  /** The path behind a handle that was given out here; undefined for anything else. */
  pathOf(handle: string): string | undefined {
    return this.#paths.get(handle);
  }
}
