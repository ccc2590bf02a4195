/** One order for undoing: the document's changes, and the takes that were deleted between them. */
import { computed, type ReadonlySignal, signal } from '@preact/signals';
import type { Design } from '../../model/design/types.ts';
import type { Bench } from './bench.ts';
import type { DocumentState } from './document.ts';

/** A take that was deleted, or whose deletion was undone, and the design that stood then. */
interface Deletion {
  readonly id: number;
  readonly design: Design;
}

type Timeline = Pick<Bench, 'undo' | 'redo' | 'canUndo' | 'canRedo' | 'deleteTake' | 'restoreTake'>;

export function createTimeline(document: DocumentState, takes: Pick<Bench, 'takes' | 'deleteTake' | 'restoreTake'>): Timeline {
  const deleted = signal<readonly Deletion[]>([]);
  const restored = signal<readonly Deletion[]>([]);
  /** The last of them whose take is still there, while the design is as it was then: what was changed since comes first. */
  const lastOf = (list: ReadonlySignal<readonly Deletion[]>) =>
    list.value.findLast(({ id, design }) => design === document.design.value && takes.takes.value.some((take) => take.id === id));
  const without = (list: readonly Deletion[], id: number) => list.filter((each) => each.id !== id);
  const remove = (id: number) => {
    takes.deleteTake(id);
    deleted.value = [...without(deleted.value, id), { id, design: document.design.peek() }];
  };
  const restore = (id: number) => {
    takes.restoreTake(id);
    deleted.value = without(deleted.value, id);
  };
  return {
    canUndo: computed(() => lastOf(deleted) !== undefined || document.canUndo.value),
    canRedo: computed(() => document.canRedo.value || lastOf(restored) !== undefined),
    undo() {
      const last = lastOf(deleted);
      if (last === undefined) return document.undo();
      restore(last.id);
      restored.value = [...without(restored.value, last.id), last];
    },
    redo() {
      const last = lastOf(restored);
      if (document.canRedo.value || last === undefined) return document.redo();
      restored.value = without(restored.value, last.id);
      remove(last.id);
    },
    deleteTake(id) {
      remove(id);
      restored.value = [];
    },
    restoreTake: restore,
  };
}
