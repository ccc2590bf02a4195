import type { Signal } from '@preact/signals';
import { TIME_SPANS_SEC } from '../draw/waveformPlot.ts';
import { Choice, chosen } from './parts/Choice.tsx';

export type SignalView = 'spectrum' | 'waveforms';

const VIEWS: readonly { value: SignalView; words: string }[] = [
  { value: 'spectrum', words: 'Spectrum' },
  { value: 'waveforms', words: 'Waveforms' },
];
const SPANS = TIME_SPANS_SEC.map((sec) => ({ value: String(sec), words: `${1000 * sec}\u2009ms` }));

/** What Fig. 4 shows of the signals, and over which time. */
export function SignalChoice({ view, spanSec }: { readonly view: Signal<SignalView>; readonly spanSec: Signal<number> }) {
  return (
    <>
      <Choice label="What Fig. 4 shows" value={view.value} options={VIEWS} onChoose={chosen((next) => (view.value = next))} />
      {view.value === 'waveforms' && (
        <>
          {' '}
          over{' '}
          <Choice
            label="Time that the waveforms span"
            value={String(spanSec.value)}
            options={SPANS}
            onChoose={chosen((next) => (spanSec.value = Number(next)))}
          />
        </>
      )}
    </>
  );
}
