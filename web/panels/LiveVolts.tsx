import { gateVolts, voltsText } from '../draw/words.ts';
import type { LiveLevels } from '../state/bench.ts';
import { useBenchView } from './BenchContext.ts';
import { Sym } from './parts/Symbol.tsx';

interface LiveVoltsProps {
  readonly which: 'inputPeakV' | 'drainPeakV' | 'gateSourceV' | 'output';
  readonly name?: string;
  /** Subscript of V. */
  readonly symbol?: string | null;
}

/** A voltage of the circuit at this moment, where it is in the drawing; nothing before sound has run. */
export function LiveVolts({ which, name, symbol = null }: LiveVoltsProps) {
  const { bench, slowLive } = useBenchView();
  const live = slowLive.value;
  if (live === null) return name === undefined ? null : <span class="name">{name}</span>;
  const volts = which === 'output' ? outputPeakV(live, bench.design.value.fullScaleV) : live[which];
  return (
    <span class="live volts">
      {name !== undefined && <span class="name">{name} </span>}
      {symbol !== null && <Sym of="V" sub={symbol} />}
      {symbol !== null && ' '}
      {which === 'gateSourceV' ? gateVolts(volts) : voltsText(volts)}
    </span>
  );
}

/** The chain's output stands for volts on the same full scale as its input. */
function outputPeakV(live: LiveLevels, fullScaleV: number): number {
  return fullScaleV * 10 ** (live.outputPeakDbfs / 20);
}
