/** Takes: recorded from the chain's output or rendered whole, kept in memory until the page closes. */
import type { ReadonlySignal } from '@preact/signals';
import { signal } from '@preact/signals';
import { writeWav } from '../../model/chain/wav.ts';
import { feedbackFraction } from '../../model/design/feedback.ts';
import type { Chunk } from '../../worklet/protocol.ts';
import type { Clip } from '../audio/clip.ts';
import { clipSeconds } from '../audio/clip.ts';
import type { Bench, Take } from './bench.ts';
import type { DocumentState } from './document.ts';
import { fileName } from './fileName.ts';
import type { Notes } from './notes.ts';
import type { Parts } from './parts.ts';
import type { FromRender, ToRender, WorkerPort } from './workers.ts';

const LONGEST_SEC = 1200;

/** What takes need of the sound that plays. */
export interface TakeSource {
  /** Asks the processor to record or to end; false where no sound is open. */
  record(on: boolean): boolean;
  /** Plays a take once, or null to end it; false where no sound is open. */
  play(clip: Clip | null): boolean;
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
  readonly heading: Pick<Take, 'variant' | 'k'>;
  readonly sampleRateHz: number;
  readonly pieces: Float32Array<ArrayBuffer>[][];
  frames: number;
}

export function createTakes(parts: Parts, document: DocumentState, source: TakeSource, notes: Notes): Takes {
  const takes = signal<readonly Take[]>([]);
  const taking = signal<{ readonly seconds: number } | null>(null);
  const rendering = signal<{ readonly fraction: number } | null>(null);
  const playingTake = signal<number | null>(null);
  const clips = new Map<number, Clip>();
  let recording: Recording | null = null;
  let render: { readonly worker: WorkerPort<ToRender, FromRender>; readonly done: () => void } | null = null;
  let nextId = 1;

  const heading = () => {
    const variant = document.variant.peek();
    return { variant: variant.name, k: feedbackFraction(variant.cell) };
  };

  const keep = (
    channels: readonly Float32Array<ArrayBuffer>[],
    sampleRateHz: number,
    about: Pick<Take, 'variant' | 'k'>,
    how: Take['how'],
  ) => {
    const id = nextId++;
    const clip: Clip = { title: `Take ${id}`, sampleRateHz, channels };
    clips.set(id, clip);
    takes.value = [...takes.value, { id, name: clip.title, ...about, seconds: clipSeconds(clip), sampleRateHz, how, deleted: false }];
  };

  const finish = () => {
    const ended = recording;
    recording = null;
    taking.value = null;
    if (ended === null || ended.frames === 0) return;
    keep(joinPieces(ended.pieces, ended.frames), ended.sampleRateHz, ended.heading, 'heard');
  };

  const edit = (id: number, change: Partial<Take>) => {
    takes.value = takes.value.map((take) => (take.id === id ? { ...take, ...change } : take));
  };

  const endRender = () => {
    render?.worker.end();
    render?.done();
    render = null;
    rendering.value = null;
  };

  const receiveRender = (message: FromRender, clip: Clip, about: Pick<Take, 'variant' | 'k'>) => {
    switch (message.type) {
      case 'progress':
        rendering.value = { fraction: message.fraction };
        return;
      case 'done':
        keep(message.channels, clip.sampleRateHz, about, 'rendered');
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
    takes,
    taking,
    rendering,
    playingTake,
    startTake() {
      if (recording !== null) return;
      if (!source.record(true)) return notes.fault('There is no sound to take. Press Start first.');
      recording = { heading: heading(), sampleRateHz: source.rateHz(), pieces: [], frames: 0 };
      taking.value = { seconds: 0 };
    },
    endTake() {
      if (recording !== null && !source.record(false)) finish();
    },
    noteChunk(chunk) {
      if (recording === null) return;
      if (chunk.frames > 0) recording.pieces.push(chunk.channels.map((line) => line.slice(0, chunk.frames)));
      recording.frames += chunk.frames;
      const seconds = recording.frames / recording.sampleRateHz;
      if (chunk.last) return finish();
      taking.value = { seconds };
      if (seconds < LONGEST_SEC) return;
      notes.add('note', `The take was ended at ${LONGEST_SEC / 60} minutes, the longest that is kept in memory.`);
      source.record(false);
    },
    cutShort: finish,
    renderClip() {
      const clip = source.clip();
      if (clip === null || render !== null) return Promise.resolve();
      const about = heading();
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
      const take = takes.peek().find((each) => each.id === id);
      const clip = clips.get(id);
      if (take === undefined || clip === undefined) return notes.fault(`There is no take ${id} to save.`);
      const { bytes, cut } = writeWav(clip.channels, clip.sampleRateHz, format);
      parts.download(`${fileName(take.name)}.wav`, bytes, 'audio/wav');
      if (cut > 0) notes.add('note', cutSentence(take.name, cut), 'Save it as 32-bit float to keep it whole.');
    },
    deleteTake(id) {
      if (playingTake.peek() === id) source.play(null);
      edit(id, { deleted: true });
    },
    restoreTake: (id) => edit(id, { deleted: false }),
    renameTake: (id, name) => edit(id, { name }),
    playTake(id) {
      const clip = id === null ? null : (clips.get(id) ?? null);
      if (!source.play(clip)) return notes.fault('A take is heard through the sound that plays. Press Start first.');
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
