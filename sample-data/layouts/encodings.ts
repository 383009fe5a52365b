/** Text to bytes for the encodings that exports come in. TextEncoder knows UTF-8 alone. */

export function utf8(text: string): Uint8Array {
  return new TextEncoder().encode(text);
}

export function utf8WithByteOrderMark(text: string): Uint8Array {
  return utf8(`\uFEFF${text}`);
}

/** UTF-16, low byte first, with its byte-order mark. */
export function utf16LittleEndian(text: string): Uint8Array {
  const marked = `\uFEFF${text}`;
  const bytes = new Uint8Array(2 * marked.length);
  for (let i = 0; i < marked.length; i++) {
    const unit = marked.charCodeAt(i);
    bytes[2 * i] = unit & 0xff;
    bytes[2 * i + 1] = unit >>> 8;
  }
  return bytes;
}

/** ISO 8859-1: one byte a character; anything beyond it is a mistake in the scenario. */
export function latin1(text: string): Uint8Array {
  return Uint8Array.from(text, (character) => {
    const code = character.charCodeAt(0);
    if (code > 0xff) throw new RangeError(`"${character}" is not in ISO 8859-1`);
    return code;
  });
}
