/**
 * Sheets that the operating system, a second start or the command line asks to open. The page takes
 * them one at a time and only once it is there; until then the last one asked for is held.
 */
export class OpenRequests {
  #open: ((file: string) => void) | null = null;
  #held: string | null = null;

  ask(file: string): void {
    if (this.#open) this.#open(file);
    else this.#held = file;
  }

  /** The page is there. */
  deliverTo(open: (file: string) => void): void {
    this.#open = open;
    if (this.#held !== null) open(this.#held);
    this.#held = null;
  }

  /** The page is gone. */
  hold(): void {
    this.#open = null;
  }
}

/** The sheets among the arguments of a start; the first argument is the program itself. */
export function sheetsIn(args: readonly string[]): string[] {
  return args.slice(1).filter((arg) => !arg.startsWith('-') && arg.toLowerCase().endsWith('.json'));
}
