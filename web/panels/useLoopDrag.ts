import { useRef } from 'preact/hooks';
import { endAt } from '../draw/overview.ts';
import { type Scale, toValue } from '../draw/scale.ts';
import type { Region } from '../state/bench.ts';
import { useBench } from './BenchContext.ts';
import { rootPixels } from './parts/useSheetSize.ts';

/** A press that moves no further than this is no drag. */
const STILL = 4;

/** A press seeks; outside the loop it ends the loop as well. A drag marks a new loop, or moves the end that it began at. */
export function useLoopDrag(time: Scale, draft: { value: Region | null }, say: (refused: string | null) => void) {
  const bench = useBench();
  const pressed = useRef<{ readonly pixel: number; readonly fixedSec: number; dragged: boolean } | null>(null);
  const pixelOf = (event: PointerEvent) => {
    const box = (event.currentTarget as HTMLElement).getBoundingClientRect();
    return Math.max(time.start, Math.min(time.end, ((event.clientX - box.left) * 16) / rootPixels()));
  };
  const seekTo = (seconds: number) => {
    const region = bench.region.peek();
    if (region !== null && (seconds < region.fromSec || seconds > region.toSec)) say(bench.setRegion(null));
    say(bench.seek(seconds));
  };
  return {
    onPointerDown(event: PointerEvent) {
      if (event.button !== 0) return;
      (event.currentTarget as HTMLElement).setPointerCapture(event.pointerId);
      const pixel = pixelOf(event);
      const region = bench.region.peek();
      const end = endAt(time, region, pixel);
      const fixedSec = region !== null && end !== null ? (end === 'from' ? region.toSec : region.fromSec) : toValue(time, pixel);
      pressed.current = { pixel, fixedSec, dragged: false };
    },
    onPointerMove(event: PointerEvent) {
      const press = pressed.current;
      if (press === null) return;
      const pixel = pixelOf(event);
      press.dragged ||= Math.abs(pixel - press.pixel) > STILL;
      if (!press.dragged) return;
      const seconds = toValue(time, pixel);
      draft.value = { fromSec: Math.min(press.fixedSec, seconds), toSec: Math.max(press.fixedSec, seconds) };
    },
    onPointerUp(event: PointerEvent) {
      const press = pressed.current;
      pressed.current = null;
      if (press === null) return;
      if (draft.value === null) seekTo(toValue(time, pixelOf(event)));
      else say(bench.setRegion(draft.value));
      draft.value = null;
    },
    onPointerCancel() {
      pressed.current = null;
      draft.value = null;
    },
  };
}
