import { useEffect } from 'preact/hooks';
import type { GateSweep } from '../draw/gateSweep.ts';
import { useBench } from './BenchContext.ts';

/** Writes down the gate of every report, from the first Start on. */
export function useGateSweep(sweep: GateSweep): void {
  const bench = useBench();
  useEffect(
    () =>
      bench.live.subscribe((live) => {
        if (live === null || bench.sound.peek() !== 'playing') return;
        const { controlV, gateSourceV, gateLowV, gateHighV } = live;
        sweep.note({ atSec: performance.now() / 1000, controlV, gateSourceV, gateLowV, gateHighV });
      }),
    [bench, sweep],
  );
}
