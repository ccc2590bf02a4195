/** Takes the processor's messages in and sends its arrays back. */
import type { FromCell } from '../../worklet/protocol.ts';
import type { LiveLevels } from './bench.ts';
import type { Levels } from './levels.ts';
import type { Notes } from './notes.ts';
import type { SoundLine } from './soundLine.ts';
import type { Takes } from './takes.ts';

export interface ReceiverNeeds {
  readonly levels: Levels;
  readonly notes: Notes;
  takes(): Takes;
  line(): SoundLine;
  slots(): readonly number[];
  noteLatency(samples: number): void;
  /** The sound goes on: called with each report. */
  noteAlive(): void;
}

/** The load that is said, the one below which it may be said again, and how long it must last, s. */
const HIGH_LOAD = 0.85;
const CALM_LOAD = 0.7;
const LASTS_SEC = 4;

export function createReceiver({ levels, notes, takes, line, slots, noteLatency, noteAlive }: ReceiverNeeds): (message: FromCell) => void {
  let highSinceFrame: number | null = null;
  let said = false;

  const watchLoad = (frame: number, { loadFraction, variants }: LiveLevels) => {
    if (loadFraction < CALM_LOAD) said = false;
    if (loadFraction < HIGH_LOAD) highSinceFrame = null;
    else highSinceFrame ??= frame;
    const rateHz = line().sound()?.sampleRateHz ?? 0;
    if (said || highSinceFrame === null || frame - highSinceFrame < LASTS_SEC * rateHz) return;
    said = true;
    const what = variants.length === 1 ? 'The variant takes' : `The ${variants.length} variants take`;
    const share = `${Math.round(100 * loadFraction)} % of the time that this machine has for sound`;
    notes.add('note', `${what} ${share}; there may be gaps.`, 'Lower the oversampling, or take a variant out.');
  };

  return (message) => {
    switch (message.type) {
      case 'ready':
        noteLatency(message.latencySamples);
        return;
      case 'report': {
        noteAlive();
        const { slot, input, output, lagMs } = message;
        const sound = line().sound();
        sound?.noteLag(lagMs);
        levels.note(message, sound?.underruns() ?? 0, slots());
        const live = levels.live.peek();
        if (live !== null) watchLoad(message.frame, live);
        noteLatency(message.latencySamples);
        line().send({ type: 'return report', slot, input, output }, [input.buffer, output.buffer]);
        return;
      }
      case 'chunk': {
        const { slot, channels } = message;
        takes().noteChunk(message);
        const buffers = channels.map((samples) => samples.buffer);
        if (slot >= 0) line().send({ type: 'return chunk', slot, channels }, buffers);
        return;
      }
      case 'lost':
        notes.fault(`The page was too busy: ${message.frames} frames are missing from the take.`, 'Record it again.');
        return;
      case 'fault':
        notes.fault(message.sentence);
        return;
      default:
        message satisfies never;
        throw new TypeError(`The page does not know the processor's message ${JSON.stringify(message)}`);
    }
  };
}
