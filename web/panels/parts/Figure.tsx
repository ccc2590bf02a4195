import { useSignal } from '@preact/signals';
import type { ComponentChildren } from 'preact';
import { CaptionContext } from './CaptionContext.ts';

interface FigureProps {
  readonly number: number;
  readonly className: string;
  readonly caption: ComponentChildren;
  /** What can be done with it, at the end of the caption's line. */
  readonly actions?: ComponentChildren;
  readonly children: ComponentChildren;
}

/** A numbered figure with its caption below. While a value in it is being edited, the caption says what the keys do. */
export function Figure({ number, className, caption, actions, children }: FigureProps) {
  const hint = useSignal<{ words: string; refused: boolean } | null>(null);
  return (
    <figure class={`figure ${className}`}>
      <CaptionContext.Provider value={hint}>{children}</CaptionContext.Provider>
      <figcaption class="caption">
        <span class="caption-words">
          <b>Fig. {number}.</b>{' '}
          {hint.value === null ? caption : <span class={hint.value.refused ? 'fault' : undefined}>{hint.value.words}</span>}
        </span>
        {actions}
      </figcaption>
    </figure>
  );
}
