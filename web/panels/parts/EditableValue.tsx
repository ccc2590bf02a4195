import { useContext, useLayoutEffect, useRef, useState } from 'preact/hooks';
import { CaptionContext } from './CaptionContext.ts';
import { pageValue, type Stepping, stepValue } from './stepping.ts';
import { Slip } from './Slip.tsx';
import { TypingBox } from './TypingBox.tsx';
import { useValueDrag } from './useValueDrag.ts';

export interface EditableValueProps {
  /** Accessible name: «R2, drain to gate». */
  readonly label: string;
  /** In sentences: «R2 stays at 1.00 MΩ». */
  readonly short: string;
  /** Null when the part is absent, which only `optional` values can be. */
  readonly value: number | null;
  readonly optional?: boolean;
  readonly stepping: Stepping;
  readonly format: (value: number) => string;
  /** Throws an Error whose message is the sentence to show. */
  readonly read: (text: string) => number;
  readonly min?: number | undefined;
  readonly max?: number | undefined;
  /** Returns the sentence to show when the value is refused, or null. */
  readonly onSet: (value: number | null) => string | null;
  readonly className?: string;
}

/** A value that is changed where it is printed: typed, stepped by the arrow and page keys, or dragged. */
export function EditableValue(props: EditableValueProps) {
  const { label, short, value, stepping, format, min, max, onSet, className = '' } = props;
  const [typing, setTyping] = useState<string | null>(null);
  const [refusal, setRefusal] = useState<string | null>(null);
  const caption = useContext(CaptionContext);
  const rest = useRef<HTMLSpanElement>(null);
  const wantsFocus = useRef(false);
  const printed = value === null ? 'none' : format(value);

  const say = (refused: string | null) => {
    setRefusal(refused);
    caption.value = refused === null ? null : { words: `${refused} ${short} stays at ${printed}.`, refused: true };
  };
  const set = (next: number) => say(onSet(next));
  const drag = useValueDrag({ value, stepping, set, click: () => setTyping(value === null ? '' : printed) });

  useLayoutEffect(() => {
    if (typing !== null || !wantsFocus.current) return;
    wantsFocus.current = false;
    rest.current?.focus();
  }, [typing]);

  const onKeyDown = (event: KeyboardEvent) => {
    const move = keyMoves[event.key];
    if (move !== undefined && value !== null) set(move(value, stepping));
    else if (event.key === 'Enter' || event.key === 'F2') setTyping(value === null ? '' : printed);
    else if (/^[\d.+\-−]$/.test(event.key) && !event.ctrlKey && !event.metaKey && !event.altKey) setTyping(event.key);
    else return;
    event.preventDefault();
  };
  const done = (byKey: boolean) => {
    wantsFocus.current = byKey;
    setRefusal(null);
    setTyping(null);
  };

  return (
    <span class={typing === null && refusal === null ? 'value-box' : 'value-box editing'}>
      <span
        ref={rest}
        role="spinbutton"
        tabIndex={typing === null ? 0 : -1}
        class={`value ${className} ${drag.dragging ? 'dragged' : ''}`}
        aria-label={label}
        aria-valuenow={plainNumber(value)}
        aria-valuemin={plainNumber(min)}
        aria-valuemax={plainNumber(max)}
        aria-valuetext={printed}
        onKeyDown={onKeyDown}
        onBlur={() => typing === null && say(null)}
        {...drag.handlers}
      >
        {printed}
      </span>
      {typing === null && refusal !== null && <Slip refused>{refusal}</Slip>}
      {typing !== null && <TypingBox {...props} printed={printed} initial={typing} done={done} />}
    </span>
  );
}

/** For assistive technology, which reads no exponents: 1e-10 as 0.0000000001. */
function plainNumber(value: number | null | undefined): number | undefined {
  if (value === null || value === undefined) return undefined;
  const plain = value.toFixed(15).replace(/\.?0+$/, '');
  // The attribute takes text; its type is a number's.
  return plain as unknown as number;
}

const keyMoves: Readonly<Record<string, (value: number, stepping: Stepping) => number>> = {
  ArrowUp: (value, stepping) => stepValue(value, stepping, 1),
  ArrowDown: (value, stepping) => stepValue(value, stepping, -1),
  PageUp: (value, stepping) => pageValue(value, stepping, 1),
  PageDown: (value, stepping) => pageValue(value, stepping, -1),
};
