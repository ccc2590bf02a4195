/** One tab keeps at a time: the one that has the lock. A tab that is closed or killed gives it back. */
import type { Store } from './store.ts';

const NAME = 'fettle-store';

export function claimStore(locks: LockManager | undefined): Pick<Store, 'holds' | 'held'> {
  if (locks === undefined) return { holds: Promise.resolve(true), held: Promise.resolve() };
  const keptForGood = new Promise<never>(() => undefined);
  let hold = () => {};
  const held = new Promise<void>((resolve) => {
    hold = resolve;
  });
  const holds = new Promise<boolean>((answer, fail) => {
    const wait = () => {
      answer(false);
      return locks.request(NAME, () => {
        hold();
        return keptForGood;
      });
    };
    const claim = (lock: Lock | null) => {
      if (lock === null) return undefined;
      answer(true);
      hold();
      return keptForGood;
    };
    locks.request(NAME, { ifAvailable: true }, claim).then(wait).catch(fail);
  });
  return { holds, held };
}
