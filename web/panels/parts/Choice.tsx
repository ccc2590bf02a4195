import { useState } from 'preact/hooks';
import { bareSentence } from './bareSentence.ts';
import { Slip } from './Slip.tsx';

interface ChoiceProps<Value extends string> {
  /** Accessible name. */
  readonly label: string;
  readonly value: Value;
  readonly options: readonly { readonly value: Value; readonly words: string }[];
  /** Returns the sentence to show when the choice is refused: the list then goes back to what it was. */
  readonly onChoose: (value: Value) => string | null;
  /** More about the present choice, under the pointer. */
  readonly hint?: string | undefined;
  /** What stands on the page, where it is not the option's own words. */
  readonly shown?: string;
  /** The choice takes effect later, or not at all: until `value` changes the list stays as it is. */
  readonly stays?: boolean;
}

/** One of a few, underlined, with a drawn chevron. The list itself is the browser's, so that it works under any thumb. */
export function Choice<Value extends string>({ label, value, options, onChoose, hint, shown, stays = false }: ChoiceProps<Value>) {
  const [refusal, setRefusal] = useState<string | null>(null);
  const onChange = ({ currentTarget }: { readonly currentTarget: HTMLSelectElement }) => {
    const refused = onChoose(currentTarget.value as Value);
    if (refused !== null || stays) currentTarget.value = value;
    setRefusal(refused);
  };
  return (
    <span class={refusal === null ? 'choice value-like' : 'choice value-like editing'}>
      <span aria-hidden="true">{shown ?? options.find((option) => option.value === value)?.words ?? value}</span>
      <svg class="chevron" viewBox="0 0 12 8" aria-hidden="true">
        <path d="M1.5 1.5 6 6 10.5 1.5" />
      </svg>
      <select aria-label={label} title={hint} value={value} onChange={onChange} onBlur={() => setRefusal(null)}>
        {options.map((option) => (
          <option key={option.value} value={option.value} selected={option.value === value}>
            {option.words}
          </option>
        ))}
      </select>
      {refusal !== null && <Slip refused>{bareSentence(refusal)}</Slip>}
    </span>
  );
}

/** For a choice that cannot be refused. */
export function chosen<Value extends string>(take: (value: Value) => void): (value: Value) => null {
  return (value) => {
    take(value);
    return null;
  };
}
