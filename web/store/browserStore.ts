/** The store of this browser: records in IndexedDB, files in the page's own file system, one tab at a time by a lock. */
import { openFiles } from './files.ts';
import { claimStore } from './lock.ts';
import { createRecords } from './records.ts';
import type { Store } from './store.ts';

/** `lost` is told when the browser has removed the records while the page is open. */
export function openStore(lost: () => void): Store {
  return {
    ...createRecords(lost),
    ...claimStore(navigator.locks as LockManager | undefined),
    openFiles,
    persist: async () => (await navigator.storage?.persist?.()) ?? false,
    persisted: async () => (await navigator.storage?.persisted?.()) ?? false,
    beforeLeaving(work) {
      addEventListener('pagehide', work);
      document.addEventListener('visibilitychange', () => document.visibilityState === 'hidden' && work());
    },
  };
}
