import { useRef } from 'preact/hooks';
import { topFor } from '../draw/waveformPlot.ts';
import { useBenchView } from './BenchContext.ts';

const HOLD_MS = 3000;
/** Of full scale: quieter than this, waveforms are drawn as small as they are. */
const LEAST = 1e-3;

/** A round voltage over every peak of the input and the output of the last three seconds, so that the axis does not jump. */
export function useHeldTop(): number {
  const { bench, slowLive } = useBenchView();
  const held = useRef<readonly { readonly peakV: number; readonly atMs: number }[]>([]);
  const { fullScaleV } = bench.design.value;
  const live = slowLive.value;
  const nowMs = performance.now();
  const peakV = live === null ? 0 : Math.max(live.inputPeakV, fullScaleV * 10 ** (live.outputPeakDbfs / 20));
  held.current = [...held.current.filter(({ atMs }) => nowMs - atMs < HOLD_MS), { peakV, atMs: nowMs }];
  return topFor(Math.max(...held.current.map((each) => each.peakV)), LEAST * fullScaleV);
}
