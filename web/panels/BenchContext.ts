import type { ReadonlySignal } from '@preact/signals';
import { createContext } from 'preact';
import { useContext } from 'preact/hooks';
import type { Variant } from '../../model/design/types.ts';
import type { ToneReading } from '../../model/study/tone.ts';
import type { Bench, LiveLevels, Moment } from '../state/bench.ts';

export interface BenchView {
  readonly bench: Bench;
  /** `bench.moment`, slowed for those who ask for less motion. */
  readonly moment: ReadonlySignal<Moment | null>;
  /** Its levels; null while sound is stopped. */
  readonly slowLive: ReadonlySignal<LiveLevels | null>;
  /** Notes a tap of the LFO's rate; from the second on it is set. Returns the sentence that refuses it, or null. */
  tapRate(atMs: number): string | null;
}

export const BenchContext = createContext<BenchView | null>(null);

export function useBenchView(): BenchView {
  const view = useContext(BenchContext);
  if (view === null) throw new Error('A panel stands outside the sheet: there is no bench here');
  return view;
}

export function useBench(): Bench {
  return useBenchView().bench;
}

/** The variant that is heard. */
export function useVariant(): Variant {
  const bench = useBench();
  return bench.design.value.variants[bench.heardVariant.value];
}

/** What the shadow tone reads, or null where it cannot. */
export function useReading(): ToneReading | null {
  const read = useBenchView().moment.value?.reading ?? null;
  return read !== null && 'thdFundamental' in read ? read : null;
}

/** True while sound plays: only then are readings coloured. */
export function usePlaying(): boolean {
  return useBench().sound.value === 'playing';
}
