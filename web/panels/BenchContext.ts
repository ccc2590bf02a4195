import type { ReadonlySignal } from '@preact/signals';
import { createContext } from 'preact';
import { useContext } from 'preact/hooks';
import type { Variant } from '../../model/design/types.ts';
import type { Bench, LiveLevels } from '../state/bench.ts';

export interface BenchView {
  readonly bench: Bench;
  /** `bench.live`, slowed so that its numbers can be read. */
  readonly slowLive: ReadonlySignal<LiveLevels | null>;
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

/** True while sound plays: only then are readings coloured. */
export function usePlaying(): boolean {
  return useBench().sound.value === 'playing';
}
