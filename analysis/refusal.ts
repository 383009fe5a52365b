/** Where the trouble is, as far as it is known. Lines count from 1. */
export interface Where {
  readonly file?: string;
  readonly line?: number;
  /** A part of the sheet or of a file, in the user's words: "aliquot a3", "trace 2". */
  readonly what?: string;
}

export interface RefusalText {
  /** Stable, kebab-case; for tests and programs, never shown alone. */
  readonly code: string;
  /** What was found, in the user's words. */
  readonly message: string;
  readonly where?: Where;
  /** What the user can do about it. */
  readonly mend: string;
}

/**
 * The one error a user can mend. Anything else that is thrown is a fault of the program.
 * Its fields are plain data (`toText`), because errors lose theirs when they cross a channel.
 */
export class Refusal extends Error {
  override readonly name = 'Refusal';
  readonly code: string;
  readonly where: Where;
  readonly mend: string;

  constructor(text: RefusalText) {
    super(text.message);
    this.code = text.code;
    this.where = text.where ?? {};
    this.mend = text.mend;
  }

  toText(): RefusalText {
    return { code: this.code, message: this.message, where: this.where, mend: this.mend };
  }
}

/** "crude.csv, line 12: what is wrong. What would mend it." */
export function refusalSentence(text: RefusalText): string {
  const { file, line, what } = text.where ?? {};
  const place = [file, line === undefined ? undefined : `line ${line}`, what].filter(Boolean);
  const head = place.length > 0 ? `${place.join(', ')}: ` : '';
  return `${head}${text.message} ${text.mend}`.trim();
}
