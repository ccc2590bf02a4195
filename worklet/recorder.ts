/**
 * Records what is chosen to be heard: chunks of 8192 frames, or 0.2 s where that is less, with their frame numbers, from a pool, without a gap.
 * The pool lasts 2.7 s at 48 kHz; should the page be silent for longer, the frames that found no chunk are counted and told.
 */
import type { Post } from './meter.ts';
import type { Chunk } from './protocol.ts';

export const CHUNK_FRAMES = 8192;
/** Where that many last longer than this, fewer make a chunk: what is in one is lost when the page is killed. */
const LONGEST_SEC = 0.2;
const POOL = 16;

export interface Recorder {
  readonly post: Post;
  readonly chunks: Chunk[];
  readonly transfers: Transferable[][];
  readonly free: boolean[];
  on: boolean;
  slot: number;
  lostFrames: number;
  /** Where chunks go. */
  to: Post;
}

export function createRecorder(post: Post, channels: number, sampleRateHz: number): Recorder {
  const chunkFrames = Math.min(CHUNK_FRAMES, Math.ceil(LONGEST_SEC * sampleRateHz));
  const chunks = Array.from({ length: POOL }, (_, slot): Chunk => {
    const lines = Array.from({ length: channels }, () => new Float32Array(chunkFrames));
    return { type: 'chunk', slot, frame: 0, frames: 0, channels: lines, last: false };
  });
  const transfers = chunks.map((chunk): Transferable[] => chunk.channels.map((line) => line.buffer));
  return { post, chunks, transfers, free: chunks.map(() => true), on: false, slot: -1, lostFrames: 0, to: post };
}

export function startRecording(recorder: Recorder, to: Post = recorder.post): void {
  recorder.to = to;
  recorder.on = true;
  recorder.lostFrames = 0;
}

/** Sends what is there, marked as the last, and tells of frames that were lost. Runs in a message, not in `process`. */
export function endRecording(recorder: Recorder): void {
  if (!recorder.on) return;
  recorder.on = false;
  if (recorder.lostFrames > 0) recorder.post.postMessage({ type: 'lost', frames: recorder.lostFrames }, []);
  if (recorder.slot >= 0) send(recorder, true);
  else recorder.to.postMessage({ type: 'chunk', slot: -1, frame: 0, frames: 0, channels: [], last: true } satisfies Chunk, []);
}

export function processRecorder(recorder: Recorder, frame: number, outputs: readonly Float32Array[]): void {
  if (!recorder.on) return;
  for (let n = 0; n < outputs[0].length; n++) {
    if (recorder.slot < 0 && !takeSlot(recorder, frame + n)) {
      recorder.lostFrames += outputs[0].length - n;
      return;
    }
    const chunk = recorder.chunks[recorder.slot];
    for (let c = 0; c < outputs.length; c++) chunk.channels[c][chunk.frames] = outputs[c][n];
    chunk.frames++;
    if (chunk.frames === chunk.channels[0].length) send(recorder, false);
  }
}

/** Puts a chunk's arrays back into the pool. */
export function returnChunk(recorder: Recorder, slot: number, channels: Float32Array<ArrayBuffer>[]): void {
  const chunk = recorder.chunks[slot];
  if (chunk === undefined || channels.length !== recorder.transfers[slot].length) {
    throw new RangeError(`Chunk ${slot} came back with ${channels.length} channels; expected one of ${POOL} as it was sent`);
  }
  chunk.channels = channels;
  for (let c = 0; c < channels.length; c++) recorder.transfers[slot][c] = channels[c].buffer;
  recorder.free[slot] = true;
}

function takeSlot(recorder: Recorder, frame: number): boolean {
  recorder.slot = recorder.free.indexOf(true);
  if (recorder.slot < 0) return false;
  recorder.free[recorder.slot] = false;
  const chunk = recorder.chunks[recorder.slot];
  chunk.frame = frame;
  chunk.frames = 0;
  return true;
}

function send(recorder: Recorder, last: boolean): void {
  const chunk = recorder.chunks[recorder.slot];
  chunk.last = last;
  recorder.to.postMessage(chunk, recorder.transfers[recorder.slot]);
  recorder.slot = -1;
}
