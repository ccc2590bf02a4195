/** What can be put through the chain, and the choice of it: phrases, the user's files, the test tone, live input. */
import type { Signal } from '@preact/signals';
import { signal } from '@preact/signals';
import { testTone } from '../../model/chain/testTone.ts';
import type { LiveInput } from '../audio/input.ts';
import type { Source } from '../audio/source.ts';
import type { Bench } from './bench.ts';
import type { DocumentState } from './document.ts';
import type { Library } from './library.ts';
import type { Listening } from './listening.ts';
import type { Notes } from './notes.ts';
import type { Parts } from './parts.ts';
import { setWithin } from './within.ts';

const TONE_RATE_HZ = 48000;
const FIRST_TONE_HZ = 997;
const FIRST_TONE_V = 0.2;
/** Larger files are not read into memory. */
const MOST_FILE_BYTES = 1e9;

export interface Sources
  extends Pick<
    Bench,
    | 'phrases'
    | 'choosePhrase'
    | 'openAudio'
    | 'chooseTestTone'
    | 'testToneHz'
    | 'setTestToneHz'
    | 'testToneV'
    | 'setTestToneV'
    | 'inputs'
    | 'openInput'
  > {
  /** The name of the phrase that was chosen last; null before the first choice. */
  readonly phrase: Signal<string | null>;
  /** The name of the user's file that is chosen, at first that of the last visit; null while anything else is. */
  readonly file: Signal<string | null>;
  /** Chooses the last visit's phrase, else the first one, where nothing is chosen or being loaded. Rejects with a sentence. */
  loadFirst(): Promise<void>;
}

export interface SourcesNeeds {
  readonly parts: Parts;
  readonly library: Library;
  readonly document: Pick<DocumentState, 'design'>;
  readonly notes: Notes;
  /** Resolves when the last visit's phrase is known. */
  restored(): Promise<void>;
  listening(): Pick<Listening, 'source' | 'setSource' | 'stop'>;
}

export function createSources({ parts, library, document, notes, restored, listening }: SourcesNeeds): Sources {
  const phrase = signal<string | null>(null);
  const file = signal<string | null>(null);
  const testToneHz = signal(FIRST_TONE_HZ);
  const testToneV = signal(FIRST_TONE_V);
  const inputs = signal<Bench['inputs']['value']>([]);
  /** Counts the choices of a source: while one is being loaded another may be made, and the last one counts. */
  let choice = 0;
  let choosing: Promise<unknown> = Promise.resolve();
  /** The last one that was no live input. */
  let recorded: Source | null = null;
  let opened: LiveInput | null = null;
  /** Inputs that went away, maybe while sound was still being opened for them. */
  const gone = new WeakSet<LiveInput>();

  /** What is listened to from now on; the input before it is let go. */
  const hold = (source: Source) => {
    const live = source.kind === 'live' ? source.input : null;
    if (live !== opened) opened?.end();
    opened = live;
    if (source.kind !== 'live') recorded = source;
    else if (gone.has(source.input)) lost(source.input);
  };

  const choose = (load: () => Promise<Source>) => {
    choice++;
    const mine = choice;
    const take = async (source: Source) => {
      try {
        if (mine !== choice) return letGo(source);
        await listening().setSource(source);
        file.value = source.kind === 'file' ? source.clip.title : null;
        hold(source);
      } catch (error) {
        letGo(source);
        throw error;
      }
    };
    const chosen = load().then(take);
    choosing = Promise.allSettled([chosen]);
    return chosen;
  };

  const noting = (work: Promise<unknown>) => work.then(() => undefined, notes.fault);
  const loadPhrase = async (name: string): Promise<Source> => {
    phrase.value = name;
    return { kind: 'phrase', clip: await library.loadPhrase(name) };
  };

  const loadTone = async (): Promise<Source> => {
    const peak = testToneV.peek() / document.design.peek().fullScaleV;
    const samples = testTone(testToneHz.peek(), peak, TONE_RATE_HZ);
    return { kind: 'tone', clip: { title: 'Test tone', sampleRateHz: TONE_RATE_HZ, channels: [samples] } };
  };
  const toneAgain = (refused: string | null) => {
    if (refused === null && listening().source.peek().kind === 'tone') void noting(choose(loadTone));
    return refused;
  };
  // The tone's volts stay when the volts of a sample change.
  let fullScaleV = document.design.peek().fullScaleV;
  document.design.subscribe((design) => {
    if (design.fullScaleV === fullScaleV) return;
    fullScaleV = design.fullScaleV;
    toneAgain(null);
  });

  const loadInput = async (deviceId: string | null): Promise<Source> => {
    const live = await parts.inputs.open(deviceId, (input) => {
      gone.add(input);
      lost(input);
    });
    inputs.value = await parts.inputs.list();
    if (live.keptOn.length > 0) {
      notes.add('note', `The browser keeps ${live.keptOn.join(' and ')} on for “${live.title}”; what is heard is not the input as it is.`);
    }
    return { kind: 'live', input: live };
  };

  /** Sound stops, and what was chosen before the input is there again. */
  const lost = (live: LiveInput) => {
    if (live !== opened) return;
    listening().stop();
    notes.fault(`The input “${live.title}” is gone; sound was stopped.`, 'Plug it in and choose live input again, or press Start.');
    void noting(choose(async () => recorded ?? loadPhrase(library.phrases.peek()[0].name)));
  };

  const devicesChanged = async () => {
    if (opened === null) return;
    const live = opened;
    inputs.value = await parts.inputs.list();
    const rateHz = parts.inputs.rateHz(live);
    if (live !== opened || rateHz === live.sampleRateHz) return;
    notes.add('note', `The input “${live.title}” now runs at ${rateHz} Hz; it was opened again, muted.`);
    await choose(() => loadInput(live.deviceId));
  };
  parts.inputs.watch(() => void noting(devicesChanged()));

  const openFile = async (file: File): Promise<Source> => {
    if (file.size > MOST_FILE_BYTES) {
      throw new Error(`“${file.name}” is ${(file.size / 1e9).toFixed(1)} GB large; expected at most ${MOST_FILE_BYTES / 1e9} GB.`);
    }
    const bytes = await file.arrayBuffer().catch(() => {
      throw new Error(`“${file.name}” cannot be read: it is a folder, was moved, or may not be opened.`);
    });
    return { kind: 'file', clip: await parts.decodeAudio(bytes, file.name) };
  };

  return {
    phrases: library.phrases,
    phrase,
    file,
    choosePhrase: (name) => noting(choose(() => loadPhrase(name))),
    openAudio: (file) => noting(choose(() => openFile(file))),
    chooseTestTone: () => noting(choose(loadTone)),
    testToneHz,
    testToneV,
    setTestToneHz: (hz) => toneAgain(setWithin(testToneHz, hz, 1, 20000, 'The test tone', 'Hz')),
    setTestToneV: (volts) => toneAgain(setWithin(testToneV, volts, 1e-4, 100, 'The test tone', 'V peak')),
    inputs,
    openInput: (deviceId) => noting(choose(() => loadInput(deviceId ?? null))),
    async loadFirst() {
      await Promise.all([library.load(), restored()]);
      await choosing;
      const names = library.phrases.peek().map(({ name }) => name);
      const first = names.find((name) => name === phrase.peek()) ?? names[0];
      if (first === undefined || listening().source.peek().title !== '') return;
      if (file.peek() !== null) {
        notes.add(
          'note',
          `“${file.peek()}” was heard at the last visit; recordings of yours are not kept here.`,
          'Open it again to hear it.',
        );
      }
      await choose(() => loadPhrase(first));
    },
  };
}

function letGo(source: Source): void {
  if (source.kind === 'live') source.input.end();
}
