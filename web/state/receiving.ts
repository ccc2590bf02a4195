/** Takes the processor's messages in and sends its arrays back. */
import type { FromCell } from '../../worklet/protocol.ts';
import type { Levels } from './levels.ts';
import type { Notes } from './notes.ts';
import type { SoundLine } from './soundLine.ts';
import type { Takes } from './takes.ts';

export interface ReceiverNeeds {
  readonly levels: Levels;
  readonly notes: Notes;
  takes(): Takes;
  line(): SoundLine;
  noteLatency(samples: number): void;
}

export function createReceiver({ levels, notes, takes, line, noteLatency }: ReceiverNeeds): (message: FromCell) => void {
  return (message) => {
    switch (message.type) {
      case 'ready':
      case 'latency':
        noteLatency(message.latencySamples);
        return;
      case 'report': {
        const { slot, input, output, lagMs } = message;
        const sound = line().sound();
        sound?.noteLag(lagMs);
        levels.note(message, sound?.underruns() ?? 0);
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
