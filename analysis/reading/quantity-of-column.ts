import { plainHeading } from './column-words.ts';
import { type QuantityWord, quantityNamed } from './quantity-words.ts';
import type { Table } from './table.ts';

/** The quantity that the headings of a column name; the nearest to the data decides. */
export function quantityOfColumn(headings: readonly string[]): QuantityWord | null {
  for (const heading of headings.toReversed()) {
    const found = quantityNamed(heading);
    if (found) return found;
  }
  return null;
}

export interface QuantityAround {
  readonly quantity: QuantityWord;
  readonly assumption: string;
}

/** Keys of a header line that speaks of the ordinate, in English and German. */
const ordinateKey =
  /^(?:#\s*)?(?:y|y[ -_]?(?:axis|achse|units?|einheit(?:en)?|data|label|title)|ordinate|ordinat|unit|units|einheit|einheiten|quantity|messgröße|messgrösse|größe|(?:photometric |photometer |measurement |measuring |measure |data |display |scan |mess)?(?:mode|modus|type|typ)|photometric value|photometrie)$/;

/**
 * The quantity that lines around the data name for all columns: a loose heading, a line that is a
 * quantity's name and nothing else, or a `key: value` line on the ordinate. Null where there is
 * none; lines that contradict each other give a foreign quantity, which is refused.
 */
export function quantityAround(table: Table): QuantityAround | null {
  const found: { readonly word: QuantityWord; readonly line: number }[] = [];
  if (table.looseHeading) {
    const word = quantityNamed(table.looseHeading.text);
    if (word) return { quantity: word, assumption: foundIn(table.looseHeading.line) };
  }
  for (const { text, line } of table.surroundings) {
    const word = text.length < 300 ? quantityOfLine(text) : null;
    if (word) found.push({ word, line });
  }
  const [first] = found;
  if (!first) return null;
  const agree = found.every(({ word }) => JSON.stringify(word) === JSON.stringify(first.word));
  if (agree) return { quantity: first.word, assumption: foundIn(first.line) };
  const lines = found.map(({ line }) => line).slice(0, 4);
  return {
    quantity: { kind: 'foreign', why: `is named differently in lines ${lines.join(', ')}` },
    assumption: '',
  };
}

const foundIn = (line: number) =>
  `The heading of the column names no quantity; it was taken from line ${line}.`;

function quantityOfLine(text: string): QuantityWord | null {
  const bare = text
    .replace(/["#]/g, ' ')
    .replace(/[\s,;]+$/, '')
    .trim();
  const parts = /^([^:;=,\t]{1,60})[:;=,\t](.+)$/.exec(bare);
  if (!parts) return bareName(bare);
  const [, key = '', value = ''] = parts;
  return ordinateKey.test(plainHeading(key)) ? quantityNamed(value.trim()) : null;
}

/** A title may hold single letters and words such as "energy" that name no quantity there. */
function bareName(text: string): QuantityWord | null {
  if (text.length < 2 || text.length > 60 || text.split(/\s+/).length > 3) return null;
  const word = quantityNamed(text);
  return word?.kind === 'quantity' ? word : null;
}
