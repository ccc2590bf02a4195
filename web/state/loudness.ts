/** How loud the sound leaves: the listening level and the ceiling, checked here and sent as ratios. */
import { signal } from '@preact/signals';
import type { CellOptions, ToCell } from '../../worklet/protocol.ts';
import type { Bench } from './bench.ts';
import { setWithin } from './within.ts';

const FIRST_LISTEN_DB = -12;
const FIRST_CEILING_DBFS = -6;

export interface Loudness extends Pick<Bench, 'listenDb' | 'setListenDb' | 'ceilingDbfs' | 'setCeilingDbfs'> {
  /** The same for a processor that is being made. */
  options(): Pick<CellOptions, 'gain' | 'ceilingPeak'>;
  /** Sends both as they are. */
  tell(): void;
}

export function createLoudness(send: (message: ToCell) => void): Loudness {
  const listenDb = signal(FIRST_LISTEN_DB);
  const ceilingDbfs = signal(FIRST_CEILING_DBFS);
  return {
    listenDb,
    ceilingDbfs,
    options: () => ({ gain: toRatio(listenDb.peek()), ceilingPeak: toRatio(ceilingDbfs.peek()) }),
    tell() {
      send({ type: 'gain', gain: toRatio(listenDb.peek()) });
      send({ type: 'ceiling', peak: toRatio(ceilingDbfs.peek()) });
    },
    setListenDb(db) {
      const refused = setWithin(listenDb, db, -60, 0, 'The listening level', 'dB');
      if (refused === null) send({ type: 'gain', gain: toRatio(db) });
      return refused;
    },
    setCeilingDbfs(db) {
      const refused = setWithin(ceilingDbfs, db, -40, 0, 'The ceiling', 'dBFS');
      if (refused === null) send({ type: 'ceiling', peak: toRatio(db) });
      return refused;
    },
  };
}

function toRatio(db: number): number {
  return 10 ** (db / 20);
}
