/** The list of takes, each with its record and its samples; deleted ones until they can no longer be brought back. */
import type { ReadonlySignal } from '@preact/signals';
import { signal } from '@preact/signals';
import type { Clip } from '../audio/clip.ts';
import type { Files, KeptRecord, Samples } from '../store/store.ts';
import type { Take } from './bench.ts';
import { findTakes } from './foundTakes.ts';
import type { Notes } from './notes.ts';
import { sentenceOf } from './notes.ts';
import type { Shelf } from './shelf.ts';
import { createTakeAudio } from './takeAudio.ts';
import type { TakeFormat, TakeRecord } from './takeRecord.ts';
import { newTakeFile, takeKey } from './takeRecord.ts';

/** Of one take, since it is played and saved from memory, and of all of them where they are kept in memory: 20 minutes of stereo at 48 kHz. */
export const MOST_BYTES = 480e6;
/** Deletions that can be taken back. */
const MOST_DELETED = 3;

export type About = Pick<Take, 'variant' | 'k' | 'how' | 'design'>;

/** A take that is under way. */
export interface Draft {
  append(channels: Samples): void;
  /** A way for the processor into the take's file; null where there are no files. */
  openPort(heard: (frames: number, last: boolean) => void): MessagePort | null;
  /** Says what it is about now. */
  note(about: About): void;
  /** It becomes a take of the list, or nothing where it is empty. */
  finish(about: About): void;
}

export interface TakeStore {
  readonly takes: ReadonlySignal<readonly Take[]>;
  begin(format: TakeFormat, about: About): Draft;
  /** Rejects with a sentence. */
  read(id: number): Promise<Clip>;
  edit(id: number, change: Partial<Pick<Take, 'name' | 'deleted'>>): void;
  /** Whether so many more bytes fit where takes are held in memory; deleted takes make room, the one that was deleted first before the others. */
  makeRoom(bytes: number): boolean;
  /** Takes of earlier visits come back, and this visit's go into files. */
  useFiles(files: Files, records: readonly KeptRecord[]): Promise<void>;
  /** Writes every record again. */
  keepAnew(): void;
}

export function createTakeStore(shelf: Shelf, notes: Notes): TakeStore {
  const takes = signal<readonly Take[]>([]);
  /** By file. */
  const records = new Map<string, TakeRecord>();
  let nextId = 1;

  const all = () => [...records.values()];
  const recordOf = (id: number) => all().find((record) => record.id === id);
  const list = () => {
    const finished = all().filter(({ frames }) => frames !== null);
    takes.value = finished.sort((a, b) => a.id - b.id).map(takeOf);
  };
  const keep = (record: TakeRecord) => {
    // A record without a file would only say on the next visit that there is nothing.
    if (audio.inFiles()) shelf.put(takeKey(record.file), record);
  };
  const put = (record: TakeRecord) => {
    records.set(record.file, record);
    keep(record);
  };
  const change = (file: string, to: Partial<TakeRecord>) => {
    const record = records.get(file);
    if (record !== undefined) put({ ...record, ...to });
  };
  const deleted = () =>
    all()
      .filter(({ deletedMs }) => deletedMs !== null)
      .sort((a, b) => (a.deletedMs ?? 0) - (b.deletedMs ?? 0));
  const forget = (file: string) => {
    records.delete(file);
    shelf.remove(takeKey(file));
    list();
    return audio.remove(file);
  };

  const audio = createTakeAudio({
    async makeRoom() {
      const [first] = deleted();
      if (first !== undefined) await forget(first.file);
      return first !== undefined;
    },
    refused(file, reason) {
      notes.fault(
        `The browser refuses to keep more of “${records.get(file)?.name ?? file}”: ${reason}. The rest of it is in memory until this page closes.`,
        'Save takes and delete them.',
      );
    },
    failed: (sentence) => notes.fault(sentence),
  });

  return {
    takes,
    begin(format, about) {
      const id = nextId++;
      const file = newTakeFile(format);
      let frames = 0;
      put({ ...format, ...about, id, file, name: `Take ${id}`, frames: null, deletedMs: null });
      return {
        append(channels) {
          frames += channels[0].length;
          audio.append(file, channels);
        },
        openPort: (heard) =>
          audio.openPort(file, (more, last) => {
            frames += more;
            heard(more, last);
          }),
        note: (now) => change(file, now),
        finish(now) {
          audio.end(file);
          if (frames === 0) return void forget(file);
          change(file, { ...now, frames });
          list();
        },
      };
    },
    async read(id) {
      const record = recordOf(id);
      if (record === undefined) throw new Error(`There is no take ${id}.`);
      const { name: title, file, channelCount, sampleRateHz } = record;
      try {
        return { title, sampleRateHz, channels: await audio.read(file, channelCount) };
      } catch (error) {
        throw new Error(`“${title}” cannot be read: ${sentenceOf(error)}.`);
      }
    },
    edit(id, { name, deleted: gone }) {
      const record = recordOf(id);
      if (record === undefined) return;
      const latestMs = deleted().at(-1)?.deletedMs ?? 0;
      const deletedMs = gone ? Math.max(Date.now(), latestMs + 1) : null;
      put({ ...record, ...(name === undefined ? {} : { name }), ...(gone === undefined ? {} : { deletedMs }) });
      for (const each of deleted().slice(0, -MOST_DELETED)) void forget(each.file);
      list();
    },
    makeRoom(bytes) {
      const wanted = audio.inFiles() ? 0 : bytes;
      const fits = () => audio.bytes() + wanted <= MOST_BYTES;
      for (const each of deleted()) if (!fits()) void forget(each.file);
      return fits();
    },
    async useFiles(files, kept) {
      const found = findTakes(kept, await files.list());
      const here = all();
      audio.useFiles(files);
      for (const key of found.stale) shelf.remove(key);
      records.clear();
      nextId = Math.max(0, ...[...here, ...found.takes].map(({ id }) => id)) + 1;
      for (const take of found.takes) audio.adopt(take.file);
      // Takes keep their numbers; of two with the same one, as two tabs give them, the later one gets another.
      for (const record of [...found.takes, ...here]) put(recordOf(record.id) === undefined ? record : { ...record, id: nextId++ });
      for (const file of found.empty) void files.remove(file);
      if (found.sentences.length === 1) notes.add('note', found.sentences[0]);
      if (found.sentences.length > 1) notes.add('note', 'Not all takes of the last visit are whole:', undefined, found.sentences);
      list();
    },
    keepAnew() {
      for (const record of records.values()) keep(record);
    },
  };
}

function takeOf({ id, name, variant, k, how, design, sampleRateHz, frames, deletedMs }: TakeRecord): Take {
  return { id, name, variant, k, how, design, sampleRateHz, seconds: (frames ?? 0) / sampleRateHz, deleted: deletedMs !== null };
}
