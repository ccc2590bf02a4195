/** Takes: what was heard, recorded, or the source rendered whole. */
import type { ReadonlySignal } from '@preact/signals';
import { signal } from '@preact/signals';
import { writeWav } from '../../model/chain/wav.ts';
import { feedbackFraction } from '../../model/design/feedback.ts';
import type { Chunk } from '../../worklet/protocol.ts';
import type { Clip } from '../audio/clip.ts';
import type { Bench, Take } from './bench.ts';
import type { DocumentState } from './document.ts';
import { fileName } from './fileName.ts';
import type { Notes } from './notes.ts';
import type { Parts } from './parts.ts';
import { bytesOf, createTakeStore, MOST_BYTES } from './takeStore.ts';
import type { FromRender, ToRender, WorkerPort } from './workers.ts';

/** Of what was heard, named one after the other; of more, the first ones. */
const MOST_NAMED = 4;
/** Room that there must be to begin with: about three seconds. */
const LEAST_BYTES = 1e6;
const ROOM = `${MOST_BYTES / 1e6} MB that are kept for takes`;

/** What takes need of the sound that plays. */
export interface TakeSource {
  /** Asks the processor to record or to end; false where no sound is open. */
  record(on: boolean): boolean;
  /** Plays a take once, under the name that is shown, or null to end it; false where no sound is open. */
  play(clip: Clip | null, name: string): boolean;
  /** What is heard now, in words, and whether it is the heard variant as it stands. */
  readonly heardWords: ReadonlySignal<string>;
  hearsCell(): boolean;
  rateHz(): number;
  /** The whole source, or null while none has been loaded. */
  clip(): Clip | null;
}

type TakeActions = Pick<
  Bench,
  | 'takes'
  | 'taking'
  | 'rendering'
  | 'playingTake'
  | 'startTake'
  | 'endTake'
  | 'renderClip'
  | 'endRender'
  | 'saveTake'
  | 'deleteTake'
  | 'restoreTake'
  | 'renameTake'
  | 'playTake'
>;

export interface Takes extends TakeActions {
  readonly takes: ReadonlySignal<readonly Take[]>;
  /** Takes a chunk in; its arrays are copied, so they may go back at once. */
  noteChunk(chunk: Chunk): void;
  /** The sound that was being recorded is gone: what there is becomes the take. */
  cutShort(): void;
  noteEnded(): void;
}

interface Recording {
  readonly k: number | null;
  readonly sampleRateHz: number;
  readonly pieces: Float32Array<ArrayBuffer>[][];
  /** In order, in words. */
  readonly heard: string[];
  frames: number;
  bytes: number;
}

type About = Pick<Take, 'variant' | 'k' | 'how'>;

export function createTakes(parts: Parts, document: DocumentState, source: TakeSource, notes: Notes): Takes {
  const store = createTakeStore();
  const taking = signal<{ readonly seconds: number } | null>(null);
  const rendering = signal<{ readonly fraction: number } | null>(null);
  const playingTake = signal<number | null>(null);
  let recording: Recording | null = null;
  let render: { readonly worker: WorkerPort<ToRender, FromRender>; readonly done: () => void } | null = null;

  const takeOf = (id: number) => store.takes.peek().find((each) => each.id === id);
  const heardK = () => feedbackFraction(document.variant.peek().cell);

  const finish = () => {
    const ended = recording;
    recording = null;
    taking.value = null;
    if (ended === null || ended.frames === 0) return;
    const { heard, k, frames, pieces, sampleRateHz } = ended;
    const variant = heard.slice(0, MOST_NAMED).join(' then ') + (heard.length > MOST_NAMED ? ' and on' : '');
    store.keep(joinPieces(pieces, frames), sampleRateHz, { variant, k, how: 'heard' });
  };

  source.heardWords.subscribe((words) => {
    if (recording !== null && recording.heard.at(-1) !== words) recording.heard.push(words);
  });

  const endRender = () => {
    render?.worker.end();
    render?.done();
    render = null;
    rendering.value = null;
  };

  const receiveRender = (message: FromRender, clip: Clip, about: About) => {
    switch (message.type) {
      case 'progress':
        rendering.value = { fraction: message.fraction };
        return;
      case 'done':
        store.keep(message.channels, clip.sampleRateHz, about);
        return endRender();
      case 'fault':
        notes.fault(message.sentence);
        return endRender();
      default:
        message satisfies never;
        throw new TypeError(`The page does not know the worker's render ${JSON.stringify(message)}`);
    }
  };

  return {
    takes: store.takes,
    taking,
    rendering,
    playingTake,
    startTake() {
      if (recording !== null) return;
      if (!store.makeRoom(LEAST_BYTES)) return notes.fault(`The ${ROOM} are full.`, 'Save takes and delete them.');
      if (!source.record(true)) return notes.fault('There is no sound to take. Press Start first.');
      const k = source.hearsCell() ? heardK() : null;
      recording = { k, sampleRateHz: source.rateHz(), pieces: [], heard: [source.heardWords.peek()], frames: 0, bytes: 0 };
      taking.value = { seconds: 0 };
    },
    endTake() {
      if (recording !== null && !source.record(false)) finish();
    },
    noteChunk(chunk) {
      if (recording === null) return;
      const piece = chunk.channels.map((line) => line.slice(0, chunk.frames));
      recording.pieces.push(piece);
      recording.frames += chunk.frames;
      recording.bytes += bytesOf(piece);
      taking.value = { seconds: recording.frames / recording.sampleRateHz };
      if (chunk.last) return finish();
      if (store.makeRoom(recording.bytes)) return;
      notes.add('note', `The take has been ended: it fills the ${ROOM}.`, 'Save takes and delete them.');
      source.record(false);
    },
    cutShort: finish,
    renderClip() {
      const clip = source.clip();
      if (render !== null) return Promise.resolve();
      if (clip === null) {
        notes.fault('There is no whole to render; live input has no end.', 'Take what is heard instead.');
        return Promise.resolve();
      }
      if (!store.makeRoom(bytesOf(clip.channels))) {
        notes.fault(
          `A render of ${Math.round(bytesOf(clip.channels) / 1e6)} MB does not fit into the ${ROOM}.`,
          'Save takes and delete them.',
        );
        return Promise.resolve();
      }
      const about: About = { variant: document.variant.peek().name, k: heardK(), how: 'rendered' };
      const worker = parts.openRenderWorker();
      rendering.value = { fraction: 0 };
      return new Promise<void>((done) => {
        render = { worker, done };
        const receive = (message: FromRender) => receiveRender(message, clip, about);
        worker.receive(receive, (sentence) => receive({ type: 'fault', sentence }));
        const { channels, sampleRateHz } = clip;
        worker.post({ type: 'render', design: document.design.peek(), variantIndex: document.heardVariant.peek(), channels, sampleRateHz });
      });
    },
    endRender,
    saveTake(id, format) {
      const take = takeOf(id);
      const clip = store.clip(id);
      if (take === undefined || clip === null) return notes.fault(`There is no take ${id} to save.`);
      const { bytes, cut } = writeWav(clip.channels, clip.sampleRateHz, format);
      parts.download(`${fileName(take.name)}.wav`, bytes, 'audio/wav');
      if (cut > 0) notes.add('note', cutSentence(take.name, cut), 'Save it as 32-bit float to keep it whole.');
    },
    deleteTake(id) {
      if (playingTake.peek() === id) source.play(null, '');
      store.edit(id, { deleted: true });
    },
    restoreTake: (id) => store.edit(id, { deleted: false }),
    renameTake: (id, name) => store.edit(id, { name }),
    playTake(id) {
      const clip = id === null ? null : store.clip(id);
      if (id !== null && clip === null) return notes.fault(`There is no take ${id} to play.`);
      const name = id === null ? '' : (takeOf(id)?.name ?? '');
      if (!source.play(clip, name)) return notes.fault('A take is heard through the sound that plays. Press Start first.');
      playingTake.value = clip === null ? null : id;
    },
    noteEnded() {
      playingTake.value = null;
    },
  };
}

function joinPieces(pieces: readonly (readonly Float32Array<ArrayBuffer>[])[], frames: number): Float32Array<ArrayBuffer>[] {
  return pieces[0].map((_, c) => {
    const line = new Float32Array(frames);
    let at = 0;
    for (const piece of pieces) {
      line.set(piece[c], at);
      at += piece[c].length;
    }
    return line;
  });
}

function cutSentence(name: string, cut: number): string {
  return cut === 1
    ? `One sample of “${name}” lies past full scale and was cut.`
    : `${cut} samples of “${name}” lie past full scale and were cut.`;
}
