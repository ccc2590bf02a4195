import { useEffect, useRef } from 'preact/hooks';
import type { LiveLevels } from '../../state/bench.ts';
import { useBenchView } from '../BenchContext.ts';

/** Two reports, and how much of the way from one to the next has gone by, 0 to 1. */
export interface Glide {
  readonly before: LiveLevels;
  readonly now: LiveLevels;
  readonly share: number;
}

/** Between two reports of the processor. */
const REPORT_MS = 34;

/**
 * Shows where things are at every frame while sound plays: between the last two reports, so a report late. For those who ask for less motion, at the
 * moments of the readings alone.
 */
export function useGlide(show: (at: Glide) => void): void {
  const { bench, slowLive } = useBenchView();
  const latest = useRef(show);
  latest.current = show;
  useEffect(() => {
    const calm = matchMedia('(prefers-reduced-motion: reduce)').matches;
    let [before, now]: (LiveLevels | null)[] = [null, null];
    let atMs = 0;
    let frame: number | null = null;
    const run = () => {
      frame = null;
      if (now === null) return;
      const share = calm || before === null ? 1 : Math.min(1, (performance.now() - atMs) / REPORT_MS);
      latest.current({ before: before ?? now, now, share });
      if (share < 1) frame = requestAnimationFrame(run);
    };
    const end = (calm ? slowLive : bench.live).subscribe((live) => {
      [before, now] = [live === null ? null : now, live];
      atMs = performance.now();
      frame ??= requestAnimationFrame(run);
    });
    return () => {
      end();
      if (frame !== null) cancelAnimationFrame(frame);
    };
  }, [bench, slowLive]);
}

/** A value on the straight line between the two. */
export function glided({ before, now, share }: Glide, pick: (levels: LiveLevels) => number): number {
  return pick(before) + share * (pick(now) - pick(before));
}
