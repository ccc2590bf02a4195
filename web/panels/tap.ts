/** A rate tapped by hand. */
import type { Bench } from '../state/bench.ts';

/** Longer than between the taps of the slowest rate that people tap, 0.4 Hz: a new one begins. */
const NEW_AFTER_MS = 2500;
/** Intervals that count: the last few, so that a change of mind is followed. */
const MOST_TAPS = 6;

export interface Tap {
  /** Notes a tap at this time; the rate in Hz to three digits, or null at the first. */
  tap(atMs: number): number | null;
}

export function createTap(): Tap {
  let taps: readonly number[] = [];
  return {
    tap(atMs) {
      const last = taps.at(-1);
      const again = last !== undefined && atMs > last && atMs - last <= NEW_AFTER_MS;
      taps = again ? [...taps.slice(1 - MOST_TAPS), atMs] : [atMs];
      if (taps.length < 2) return null;
      return Number(((1000 * (taps.length - 1)) / (atMs - taps[0])).toPrecision(3));
    },
  };
}

/** Sets the heard variant's LFO to the rate that is tapped; a sentence where that is refused or there is no LFO. */
export function createRateTap(bench: Bench): (atMs: number) => string | null {
  const tapped = createTap();
  return (atMs) => {
    const { control } = bench.design.peek().variants[bench.heardVariant.peek()];
    if (control.source !== 'lfo') return 'There is no LFO to tap the rate of.';
    const rateHz = tapped.tap(atMs);
    return rateHz === null ? null : bench.setValue('control.rateHz', rateHz);
  };
}
