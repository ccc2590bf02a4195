/** The residual as it is chosen: which part of what the cell adds is heard, and with how much gain. */
import type { ReadonlySignal } from '@preact/signals';
import { signal } from '@preact/signals';
import type { ResidualPart } from '../../model/chain/residual.ts';
import type { ResidualChoice, ToCell } from '../../worklet/protocol.ts';
import type { Bench, Hearing } from './bench.ts';
import { setWithin } from './within.ts';

const FIRST_DB = 20;
const MOST_DB = 80;

export interface ResidualState extends Pick<Bench, 'residualPart' | 'setResidualPart' | 'residualGainDb' | 'setResidualGainDb'> {
  /** What a processor that is being made is to compute. */
  choice(): ResidualChoice;
  /** Tells the processor what has changed since. */
  tell(): void;
  /** Whether the heard variant's parts must hiss, whatever the design says. */
  wantsNoise(): boolean;
}

/** `changed` is called before the processor is told of another part: its chain may have to be another one. */
export function createResidualState(hearing: ReadonlySignal<Hearing>, send: (message: ToCell) => void, changed: () => void): ResidualState {
  const part = signal<ResidualPart>('distortion');
  const gainDb = signal(FIRST_DB);
  const isHeard = () => hearing.peek() === 'residual';
  const wanted = (): ResidualChoice => ({ part: isHeard() ? part.peek() : null, gain: 10 ** (gainDb.peek() / 20) });
  let told = wanted();
  const tell = () => {
    const next = wanted();
    if (next.part === told.part && next.gain === told.gain) return;
    told = next;
    send({ type: 'residual', residual: next });
  };
  return {
    residualPart: part,
    residualGainDb: gainDb,
    setResidualPart(next) {
      part.value = next;
      changed();
      tell();
      return null;
    },
    setResidualGainDb(db) {
      const refused = setWithin(gainDb, db, 0, MOST_DB, 'The gain of the residual', 'dB');
      if (refused === null) tell();
      return refused;
    },
    choice() {
      told = wanted();
      return told;
    },
    tell,
    wantsNoise: () => isHeard() && part.peek() === 'noise',
  };
}
