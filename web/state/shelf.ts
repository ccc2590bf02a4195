/** Where records are put so that they are kept: nowhere until this tab is the one that keeps, and a refusal is said once until one is taken again. */
import type { Store } from '../store/store.ts';
import type { Notes } from './notes.ts';
import { sentenceOf } from './notes.ts';

export interface Shelf {
  put(key: string, value: unknown): void;
  remove(key: string): void;
  /** From here on what is put is kept. */
  open(): void;
  readonly opened: boolean;
}

export function createShelf(store: Pick<Store, 'put' | 'remove'>, notes: Notes): Shelf {
  let opened = false;
  let said = false;

  const write = (work: () => Promise<void>) => {
    if (!opened) return;
    work().then(
      () => {
        said = false;
      },
      (error) => {
        if (said) return;
        said = true;
        notes.fault(`The browser did not keep the last change: ${sentenceOf(error)}.`, 'Save the design as a file, and takes as well.');
      },
    );
  };

  return {
    put: (key, value) => write(() => store.put(key, value)),
    remove: (key) => write(() => store.remove(key)),
    open() {
      opened = true;
    },
    get opened() {
      return opened;
    },
  };
}
