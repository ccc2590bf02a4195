import { useSignal } from '@preact/signals';
import { useLayoutEffect } from 'preact/hooks';
import type { Bench } from '../state/bench.ts';

/** Files dropped anywhere on the page are opened. True while one hovers. */
export function useFileDrop(bench: Bench): boolean {
  const hovering = useSignal(false);
  useLayoutEffect(() => {
    const ends = new AbortController();
    const { signal } = ends;
    const over = (event: DragEvent) => {
      event.preventDefault();
      hovering.value = true;
    };
    const leave = (event: DragEvent) => {
      if (event.relatedTarget === null) hovering.value = false;
    };
    const drop = (event: DragEvent) => {
      event.preventDefault();
      hovering.value = false;
      void bench.openDropped([...(event.dataTransfer?.files ?? [])]);
    };
    window.addEventListener('dragover', over, { signal });
    window.addEventListener('dragleave', leave, { signal });
    window.addEventListener('drop', drop, { signal });
    return () => ends.abort();
  }, [bench, hovering]);
  return hovering.value;
}
