import { Field } from './field.tsx';
import { type Entry, shown } from './parse-entry.ts';

interface NumberFieldProps {
  readonly label: string;
  /** In the sheet's unit; undefined where nothing is given. */
  readonly value: number | undefined;
  /** From the sheet's unit to the one shown. */
  readonly factor?: number;
  readonly parse: (text: string) => Entry;
  /** Takes the number in the sheet's unit; undefined takes it out. */
  readonly take: (value: number | undefined) => void;
  readonly placeholder?: string;
  readonly isNeeded?: boolean;
  readonly title?: string;
}

/** A cell for a number that may also be left out, flush right. */
export function NumberField({ value, factor = 1, parse, take, ...rest }: NumberFieldProps) {
  return (
    <Field
      {...rest}
      align="right"
      value={shown(value, factor)}
      commit={(text) => {
        const entry = parse(text);
        if (!entry.ok) return entry.message;
        take(entry.value);
        return null;
      }}
    />
  );
}
