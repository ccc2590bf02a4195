import { type ReadonlySignal, signal } from '@preact/signals';

/**
 * A copy of a fast signal that changes at most once every `everyMs`, so that numbers can be read. The last value always arrives.
 * Returns the copy and what ends it.
 */
export function sampled<Value>(
  source: ReadonlySignal<Value>,
  everyMs: number,
  now: () => number = () => performance.now(),
): { copy: ReadonlySignal<Value>; end: () => void } {
  const copy = signal(source.peek());
  let last = Number.NEGATIVE_INFINITY;
  let timer: ReturnType<typeof setTimeout> | undefined;
  const take = () => {
    timer = undefined;
    last = now();
    copy.value = source.peek();
  };
  const unsubscribe = source.subscribe(() => {
    if (timer !== undefined) return;
    const wait = last + everyMs - now();
    if (wait <= 0) take();
    else timer = setTimeout(take, wait);
  });
  return {
    copy,
    end: () => {
      unsubscribe();
      clearTimeout(timer);
    },
  };
}
