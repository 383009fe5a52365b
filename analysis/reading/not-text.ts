import type { RefusalText } from '../refusal.ts';

interface Signature {
  readonly at: number;
  readonly bytes: readonly number[];
  readonly kind: 'picture' | 'pdf' | 'zip' | 'compound' | 'packed' | 'program';
}

const ascii = (text: string) => Array.from(text, (letter) => letter.charCodeAt(0));

/** First bytes as the published format descriptions give them. */
const signatures: readonly Signature[] = [
  { at: 0, bytes: [0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a], kind: 'picture' },
  { at: 0, bytes: [0xff, 0xd8, 0xff], kind: 'picture' },
  { at: 0, bytes: ascii('GIF8'), kind: 'picture' },
  { at: 0, bytes: [0x49, 0x49, 0x2a, 0x00], kind: 'picture' },
  { at: 0, bytes: [0x4d, 0x4d, 0x00, 0x2a], kind: 'picture' },
  { at: 8, bytes: ascii('WEBP'), kind: 'picture' },
  { at: 4, bytes: ascii('ftyp'), kind: 'picture' },
  { at: 0, bytes: ascii('%PDF-'), kind: 'pdf' },
  { at: 0, bytes: [0x50, 0x4b, 0x03, 0x04], kind: 'zip' },
  { at: 0, bytes: [0x50, 0x4b, 0x05, 0x06], kind: 'zip' },
  { at: 0, bytes: [0xd0, 0xcf, 0x11, 0xe0, 0xa1, 0xb1], kind: 'compound' },
  { at: 0, bytes: [0x1f, 0x8b, 0x08], kind: 'packed' },
  { at: 0, bytes: [0x37, 0x7a, 0xbc, 0xaf, 0x27, 0x1c], kind: 'packed' },
  { at: 0, bytes: [0x42, 0x5a, 0x68, 0x39], kind: 'packed' },
  { at: 0, bytes: [0xfd, 0x37, 0x7a, 0x58, 0x5a], kind: 'packed' },
  { at: 0, bytes: [0x7f, 0x45, 0x4c, 0x46], kind: 'program' },
];

const exportAsText = 'Export the spectrum from its program as text (CSV) and load that file.';

const refusals = {
  picture: {
    code: 'is-a-picture',
    message: 'This is a picture, not a spectrum: it holds no numbers to read.',
    mend: exportAsText,
  },
  pdf: { code: 'is-a-pdf', message: 'This is a PDF document.', mend: exportAsText },
  workbook: {
    code: 'is-a-workbook',
    message: 'This is a spreadsheet workbook, not text.',
    mend: 'Save the table from the spreadsheet as text (CSV) and load that file.',
  },
  archive: {
    code: 'is-packed',
    message: 'This is a packed (compressed) file.',
    mend: 'Unpack it and load the text export inside.',
  },
  program: {
    code: 'is-binary',
    message: 'This is a binary file, not text.',
    mend: exportAsText,
  },
} satisfies Record<string, RefusalText>;

export const binaryRefusal: RefusalText = refusals.program;

/**
 * What a file is that is plainly not text, told by its first bytes and never by its extension;
 * null where nothing is recognised.
 */
export function recogniseBinary(bytes: Uint8Array): RefusalText | null {
  const found = signatures.find(({ at, bytes: wanted }) =>
    wanted.every((byte, index) => bytes[at + index] === byte),
  );
  switch (found?.kind) {
    case undefined:
      return null;
    case 'picture':
      // Text may well hold "ftyp" or "WEBP" at that place; a picture has bytes no text has.
      return found.at > 0 && !hasNul(bytes) ? null : refusals.picture;
    case 'pdf':
      return refusals.pdf;
    case 'zip':
      return holdsWorkbook(bytes) ? refusals.workbook : refusals.archive;
    case 'compound':
      return refusals.workbook;
    case 'packed':
      return refusals.archive;
    case 'program':
      return refusals.program;
  }
}

function hasNul(bytes: Uint8Array): boolean {
  return bytes.subarray(0, 4096).includes(0);
}

/** Names of parts stand uncompressed in a ZIP: "xl/…" in Office Open XML, a media type in OpenDocument. */
function holdsWorkbook(bytes: Uint8Array): boolean {
  const marks = [ascii('xl/'), ascii('opendocument.spreadsheet')];
  return marks.some((mark) => findBytes(bytes, mark));
}

function findBytes(bytes: Uint8Array, wanted: readonly number[]): boolean {
  const [first = 0] = wanted;
  for (let at = bytes.indexOf(first); at !== -1; at = bytes.indexOf(first, at + 1)) {
    if (wanted.every((byte, index) => bytes[at + index] === byte)) return true;
  }
  return false;
}
