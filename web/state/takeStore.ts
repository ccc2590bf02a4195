/** The takes in memory: kept until the page closes, within a cap; deleted ones until they can no longer be brought back. */
import type { ReadonlySignal } from '@preact/signals';
import { signal } from '@preact/signals';
import type { Clip } from '../audio/clip.ts';
import { clipSeconds } from '../audio/clip.ts';
import type { Take } from './bench.ts';

/** 20 minutes of stereo at 48 kHz. */
export const MOST_BYTES = 480e6;
/** Deletions that can be taken back. */
const MOST_DELETED = 3;

export interface TakeStore {
  readonly takes: ReadonlySignal<readonly Take[]>;
  clip(id: number): Clip | null;
  keep(channels: readonly Float32Array<ArrayBuffer>[], sampleRateHz: number, about: Pick<Take, 'variant' | 'k' | 'how'>): void;
  edit(id: number, change: Partial<Pick<Take, 'name' | 'deleted'>>): void;
  /** Whether so many more bytes fit; deleted takes make room, the one that was deleted first before the others. */
  makeRoom(bytes: number): boolean;
}

export function createTakeStore(): TakeStore {
  const takes = signal<readonly Take[]>([]);
  const clips = new Map<number, Clip>();
  /** Ids, in the order of deletion. */
  let deleted: readonly number[] = [];
  let nextId = 1;

  const bytesHeld = () => [...clips.values()].reduce((sum, clip) => sum + bytesOf(clip.channels), 0);

  const forget = (id: number) => {
    clips.delete(id);
    deleted = deleted.filter((each) => each !== id);
    takes.value = takes.value.filter((take) => take.id !== id);
  };

  return {
    takes,
    clip: (id) => clips.get(id) ?? null,
    keep(channels, sampleRateHz, about) {
      const id = nextId++;
      const clip: Clip = { title: `Take ${id}`, sampleRateHz, channels };
      clips.set(id, clip);
      takes.value = [...takes.value, { id, name: clip.title, ...about, seconds: clipSeconds(clip), sampleRateHz, deleted: false }];
    },
    edit(id, change) {
      takes.value = takes.value.map((take) => (take.id === id ? { ...take, ...change } : take));
      if (change.deleted === undefined) return;
      deleted = deleted.filter((each) => each !== id);
      if (change.deleted && clips.has(id)) deleted = [...deleted, id];
      for (const each of deleted.slice(0, -MOST_DELETED)) forget(each);
    },
    makeRoom(bytes) {
      while (bytesHeld() + bytes > MOST_BYTES && deleted.length > 0) forget(deleted[0]);
      return bytesHeld() + bytes <= MOST_BYTES;
    },
  };
}

export function bytesOf(channels: readonly Float32Array[]): number {
  return channels.reduce((sum, line) => sum + line.byteLength, 0);
}
