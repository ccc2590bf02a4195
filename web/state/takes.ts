/** Takes: what was heard, recorded, or the source rendered whole. */
import type { ReadonlySignal } from '@preact/signals';
import { signal } from '@preact/signals';
import { type WavFormat, writeWav } from '../../model/chain/wav.ts';
import { feedbackFraction } from '../../model/design/feedback.ts';
import { designText } from '../../model/design/text.ts';
import type { Chunk } from '../../worklet/protocol.ts';
import type { Clip } from '../audio/clip.ts';
import type { KeptRecord, Store } from '../store/store.ts';
import type { Bench, TakeFormat, TakesLast } from './bench.ts';
import type { DocumentState } from './document.ts';
import { fileName } from './fileName.ts';
import type { Notes } from './notes.ts';
import { sentenceOf } from './notes.ts';
import type { Parts } from './parts.ts';
import type { Shelf } from './shelf.ts';
import { bytesOf } from './takeAudio.ts';
import type { About, Draft } from './takeStore.ts';
import { createTakeStore, MOST_BYTES } from './takeStore.ts';
import type { FromRender, ToRender, WorkerPort } from './workers.ts';

/** Of what was heard, named one after the other; of more, the first ones. */
const MOST_NAMED = 4;
/** Room that there must be to begin with: about three seconds. */
const LEAST_BYTES = 1e6;
const ROOM = `${MOST_BYTES / 1e6} MB that are kept for takes`;

/** What takes need of the sound that plays. */
export interface TakeSource {
  /** Asks the processor to record, through the port where there is one, or to end; false where no sound is open. */
  record(on: boolean, to?: MessagePort): boolean;
  /** Channels of what is heard; null where no sound is open. */
  channels(): number | null;
  plays(): boolean;
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
  | 'takesLast'
>;

const DITHERED = ' dithered';
const CODINGS: Readonly<Record<TakeFormat, WavFormat>> = {
  pcm16: 'pcm16',
  'pcm16 dithered': 'pcm16',
  pcm24: 'pcm24',
  'pcm24 dithered': 'pcm24',
  float32: 'float32',
};

export interface TakesNeeds {
  readonly parts: Parts;
  readonly document: DocumentState;
  readonly source: TakeSource;
  readonly notes: Notes;
  readonly shelf: Shelf;
  readonly store: Pick<Store, 'openFiles' | 'persist' | 'persisted'>;
}

export interface Takes extends TakeActions {
  /** Takes a chunk in; its arrays are copied, so they may go back at once. */
  noteChunk(chunk: Chunk): void;
  /** The sound that was being recorded is gone: what there is becomes the take. */
  cutShort(): void;
  noteEnded(): void;
  /** This tab is the one that keeps. Brings back the takes of earlier visits, and keeps those of this one from here on. */
  hold(records: readonly KeptRecord[]): Promise<void>;
  /** Writes every record again. */
  keepAnew(): void;
}

interface Recording {
  readonly k: number | null;
  readonly design: string;
  readonly sampleRateHz: number;
  readonly channelCount: number;
  readonly draft: Draft;
  /** In order, in words. */
  readonly heard: string[];
  frames: number;
}

export function createTakes({ parts, document, source, notes, shelf, store }: TakesNeeds): Takes {
  const list = createTakeStore(shelf, notes);
  const taking = signal<{ readonly seconds: number } | null>(null);
  const rendering = signal<{ readonly fraction: number } | null>(null);
  const playingTake = signal<number | null>(null);
  const takesLast = signal<TakesLast>('page');
  let recording: Recording | null = null;
  let render: { readonly worker: WorkerPort<ToRender, FromRender>; readonly done: () => void } | null = null;
  let persistAsked = false;
  /** Counts what was asked to be played: a take is read from its file first, and the last word counts. */
  let plays = 0;

  const takeOf = (id: number) => list.takes.peek().find((each) => each.id === id);
  const heardK = () => feedbackFraction(document.variant.peek().cell);
  const textNow = () => designText(document.design.peek(), document.heardVariant.peek());
  const aboutOf = ({ heard, k, design }: Recording): About => {
    const variant = heard.slice(0, MOST_NAMED).join(' then ') + (heard.length > MOST_NAMED ? ' and on' : '');
    return { variant, k, design, how: 'heard' };
  };

  const finish = () => {
    const ended = recording;
    recording = null;
    taking.value = null;
    ended?.draft.finish(aboutOf(ended));
  };

  source.heardWords.subscribe((words) => {
    if (recording === null || recording.heard.at(-1) === words) return;
    recording.heard.push(words);
    recording.draft.note(aboutOf(recording));
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
      case 'done': {
        const draft = list.begin({ channelCount: message.channels.length, sampleRateHz: clip.sampleRateHz }, about);
        draft.append(message.channels);
        draft.finish(about);
        return endRender();
      }
      case 'fault':
        notes.fault(message.sentence);
        return endRender();
      default:
        message satisfies never;
        throw new TypeError(`The page does not know the worker's render ${JSON.stringify(message)}`);
    }
  };

  /** Asked for at the first take, since a browser may ask the user in turn. */
  const askToPersist = () => {
    if (persistAsked || takesLast.peek() !== 'browser') return;
    persistAsked = true;
    store.persist().then((granted) => {
      if (granted) takesLast.value = 'lasting';
    }, notes.fault);
  };

  const endOverfull = (why: string) => {
    notes.add('note', `The take has been ended: it fills the ${why}.`, 'Save takes and delete them.');
    source.record(false);
  };

  const noteFrames = (about: Recording, frames: number, last: boolean) => {
    about.frames += frames;
    taking.value = { seconds: about.frames / about.sampleRateHz };
    if (last) return finish();
    if (4 * about.channelCount * about.frames > MOST_BYTES) return endOverfull(`${MOST_BYTES / 1e6} MB that a take may have`);
    if (!list.makeRoom(0)) endOverfull(ROOM);
  };

  return {
    takes: list.takes,
    taking,
    rendering,
    playingTake,
    takesLast,
    startTake() {
      if (recording !== null) return;
      if (!list.makeRoom(LEAST_BYTES)) return notes.fault(`The ${ROOM} are full.`, 'Save takes and delete them.');
      const channelCount = source.channels();
      if (channelCount === null || !source.plays()) return notes.fault('There is no sound to take. Press Start first.');
      askToPersist();
      const k = source.hearsCell() ? heardK() : null;
      const heard = [source.heardWords.peek()];
      const sampleRateHz = source.rateHz();
      const design = textNow();
      const draft = list.begin({ channelCount, sampleRateHz }, { variant: heard[0], k, design, how: 'heard' });
      const begun: Recording = { k, design, sampleRateHz, channelCount, draft, heard, frames: 0 };
      recording = begun;
      taking.value = { seconds: 0 };
      const port = draft.openPort((frames, last) => {
        if (recording === begun) noteFrames(begun, frames, last);
      });
      source.record(true, port ?? undefined);
    },
    endTake() {
      if (recording !== null && !source.record(false)) finish();
    },
    noteChunk(chunk) {
      if (recording === null) return;
      if (chunk.frames > 0) recording.draft.append(chunk.channels.map((line) => line.slice(0, chunk.frames)));
      noteFrames(recording, chunk.frames, chunk.last);
    },
    cutShort: finish,
    renderClip() {
      const clip = source.clip();
      if (render !== null) return Promise.resolve();
      if (clip === null) {
        notes.fault('There is no whole to render; live input has no end.', 'Take what is heard instead.');
        return Promise.resolve();
      }
      const bytes = bytesOf(clip.channels);
      if (bytes > MOST_BYTES || !list.makeRoom(bytes)) {
        notes.fault(`A render of ${Math.round(bytes / 1e6)} MB does not fit into the ${ROOM}.`, 'Save takes and delete them.');
        return Promise.resolve();
      }
      askToPersist();
      const about: About = { variant: document.variant.peek().name, k: heardK(), design: textNow(), how: 'rendered' };
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
    async saveTake(id, format) {
      const take = takeOf(id);
      if (take === undefined) return notes.fault(`There is no take ${id} to save.`);
      try {
        const clip = await list.read(id);
        const { design } = take;
        const { bytes, cut } = writeWav(clip.channels, clip.sampleRateHz, CODINGS[format], {
          dither: format.endsWith(DITHERED) ? 'triangular' : 'none',
          ...(design === null ? {} : { design }),
        });
        parts.download(`${fileName(take.name)}.wav`, bytes, 'audio/wav');
        if (cut > 0) notes.add('note', cutSentence(take.name, cut), 'Save it as 32-bit float to keep it whole.');
      } catch (error) {
        notes.fault(error);
      }
    },
    deleteTake(id) {
      if (playingTake.peek() === id) source.play(null, '');
      list.edit(id, { deleted: true });
    },
    restoreTake: (id) => list.edit(id, { deleted: false }),
    renameTake: (id, name) => list.edit(id, { name }),
    async playTake(id) {
      plays++;
      const mine = plays;
      const take = id === null ? null : takeOf(id);
      if (take === undefined) return notes.fault(`There is no take ${id} to play.`);
      try {
        const clip = id === null ? null : await list.read(id);
        if (mine !== plays) return;
        if (!source.play(clip, take?.name ?? '')) return notes.fault('A take is heard through the sound that plays. Press Start first.');
        playingTake.value = id;
      } catch (error) {
        notes.fault(error);
      }
    },
    noteEnded() {
      playingTake.value = null;
    },
    async hold(records) {
      try {
        await list.useFiles(await store.openFiles(), records);
        takesLast.value = (await store.persisted()) ? 'lasting' : 'browser';
      } catch (error) {
        notes.add('note', `This browser keeps no audio here: ${sentenceOf(error)}. Takes last until this page closes.`, 'Save them.');
      }
    },
    keepAnew: list.keepAnew,
  };
}

function cutSentence(name: string, cut: number): string {
  return cut === 1
    ? `One sample of “${name}” lies past full scale and was cut.`
    : `${cut} samples of “${name}” lie past full scale and were cut.`;
}
