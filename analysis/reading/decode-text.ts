import { Refusal } from '../refusal.ts';
import { binaryRefusal } from './not-text.ts';

type Encoding = 'utf-8' | 'utf-8 with byte-order mark' | 'utf-16le' | 'utf-16be' | 'latin-1';

export interface DecodedText {
  readonly text: string;
  readonly encoding: Encoding;
  /** The bytes stop in the middle of a character: the file was cut. */
  readonly endsInsideCharacter: boolean;
}

const SAMPLE = 65_536;

/**
 * Bytes to text. A byte-order mark decides; without one, the places of zero bytes tell UTF-16;
 * what is valid UTF-8 is UTF-8; the rest is Latin-1, read as its superset Windows-1252 (as the
 * Encoding Standard does). Throws `Refusal` (`is-binary`) where the bytes are no text.
 */
export function decodeText(bytes: Uint8Array): DecodedText {
  const decoded = decode(bytes);
  if (hasBinaryMarks(decoded.text)) throw new Refusal(binaryRefusal);
  return decoded;
}

function decode(bytes: Uint8Array): DecodedText {
  const [b0, b1, b2] = bytes;
  if (b0 === 0xef && b1 === 0xbb && b2 === 0xbf) {
    const body = decodeUtf8(bytes.subarray(3));
    if (body) return { ...body, encoding: 'utf-8 with byte-order mark' };
  }
  if (b0 === 0xff && b1 === 0xfe) return decodeUtf16(bytes.subarray(2), 'utf-16le');
  if (b0 === 0xfe && b1 === 0xff) return decodeUtf16(bytes.subarray(2), 'utf-16be');
  const guess = utf16ByZeroBytes(bytes);
  if (guess) return decodeUtf16(bytes, guess);
  if (bytes.includes(0)) throw new Refusal(binaryRefusal);
  const utf8 = decodeUtf8(bytes);
  if (utf8) return utf8;
  const text = new TextDecoder('windows-1252').decode(bytes);
  return { text, encoding: 'latin-1', endsInsideCharacter: false };
}

/** Null where the bytes are not UTF-8; a character cut at the very end is left off and told. */
function decodeUtf8(bytes: Uint8Array): DecodedText | null {
  const start = lastCharacterStart(bytes);
  for (const end of start === bytes.length ? [bytes.length] : [bytes.length, start]) {
    try {
      const text = new TextDecoder('utf-8', { fatal: true, ignoreBOM: true }).decode(
        bytes.subarray(0, end),
      );
      return { text, encoding: 'utf-8', endsInsideCharacter: end < bytes.length };
    } catch {
      // A decoder that is told to be strict throws on what is not UTF-8; the next reading is tried.
    }
  }
  return null;
}

/** Where a multi-byte UTF-8 character that may be cut begins; the length where the end is plain. */
function lastCharacterStart(bytes: Uint8Array): number {
  for (let back = 1; back <= 3; back += 1) {
    const byte = bytes[bytes.length - back];
    if (byte === undefined || byte < 0x80) return bytes.length;
    if (byte >= 0xc0) return back < bytes.length ? bytes.length - back : bytes.length;
  }
  return bytes.length;
}

function decodeUtf16(bytes: Uint8Array, encoding: 'utf-16le' | 'utf-16be'): DecodedText {
  const whole = bytes.subarray(0, bytes.length - (bytes.length % 2));
  return {
    text: new TextDecoder(encoding).decode(whole),
    encoding,
    endsInsideCharacter: whole.length < bytes.length,
  };
}

/** In UTF-16 every digit, sign and delimiter has a zero byte, always on the same side. */
function utf16ByZeroBytes(bytes: Uint8Array): 'utf-16le' | 'utf-16be' | null {
  const end = Math.min(bytes.length, SAMPLE);
  const zeros = [0, 0];
  for (let i = 0; i < end; i += 1) {
    if (bytes[i] === 0) zeros[i % 2] = (zeros[i % 2] ?? 0) + 1;
  }
  const [even = 0, odd = 0] = zeros;
  const half = end / 2;
  // A third: headings of another script may come before the first number.
  // A fiftieth: a character such as U+0100 has its zero byte on the other side.
  if (odd > half / 3 && even <= odd / 50) return 'utf-16le';
  if (even > half / 3 && odd <= even / 50) return 'utf-16be';
  return null;
}

/** Text holds no zero characters and hardly any other control characters. */
function hasBinaryMarks(text: string): boolean {
  if (text.includes('\u0000')) return true;
  const end = Math.min(text.length, SAMPLE);
  let marks = 0;
  for (let i = 0; i < end; i += 1) {
    const code = text.charCodeAt(i);
    // Tab to carriage return are white space; 0x1A is an old end-of-file mark; U+FFFD is a broken character.
    if ((code < 0x20 && !(code >= 0x09 && code <= 0x0d) && code !== 0x1a) || code === 0xfffd) {
      marks += 1;
    }
  }
  return marks > end / 100;
}
