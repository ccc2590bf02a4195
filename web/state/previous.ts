/** The setting of each variant before its last change, so that it can be heard against the present one. */
import type { ReadonlySignal } from '@preact/signals';
import { computed, signal } from '@preact/signals';
import type { Design } from '../../model/design/types.ts';
import type { DocumentState } from './document.ts';
import { soundingText } from './sounding.ts';

/** Changes of one variant that follow each other sooner than this are one, as they are to undo. */
const SAME_CHANGE_MS = 800;

export interface Before {
  readonly design: Design;
  readonly index: number;
}

/** Of the heard variant; null where nothing that sounds has changed since it was there. */
export function watchPrevious(
  { design, heardVariant, restores }: Pick<DocumentState, 'design' | 'heardVariant' | 'restores'>,
  now: () => number = () => Date.now(),
): ReadonlySignal<Before | null> {
  const all = signal<readonly (Before | null)[]>([]);
  let last = design.peek();
  let changedMs: number[] = [];
  let seen = restores.peek();
  design.subscribe((next) => {
    const from = last;
    last = next;
    if (from === next) return;
    if (from.variants.length !== next.variants.length || seen !== restores.peek()) {
      seen = restores.peek();
      all.value = [];
      changedMs = [];
      return;
    }
    all.value = next.variants.map((_, index) => {
      const known = all.peek()[index] ?? null;
      if (soundingText(from, index) === soundingText(next, index)) return known;
      const goesOn = known !== null && now() - (changedMs[index] ?? 0) < SAME_CHANGE_MS;
      changedMs[index] = now();
      return goesOn ? known : { design: from, index };
    });
  });
  return computed(() => all.value[heardVariant.value] ?? null);
}
