/** Where a command writes: results to `result`, everything else to `say`. Injected, so that tests can listen. */
export interface Streams {
  /** Standard output, exactly as given. Resolves when the reader can take more. */
  readonly result: (text: string) => Promise<void>;
  /** One line on standard error. */
  readonly say: (line: string) => void;
}
