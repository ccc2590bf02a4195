import { useRef } from 'preact/hooks';
import { sharedRange, type ThdRange } from '../draw/feedbackPlot.ts';

/** Longer than a period of most tremolos. */
const HOLD_MS = 3000;

/** While sound plays, one axis for all curves of the last three seconds; the curve's own otherwise. */
export function useHeldRange(range: ThdRange | null, playing: boolean): ThdRange | null {
  const held = useRef<readonly { readonly range: ThdRange; readonly atMs: number }[]>([]);
  if (range === null || !playing) {
    held.current = [];
    return range;
  }
  const nowMs = performance.now();
  held.current = [...held.current.filter(({ atMs }) => nowMs - atMs < HOLD_MS), { range, atMs: nowMs }];
  return sharedRange(held.current.map((each) => each.range));
}
