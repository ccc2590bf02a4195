/** Takes of earlier visits, from their records and files: whole, repaired, or said to be gone. */
import type { KeptRecord } from '../store/store.ts';
import type { TakeRecord } from './takeRecord.ts';
import { formatOf, framesIn, readTakeRecord, TAKE_KEY, takeKey } from './takeRecord.ts';

export interface FoundTakes {
  /** With their frames; in the order of their numbers. */
  readonly takes: readonly (TakeRecord & { readonly frames: number })[];
  /** Keys of records that stand for nothing any more. */
  readonly stale: readonly string[];
  /** Names of files that hold nothing. */
  readonly empty: readonly string[];
  readonly sentences: readonly string[];
}

export function findTakes(records: readonly KeptRecord[], files: readonly { readonly name: string; readonly bytes: number }[]): FoundTakes {
  const takes: (TakeRecord & { frames: number })[] = [];
  const stale: string[] = [];
  const sentences: string[] = [];
  const left = new Map(files.flatMap(({ name, bytes }) => (formatOf(name) === null ? [] : [[name, bytes] as const])));
  const faults = new Map<string, string>();

  for (const record of records) {
    if (!record.key.startsWith(TAKE_KEY)) continue;
    const read = 'fault' in record ? record.fault : readTakeRecord(record.value);
    if (typeof read === 'string' || takeKey(read.file) !== record.key) {
      stale.push(record.key);
      faults.set(record.key.slice(TAKE_KEY.length), typeof read === 'string' ? read : `it stands under another’s key`);
      continue;
    }
    const frames = framesIn(left.get(read.file) ?? 0, read);
    if (frames === 0) {
      stale.push(record.key);
      if (read.deletedMs === null) sentences.push(nothingOf(read));
      continue;
    }
    left.delete(read.file);
    takes.push({ ...read, frames });
    const short = shortOf(read, frames);
    if (short !== null) sentences.push(short);
  }

  let nextId = Math.max(0, ...takes.map(({ id }) => id)) + 1;
  const empty: string[] = [];
  for (const [file, bytes] of left) {
    const format = formatOf(file);
    const frames = format === null ? 0 : framesIn(bytes, format);
    if (format === null || frames === 0) {
      empty.push(file);
      continue;
    }
    const id = nextId++;
    const name = `Take ${id}`;
    const reason = faults.get(file) ?? 'there is none';
    faults.delete(file);
    sentences.push(`A take was found without a record that can be read (${reason}); it is “${name}”, ${secondsOf(frames, format)} long.`);
    takes.push({ ...format, id, name, file, frames, variant: 'unknown', k: null, how: 'heard', design: null, deletedMs: null });
  }
  for (const reason of faults.values()) sentences.push(`The record of a take cannot be read (${reason}), and its audio is not there.`);
  return { takes: takes.sort((a, b) => a.id - b.id), stale, empty, sentences };
}

function nothingOf({ name, frames }: TakeRecord): string {
  return frames === null
    ? `“${name}” had just begun when the page went away; nothing of it is left.`
    : `The audio of “${name}” is gone: the browser has removed it.`;
}

function shortOf(record: TakeRecord, frames: number): string | null {
  const left = secondsOf(frames, record);
  if (record.frames === null) return `“${record.name}” was being taken when the page went away; ${left} of it are kept.`;
  return record.frames > frames ? `Of “${record.name}” only ${left} of ${secondsOf(record.frames, record)} are kept.` : null;
}

function secondsOf(frames: number, { sampleRateHz }: { readonly sampleRateHz: number }): string {
  return `${(frames / sampleRateHz).toFixed(1)} s`;
}
