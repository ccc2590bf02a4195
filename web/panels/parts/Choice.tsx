interface ChoiceProps<Value extends string> {
  /** Accessible name. */
  readonly label: string;
  readonly value: Value;
  readonly options: readonly { readonly value: Value; readonly words: string }[];
  readonly onChoose: (value: Value) => void;
  /** More about the present choice, under the pointer. */
  readonly hint?: string | undefined;
  /** What stands on the page, where it is not the option's own words. */
  readonly shown?: string;
}

/** One of a few, underlined, with a drawn chevron. The list itself is the browser's, so that it works under any thumb. */
export function Choice<Value extends string>({ label, value, options, onChoose, hint, shown }: ChoiceProps<Value>) {
  return (
    <span class="choice value-like">
      <span aria-hidden="true">{shown ?? options.find((option) => option.value === value)?.words ?? value}</span>
      <svg class="chevron" viewBox="0 0 12 8" aria-hidden="true">
        <path d="M1.5 1.5 6 6 10.5 1.5" />
      </svg>
      <select aria-label={label} title={hint} value={value} onChange={(event) => onChoose(event.currentTarget.value as Value)}>
        {options.map((option) => (
          <option key={option.value} value={option.value} selected={option.value === value}>
            {option.words}
          </option>
        ))}
      </select>
    </span>
  );
}
