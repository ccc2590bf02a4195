import { useSignal } from '@preact/signals';
import type { ComponentChildren } from 'preact';
import { CaptionContext } from './CaptionContext.ts';

interface DataTableProps {
  readonly number: number;
  readonly className: string;
  readonly caption: ComponentChildren;
  readonly columns: readonly { readonly key: string; readonly head: ComponentChildren }[];
  /** Rows and row groups: `<tbody>` elements. */
  readonly children: ComponentChildren;
}

/** A numbered table with its caption above: open rules, names left, numbers right. */
export function DataTable({ number, className, caption, columns, children }: DataTableProps) {
  const hint = useSignal<{ words: string; refused: boolean } | null>(null);
  return (
    <CaptionContext.Provider value={hint}>
      <table class={`table ${className}`}>
        <caption class="caption">
          <b>Table {number}.</b> {caption}
          {hint.value !== null && <span class={hint.value.refused ? 'fault' : undefined}> {hint.value.words}</span>}
        </caption>
        <thead>
          <tr>
            {columns.map(({ key, head }, n) => (
              <th key={`${key} ${n}`} scope="col" class={key}>
                {head}
              </th>
            ))}
          </tr>
        </thead>
        {children}
      </table>
    </CaptionContext.Provider>
  );
}
