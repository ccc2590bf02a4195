import { useEffect, useRef, useState } from 'preact/hooks';

interface EditableTextProps {
  readonly label: string;
  readonly value: string;
  readonly onSet: (text: string) => string | null;
  readonly className?: string;
}

/** Words that are changed where they are printed: a title, a take's name. Enter or leaving sets them, Esc leaves them as they were. */
export function EditableText({ label, value, onSet, className = '' }: EditableTextProps) {
  const [text, setText] = useState<string | null>(null);
  const [fault, setFault] = useState<string | null>(null);
  const field = useRef<HTMLInputElement>(null);
  const editing = text !== null;
  useEffect(() => {
    if (editing) field.current?.select();
  }, [editing]);
  const close = () => {
    setText(null);
    setFault(null);
  };
  const commit = () => {
    if (text === null) return;
    const refused = text.trim() === value ? null : onSet(text.trim());
    if (refused === null) close();
    else setFault(refused);
  };
  const onKeyDown = (event: KeyboardEvent) => {
    event.stopPropagation();
    if (event.key === 'Enter') commit();
    if (event.key === 'Escape') close();
  };
  if (text === null) {
    return (
      <button type="button" class={`value-like text ${className}`} aria-label={`${label}: ${value}; change`} onClick={() => setText(value)}>
        {value}
      </button>
    );
  }
  return (
    <span class="text-box">
      <input
        ref={field}
        class={`typing-text ${className} ${fault === null ? '' : 'refused'}`}
        aria-label={label}
        aria-invalid={fault !== null}
        value={text}
        size={Math.max(8, text.length)}
        onInput={(event) => setText(event.currentTarget.value)}
        onKeyDown={onKeyDown}
        onBlur={commit}
      />
      {fault !== null && (
        <span class="slip refused" role="alert">
          {fault}
        </span>
      )}
    </span>
  );
}
