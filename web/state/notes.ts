/** What the user must be told. The same sentence is never shown twice at once. */
import type { ReadonlySignal } from '@preact/signals';
import { signal } from '@preact/signals';
import type { Note } from './bench.ts';

export interface Notes {
  readonly notes: ReadonlySignal<readonly Note[]>;
  add(kind: Note['kind'], sentence: string, advice?: string, list?: readonly string[], offer?: Note['offer']): void;
  /** Adds a fault from anything that was thrown. */
  fault(error: unknown, advice?: string): void;
  dismiss(id: number): void;
}

export function createNotes(): Notes {
  const notes = signal<readonly Note[]>([]);
  let nextId = 1;
  const add: Notes['add'] = (kind, sentence, advice, list, offer) => {
    const others = notes.value.filter((note) => note.sentence !== sentence);
    const more = {
      ...(advice === undefined ? {} : { advice }),
      ...(list === undefined ? {} : { list }),
      ...(offer === undefined ? {} : { offer }),
    };
    notes.value = [...others, { id: nextId++, kind, sentence, ...more }];
  };
  return {
    notes,
    add,
    fault: (error, advice) => add('fault', sentenceOf(error), advice),
    dismiss(id) {
      notes.value = notes.value.filter((note) => note.id !== id);
    },
  };
}

export function sentenceOf(error: unknown): string {
  return error instanceof Error ? error.message : String(error);
}
