import type { ComponentChildren } from 'preact';
import { useEffect, useRef } from 'preact/hooks';

interface DialogProps {
  readonly title: string;
  readonly onClose: () => void;
  readonly children: ComponentChildren;
}

/** A paper block over the sheet; Esc or its last button puts it away. */
export function Dialog({ title, onClose, children }: DialogProps) {
  const dialog = useRef<HTMLDialogElement>(null);
  useEffect(() => dialog.current?.showModal(), []);
  return (
    <dialog ref={dialog} class="dialog" aria-label={title} onClose={onClose}>
      <h2>{title}</h2>
      {children}
      <p class="buttons">
        <button type="button" class="button small" onClick={() => dialog.current?.close()}>
          Put away
        </button>
      </p>
    </dialog>
  );
}
