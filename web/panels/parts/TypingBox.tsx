import { useContext, useEffect, useLayoutEffect, useRef, useState } from 'preact/hooks';
import { CaptionContext } from './CaptionContext.ts';
import type { EditableValueProps } from './EditableValue.tsx';
import { Slip } from './Slip.tsx';
import { stepValue } from './stepping.ts';

interface TypingBoxProps extends EditableValueProps {
  readonly printed: string;
  readonly initial: string;
  /** `byKey` is true when the focus should go back to the value. */
  readonly done: (byKey: boolean) => void;
}

/** The text field over a value being typed, and its slip: what the text means and the steps beside it, or why it is refused. */
export function TypingBox({ label, short, printed, initial, optional = false, stepping, format, read, onSet, done }: TypingBoxProps) {
  const [text, setText] = useState(initial);
  const [refusal, setRefusal] = useState<string | null>(null);
  const caption = useContext(CaptionContext);
  const field = useRef<HTMLInputElement>(null);
  const closing = useRef(false);
  const meaning = understand(text, optional, read);
  const fault = refusal ?? (text !== initial ? meaning.fault : null);

  useLayoutEffect(() => {
    field.current?.focus();
    if (initial === printed) field.current?.select();
  }, [initial, printed]);
  useEffect(() => {
    const absent = optional ? ' «none» takes it out.' : '';
    caption.value =
      fault === null
        ? { words: `${label}: Enter sets it, Esc leaves it as it was; the arrow keys step.${absent}`, refused: false }
        : { words: `${short} stays at ${printed}. ${meaning.advice} Esc leaves it as it was.`, refused: false };
  });
  useEffect(
    () => () => {
      caption.value = null;
    },
    [caption],
  );

  const close = (byKey: boolean) => {
    closing.current = true;
    done(byKey);
  };
  const commit = (byKey: boolean) => {
    if (meaning.fault !== null) return setRefusal(meaning.fault);
    const refused = text === initial && text === printed ? null : onSet(meaning.value);
    return refused === null ? close(byKey) : setRefusal(refused);
  };
  const step = (direction: 1 | -1) => {
    if (meaning.value === null) return;
    setText(format(stepValue(meaning.value, stepping, direction)));
    setRefusal(null);
  };
  const onKeyDown = (event: KeyboardEvent) => {
    event.stopPropagation();
    if (event.key === 'Enter') commit(true);
    else if (event.key === 'Escape') close(true);
    else if (event.key === 'ArrowUp') step(1);
    else if (event.key === 'ArrowDown') step(-1);
    else return;
    event.preventDefault();
  };
  const onBlur = () => {
    if (closing.current) return;
    if (meaning.fault !== null || refusal !== null) close(false);
    else commit(false);
  };

  return (
    <>
      <input
        ref={field}
        class={fault === null ? 'typing' : 'typing refused'}
        aria-label={label}
        aria-invalid={fault !== null}
        autocomplete="off"
        spellcheck={false}
        value={text}
        onInput={(event) => {
          setText(event.currentTarget.value);
          setRefusal(null);
        }}
        onKeyDown={onKeyDown}
        onBlur={onBlur}
      />
      <Slip refused={fault !== null}>
        {fault ?? <strong>= {meaning.value === null ? 'none' : format(meaning.value)}</strong>}
        {fault === null && meaning.value !== null && <Steps value={meaning.value} stepping={stepping} format={format} step={step} />}
      </Slip>
    </>
  );
}

function Steps({
  value,
  stepping,
  format,
  step,
}: Pick<EditableValueProps, 'stepping' | 'format'> & { value: number; step: (direction: 1 | -1) => void }) {
  return (
    <>
      {([1, -1] as const).map((direction) => (
        <button
          key={direction}
          type="button"
          tabIndex={-1}
          onPointerDown={(event) => event.preventDefault()}
          onClick={() => step(direction)}
        >
          <span class="key">{direction === 1 ? '↑' : '↓'}</span>
          {withoutUnit(format(stepValue(value, stepping, direction)), format(value))}
        </button>
      ))}
    </>
  );
}

/** The number alone where the unit is the one that stands beside it already. */
function withoutUnit(printed: string, beside: string): string {
  const [number, unit] = printed.split('\u2009');
  return unit === beside.split('\u2009')[1] ? number : printed;
}

/** What the text means, or the sentence that says why it means nothing. */
function understand(
  text: string,
  optional: boolean,
  read: (text: string) => number,
): { value: number | null; fault: string | null; advice: string } {
  if (optional && /^(none|)$/i.test(text.trim())) return { value: null, fault: null, advice: '' };
  try {
    return { value: read(text), fault: null, advice: '' };
  } catch (error) {
    const { message, fault = message, advice = '' } = error as Error & { fault?: string; advice?: string };
    return { value: null, fault, advice };
  }
}
