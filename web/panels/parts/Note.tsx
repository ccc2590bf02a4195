import type { ComponentChildren } from 'preact';

interface NoteProps {
  readonly kind: 'fault' | 'note' | 'caution' | 'hints';
  /** One sentence; in bold up to its first semicolon. */
  readonly sentence: string;
  /** One plain sentence more. */
  readonly advice?: string | undefined;
  /** Further sentences, scrolled where there are many. */
  readonly list?: readonly string[] | undefined;
  readonly children?: ComponentChildren;
}

/** A block of paper with what the user must be told, and buttons that name the act. */
export function Note({ kind, sentence, advice, list, children }: NoteProps) {
  const [head, ...rest] = sentence.split('; ');
  return (
    <section class={kind === 'note' ? 'note' : `note ${kind}`} role={kind === 'fault' ? 'alert' : 'status'}>
      <p>
        {kind === 'caution' && <Caution />}
        <strong>{head}</strong>
        {rest.length > 0 && `; ${rest.join('; ')}`} {advice}
      </p>
      {list !== undefined && (
        // biome-ignore lint/a11y/noNoninteractiveTabindex: a list that scrolls must be reached by key.
        <ul class="note-list" tabIndex={0} aria-label="What was found">
          {list.map((each) => (
            <li key={each}>{each}</li>
          ))}
        </ul>
      )}
      {children !== undefined && <p class="buttons">{children}</p>}
    </section>
  );
}

/** The outline triangle that stands before a caution. */
export function Caution() {
  return (
    <svg class="caution-mark" viewBox="0 0 16 14" aria-hidden="true">
      <path d="M8 1 15 13H1Z" fill="none" stroke="currentColor" stroke-width="1.2" stroke-linejoin="miter" />
      <path d="M8 5v4M8 10.4v1.2" stroke="currentColor" stroke-width="1.4" />
    </svg>
  );
}
