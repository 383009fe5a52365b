import { rowsOf, type Trace } from '../trace.ts';
import { latin1 } from './encodings.ts';

export interface OverRange {
  /** Readings above this absorbance are replaced. */
  readonly above: number;
  readonly mark: string;
}

/**
 * Semicolon-delimited, decimal comma, several traces a file, descending, Latin-1 with accents, the
 * degree and the micro sign in its head, CRLF. Absorbance to four decimals; a mark where the
 * reading is over range.
 */
export function semicolonsDecimalComma(
  traces: readonly Trace[],
  note: string,
  overRange: OverRange,
): Uint8Array {
  const printed = (value: number): string =>
    value > overRange.above ? overRange.mark : comma(value.toFixed(4));
  const lines = [
    `Remarque;${note}`,
    'Opérateur;(inventé)',
    'Température;22,0 °C',
    'Volume prélevé;250 µL',
    'Trajet optique;10 mm',
    '',
    ["Longueur d'onde (nm)", ...traces.map(absorbanceOf)].join(';'),
    ...rowsOf(traces)
      .toReversed()
      .map(([nm, values]) => [comma(nm.toFixed(1)), ...values.map(printed)].join(';')),
  ];
  return latin1(`${lines.join('\r\n')}\r\n`);
}

function absorbanceOf(trace: Trace): string {
  return `Absorbance ${trace.label}`;
}

function comma(number: string): string {
  return number.replace('.', ',');
}
