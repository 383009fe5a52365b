import { useId, useState } from 'preact/hooks';

interface FieldProps {
  /** For screen readers, and seen where `caption` is not given. */
  readonly label: string;
  readonly value: string;
  /** Takes what was typed; gives back what is wrong with it, or null once it is in the sheet. */
  readonly commit: (text: string) => string | null;
  readonly placeholder?: string;
  readonly align?: 'left' | 'right';
  readonly isNeeded?: boolean;
  readonly title?: string;
}

/** What a sheet takes as a text is far longer; no cell needs it. */
const longestEntry = 2000;

/**
 * A cell to type in: takes effect on Enter or when it is left; Escape puts back what was there. What
 * cannot be taken stays in the cell with the reason under it, and the sheet stays as it was.
 */
export function Field({
  label,
  value,
  commit,
  placeholder,
  align = 'left',
  isNeeded,
  title,
}: FieldProps) {
  const [draft, setDraft] = useState<string | null>(null);
  const [trouble, setTrouble] = useState<string | null>(null);
  const [before, setBefore] = useState(value);
  const id = useId();
  if (before !== value) {
    // the sheet has changed under the cell (undo): what was typed no longer holds
    setBefore(value);
    setDraft(null);
    setTrouble(null);
  }
  const finish = (): void => {
    if (draft === null || draft === value) {
      setDraft(null);
      setTrouble(null);
      return;
    }
    const problem = commit(draft);
    setTrouble(problem);
    if (problem === null) setDraft(null);
  };
  return (
    <span class={`field field-${align}`}>
      <input
        type="text"
        aria-label={label}
        maxLength={longestEntry}
        data-drafting={draft === null || draft === value ? undefined : ''}
        aria-invalid={trouble !== null || undefined}
        aria-describedby={trouble === null ? undefined : id}
        data-needed={isNeeded === true && value === '' ? '' : undefined}
        placeholder={placeholder}
        title={title}
        value={draft ?? value}
        onInput={(event) => setDraft(event.currentTarget.value)}
        onBlur={finish}
        onKeyDown={(event) => {
          if (event.key === 'Enter') finish();
          if (event.key === 'Escape') {
            setDraft(null);
            setTrouble(null);
          }
        }}
      />
      {trouble !== null && (
        <span class="field-trouble" id={id} role="alert">
          {trouble}
        </span>
      )}
    </span>
  );
}

interface ChoiceProps {
  readonly label: string;
  readonly value: string;
  readonly options: readonly { readonly value: string; readonly text: string }[];
  readonly choose: (value: string) => void;
}

/** A choice among a few. */
export function Choice({ label, value, options, choose }: ChoiceProps) {
  return (
    <select
      class="choice"
      aria-label={label}
      value={value}
      onChange={(event) => choose(event.currentTarget.value)}
    >
      {options.map((option) => (
        <option key={option.value} value={option.value}>
          {option.text}
        </option>
      ))}
    </select>
  );
}
