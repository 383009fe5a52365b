import { Refusal } from '../refusal.ts';
import { MAX_LINE_LENGTH, MAX_LINES } from './limits.ts';

export interface Lines {
  /** Line n of the file is `lines[n - 1]`; without its line end. */
  readonly lines: readonly string[];
  /** The last line has no line end: it may have been cut. */
  readonly lastIsOpen: boolean;
}

/**
 * Text to lines; LF, CRLF and CR may be mixed. Throws `Refusal` (`line-too-long`,
 * `too-many-lines`) above the limits.
 */
export function splitLines(text: string): Lines {
  const lines: string[] = [];
  let start = 0;
  let nextLf = text.indexOf('\n');
  let nextCr = text.indexOf('\r');
  while (nextLf !== -1 || nextCr !== -1) {
    const end = nextCr === -1 || (nextLf !== -1 && nextLf < nextCr) ? nextLf : nextCr;
    const isPair = end === nextCr && nextLf === end + 1;
    pushLine(lines, text.slice(start, end));
    start = isPair ? end + 2 : end + 1;
    if (nextLf !== -1 && nextLf < start) nextLf = text.indexOf('\n', start);
    if (nextCr !== -1 && nextCr < start) nextCr = text.indexOf('\r', start);
  }
  const rest = text.slice(start);
  if (rest !== '' && rest !== '\u001a') pushLine(lines, rest);
  return { lines, lastIsOpen: rest.trim() !== '' && rest !== '\u001a' };
}

function pushLine(lines: string[], line: string): void {
  if (line.length > MAX_LINE_LENGTH) {
    throw new Refusal({
      code: 'line-too-long',
      message: `This line has ${line.length} characters; more than ${MAX_LINE_LENGTH} are not read.`,
      where: { line: lines.length + 1 },
      mend: 'Export the spectra with one wavelength a line.',
    });
  }
  if (lines.length >= MAX_LINES) {
    throw new Refusal({
      code: 'too-many-lines',
      message: `The file has more than ${MAX_LINES} lines.`,
      mend: 'Export fewer spectra a file, or split the file.',
    });
  }
  lines.push(line);
}
