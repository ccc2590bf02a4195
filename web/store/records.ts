/** Records by key in an IndexedDB table. */
import type { IDBPDatabase, IDBPObjectStore } from 'idb';
import { openDB } from 'idb';
import { reasonOf } from './reason.ts';
import type { KeptRecord, Store } from './store.ts';

export const DATABASE = 'fettle';
export const TABLE = 'kept';
const VERSION = 1;

type Table = IDBPObjectStore<unknown, [typeof TABLE], typeof TABLE, 'readwrite'>;

export type Records = Pick<Store, 'readRecords' | 'put' | 'remove'>;

/** `lost` is told when the browser has closed the table by itself, as it does when it removes it; the next call opens it anew. */
export function createRecords(lost: () => void): Records {
  let opening: Promise<IDBPDatabase> | null = null;

  const open = () => {
    opening ??= openDB(DATABASE, VERSION, {
      upgrade: (database) => {
        database.createObjectStore(TABLE);
      },
      // Another tab removes it or brings it up to date, and waits for this one.
      blocking(_now, _next, { target }) {
        opening = null;
        (target as IDBDatabase).close();
        lost();
      },
      terminated() {
        opening = null;
        lost();
      },
    }).catch((error) => {
      opening = null;
      throw error;
    });
    return opening;
  };

  const run = async <T>(work: (database: IDBPDatabase) => Promise<T>): Promise<T> => {
    try {
      return await work(await open());
    } catch (error) {
      throw new Error(reasonOf(error), { cause: error });
    }
  };

  return {
    readRecords: () =>
      run(async (database) => {
        const keys = await database.getAllKeys(TABLE);
        // One by one: one that cannot be read takes no other with it.
        return Promise.all(
          keys.map((key): Promise<KeptRecord> => {
            const named = { key: String(key) };
            return database.get(TABLE, key).then(
              (value) => ({ ...named, value }),
              (error) => ({ ...named, fault: reasonOf(error) }),
            );
          }),
        );
      }),
    put: (key, value) => run((database) => change(database, (table) => table.put(value, key))),
    remove: (key) => run((database) => change(database, (table) => table.delete(key))),
  };
}

/** Committed at once, not when the page next has the word: it may be on its way out. */
async function change(database: IDBPDatabase, make: (table: Table) => Promise<unknown>): Promise<void> {
  const transaction = database.transaction(TABLE, 'readwrite');
  const made = make(transaction.store);
  transaction.commit();
  await Promise.all([made, transaction.done]);
}
