import type { ComponentChildren } from 'preact';

interface NamedProps {
  readonly name: string;
  readonly over?: boolean;
  readonly children: ComponentChildren;
}

/** A part's name before its value, or over it. */
export function Named({ name, over = false, children }: NamedProps) {
  return (
    <span class={over ? 'named over-value' : 'named'}>
      <span class="name">{name}</span> {children}
    </span>
  );
}
