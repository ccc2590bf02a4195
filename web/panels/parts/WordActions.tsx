interface Action {
  readonly words: string;
  readonly run: () => void;
  readonly disabled?: boolean;
  /** Accessible name, where the word alone does not say what it acts on. */
  readonly label?: string;
}

/** Small actions: bare words parted by thin bars. */
export function WordActions({ actions }: { readonly actions: readonly Action[] }) {
  return (
    <span class="word-actions">
      {actions.map(({ words, run, disabled, label }) => (
        <button key={words} type="button" class="word" aria-label={label} disabled={disabled} onClick={run}>
          {words}
        </button>
      ))}
    </span>
  );
}
