/** The samples of takes: in files where this browser keeps them, else in memory. A take that a file has no more room for goes on in memory. */
import type { Files, Samples } from '../store/store.ts';
import { sentenceOf } from './notes.ts';

export interface TakeAudio {
  /** Adds samples to the end; the arrays are taken over. */
  append(name: string, channels: Samples): void;
  /**
   * A way into the file that does not lead through the page, for what is being recorded: the end of it that the processor is given. `heard` is told of
   * every chunk, written or appended here. Null where there are no files.
   */
  openPort(name: string, heard: (frames: number, last: boolean) => void): MessagePort | null;
  /** No more comes. */
  end(name: string): void;
  /** All samples so far; rejects with why they cannot be read. */
  read(name: string, channelCount: number): Promise<Samples>;
  /** Never rejects: what fails is told. */
  remove(name: string): Promise<void>;
  /** What is held in memory. */
  bytes(): number;
  /** From here on samples go into files; what is in memory is moved there. */
  useFiles(files: Files): void;
  /** Takes a file in that is there already. */
  adopt(name: string): void;
  inFiles(): boolean;
}

export interface TakeAudioEvents {
  /** A file is full: gives up something else and resolves with true, or with false where there is nothing. */
  makeRoom(): Promise<boolean>;
  /** The rest of a take stays in memory; said once for each. */
  refused(name: string, reason: string): void;
  failed(sentence: string): void;
}

interface Entry {
  /** What follows on what is in the file. */
  tail: Samples[];
  inFile: boolean;
  ended: boolean;
  /** One thing after the other, in the order in which it was asked for. */
  turn: Promise<void>;
}

/** Of one message to the files: about a second of stereo. */
const SLICE_FRAMES = 65_536;

export function createTakeAudio(events: TakeAudioEvents): TakeAudio {
  let files: Files | null = null;
  const entries = new Map<string, Entry>();

  const entryOf = (name: string) => {
    const known = entries.get(name);
    if (known !== undefined) return known;
    const entry: Entry = { tail: [], inFile: false, ended: false, turn: Promise.resolve() };
    entries.set(name, entry);
    return entry;
  };

  const inTurn = (entry: Entry, work: () => Promise<unknown>) => {
    entry.turn = entry.turn.then(work).then(
      () => undefined,
      (error) => events.failed(`A take could not be kept: ${sentenceOf(error)}.`),
    );
  };

  const write = async (name: string, entry: Entry, channels: Samples, into: Files) => {
    if (entry.tail.length > 0) {
      entry.tail.push(channels);
      return;
    }
    for (let rest = channels; ; ) {
      const refusal = await into.append(name, rest);
      entry.inFile ||= refusal === null;
      if (refusal === null) return;
      rest = refusal.channels;
      if (refusal.full && (await events.makeRoom())) continue;
      entry.tail.push(rest);
      return events.refused(name, refusal.sentence);
    }
  };

  return {
    append(name, channels) {
      const entry = entryOf(name);
      const into = files;
      if (into === null) entry.tail.push(channels);
      else for (const slice of slicesOf(channels)) inTurn(entry, () => write(name, entry, slice, into));
    },
    openPort(name, heard) {
      const into = files;
      if (into === null) return null;
      const entry = entryOf(name);
      const { port1, port2 } = new MessageChannel();
      const recorded = into.record(name, port2, ({ frames, last, handedOn }) => {
        entry.inFile ||= handedOn === null && frames > 0;
        if (handedOn !== null) inTurn(entry, () => write(name, entry, handedOn, into));
        heard(frames, last);
      });
      inTurn(entry, () => recorded);
      return port1;
    },
    end(name) {
      const entry = entryOf(name);
      entry.ended = true;
      const into = files;
      if (into !== null) inTurn(entry, () => into.close(name));
      else if (entry.tail.length > 1) entry.tail = [join(entry.tail)];
    },
    async read(name, channelCount) {
      const entry = entries.get(name);
      if (entry === undefined) throw new Error('it is no longer there');
      await entry.turn;
      const inFile = entry.inFile && files !== null ? [await files.readSamples(name, channelCount)] : [];
      const pieces = [...inFile, ...entry.tail];
      if (pieces.length === 0) throw new Error('it is no longer there');
      return join(pieces);
    },
    async remove(name) {
      const entry = entries.get(name);
      entries.delete(name);
      await entry?.turn;
      await files?.remove(name).catch((error) => events.failed(`A take could not be removed: ${sentenceOf(error)}.`));
    },
    bytes: () => [...entries.values()].reduce((sum, { tail }) => sum + tail.reduce((part, piece) => part + bytesOf(piece), 0), 0),
    useFiles(opened) {
      files = opened;
      for (const [name, entry] of entries) {
        const pieces = entry.tail;
        entry.tail = [];
        for (const piece of pieces.flatMap(slicesOf)) inTurn(entry, () => write(name, entry, piece, opened));
        if (entry.ended) inTurn(entry, () => opened.close(name));
      }
    },
    adopt(name) {
      Object.assign(entryOf(name), { inFile: true, ended: true });
    },
    inFiles: () => files !== null,
  };
}

export function bytesOf(channels: Samples): number {
  return channels.reduce((sum, line) => sum + line.byteLength, 0);
}

/** Copies, where there is more than one: a slice is handed over to the files. */
function slicesOf(channels: Samples): Samples[] {
  const frames = channels[0].length;
  if (frames <= SLICE_FRAMES) return [channels];
  return Array.from({ length: Math.ceil(frames / SLICE_FRAMES) }, (_, n) =>
    channels.map((line) => line.slice(n * SLICE_FRAMES, (n + 1) * SLICE_FRAMES)),
  );
}

function join(pieces: readonly Samples[]): Samples {
  if (pieces.length === 1) return pieces[0];
  const frames = pieces.reduce((sum, [first]) => sum + first.length, 0);
  return pieces[0].map((_, channel) => {
    const line = new Float32Array(frames);
    let at = 0;
    for (const piece of pieces) {
      line.set(piece[channel], at);
      at += piece[channel].length;
    }
    return line;
  });
}
