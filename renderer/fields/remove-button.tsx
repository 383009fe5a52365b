interface RemoveButtonProps {
  /** What goes: "standard S1". */
  readonly what: string;
  /** What goes with it, for the tooltip. */
  readonly title?: string;
  readonly remove: () => void;
}

/** Takes a line out of a ledger. */
export function RemoveButton({ what, title, remove }: RemoveButtonProps) {
  return (
    <button
      type="button"
      class="remove"
      aria-label={`Remove ${what}`}
      title={title}
      onClick={remove}
    >
      ×
    </button>
  );
}
