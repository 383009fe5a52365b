import type { RefusalText } from '../refusal.ts';

/** What a text is that is plainly no table of a spectrum, by how it begins; null where it may be one. */
export function recogniseOtherText(text: string): RefusalText | null {
  const head = text.slice(0, 4096).trimStart();
  if (head === '') {
    return {
      code: 'only-white-space',
      message: 'The file holds nothing but white space.',
      mend: 'Export the spectrum again and look that the file has numbers in it.',
    };
  }
  if (head.startsWith('{\\rtf')) {
    return {
      code: 'is-a-document',
      message: 'This is a formatted text document, not a plain table.',
      mend: 'Save it as plain text or export the spectrum as text (CSV).',
    };
  }
  if (head.startsWith('{') || /^\[\s*[{[]/.test(head)) return jsonRefusal(head);
  if (/^<(?:[!?a-z])/i.test(head)) {
    return {
      code: 'is-markup',
      message: 'This is a web page or an XML document, not a plain table.',
      mend: 'Export the spectrum as text (CSV) and load that file.',
    };
  }
  if (/^##\s*title\s*=/i.test(head)) {
    return {
      code: 'is-jcamp-dx',
      message: 'This is a JCAMP-DX file, which is not read yet.',
      mend: 'Export the spectrum as delimited text (CSV) and load that file.',
    };
  }
  return null;
}

function jsonRefusal(head: string): RefusalText {
  const format = /"format"\s{0,20}:\s{0,20}"monobis-(sheet|results|reading)"/.exec(head)?.[1];
  if (format === 'sheet') {
    return {
      code: 'is-a-sheet',
      message: 'This is a sheet, not the export of a spectrum.',
      mend: 'Open it as a sheet instead.',
    };
  }
  return {
    code: 'is-json',
    message: format
      ? `This is a ${format === 'results' ? 'results' : 'reading'} file that this program wrote, not an export.`
      : 'This is a JSON file, not a table of a spectrum.',
    mend: 'Load the export that the instrument wrote, as text (CSV).',
  };
}
