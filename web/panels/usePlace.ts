import type { RefObject } from 'preact';
import { useEffect } from 'preact/hooks';
import { type Scale, toPixel } from '../draw/scale.ts';
import { clockText } from '../draw/words.ts';
import type { Bench } from '../state/bench.ts';
import { rem } from './parts/useSheetSize.ts';

/** How often it is told to assistive technology, and drawn for those who ask for less motion. */
const SLOW_MS = 250;

/** Moves the mark of the place to where the source is, once a frame while it plays, and says it four times a second. */
export function usePlace(bench: Bench, mark: RefObject<HTMLElement | null>, time: Scale): void {
  useEffect(() => {
    const calm = matchMedia('(prefers-reduced-motion: reduce)');
    let toldMs = Number.NEGATIVE_INFINITY;
    let frame = 0;
    const draw = () => {
      frame = requestAnimationFrame(draw);
      const element = mark.current;
      const now = performance.now();
      const due = now - toldMs >= SLOW_MS;
      if (element === null || (calm.matches && !due)) return;
      const seconds = bench.positionSec();
      // By a transform, for which the page is not laid out anew.
      element.style.transform = `translateX(${rem(toPixel(time, seconds))})`;
      if (!due) return;
      toldMs = now;
      element.setAttribute('aria-valuenow', seconds.toFixed(1));
      element.setAttribute('aria-valuetext', clockText(seconds, true));
    };
    draw();
    return () => cancelAnimationFrame(frame);
  }, [bench, mark, time.start, time.end, time.to]);
}
