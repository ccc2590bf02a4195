/** Visits of the page in one browser, for tests with fake timers. */
import { vi } from 'vitest';
import type { Bench } from '../../../web/state/bench.ts';
import { assembleBench } from '../../../web/state/createBench.ts';
import type { Chunk } from '../../../worklet/protocol.ts';
import { createFakeParts, type FakeParts } from '../state/fakeParts.ts';
import type { FakeStore } from './fakeStore.ts';

export interface Visit {
  readonly bench: Bench;
  readonly parts: FakeParts;
}

/** A page that is opened, and has brought back what is kept. */
export async function visit(store: FakeStore): Promise<Visit> {
  const parts = createFakeParts(store);
  const bench = assembleBench(parts);
  await bench.restored;
  await vi.advanceTimersByTimeAsync(0);
  return { bench, parts };
}

export function sentencesOf({ bench }: Visit): string[] {
  return bench.notes.value.map(({ sentence }) => sentence);
}

/** What the processor sends of a take. */
export function chunk(channels: Float32Array<ArrayBuffer>[], last: boolean): Chunk {
  return { type: 'chunk', slot: 0, frame: 0, frames: channels[0].length, channels, last };
}
