import { describe, expect, test } from 'vitest';
import type { Chunk } from '../../worklet/protocol.ts';
import { CHUNK_FRAMES, createRecorder, endRecording, processRecorder, returnChunk, startRecording } from '../../worklet/recorder.ts';
import { createNoise } from '../support/noise.ts';

type Sent = Chunk | { type: 'lost'; frames: number };

/** A port that behaves as the real one: what is transferred is gone from the sender. `read` sees a copy of each message. */
function portFor(read: (message: Sent) => void) {
  return { postMessage: (message: unknown, transfer: Transferable[]) => read(structuredClone(message, { transfer }) as Sent) };
}

describe('the recorder', () => {
  test('gives back the very samples, without a gap, over many chunks', () => {
    const input = [createNoise(1, 128 * 700, 1), createNoise(2, 128 * 700, 1)];
    const heard = input.map(() => [] as number[]);
    let nextFrame = 128 * 10;
    let lasts = 0;
    const recorder = createRecorder(
      portFor((message) => {
        if (message.type !== 'chunk') throw new Error('frames were lost');
        expect(message.frame).toBe(nextFrame);
        nextFrame += message.frames;
        message.channels.forEach((line, c) => {
          heard[c].push(...line.subarray(0, message.frames));
        });
        if (message.last) lasts++;
        returnChunk(recorder, message.slot, message.channels);
      }),
      2,
      48000,
    );
    for (let block = 0; block < 700; block++) {
      if (block === 10) startRecording(recorder);
      if (block === 600) endRecording(recorder);
      processRecorder(
        recorder,
        block * 128,
        input.map((line) => line.subarray(block * 128, block * 128 + 128)),
      );
    }
    expect(lasts).toBe(1);
    heard.forEach((samples, c) => {
      expect(Float32Array.from(samples)).toEqual(input[c].slice(128 * 10, 128 * 600));
    });
  });

  test('tells how many frames are missing when the page does not return chunks', () => {
    const sent: Sent[] = [];
    const recorder = createRecorder(
      portFor((message) => sent.push(message)),
      1,
      48000,
    );
    startRecording(recorder);
    const line = new Float32Array(CHUNK_FRAMES);
    for (let n = 0; n < 20; n++) processRecorder(recorder, n * CHUNK_FRAMES, [line]);
    endRecording(recorder);
    expect(sent.filter((message) => message.type === 'chunk' && message.frames === CHUNK_FRAMES)).toHaveLength(16);
    expect(sent.find((message) => message.type === 'lost')).toEqual({ type: 'lost', frames: 4 * CHUNK_FRAMES });
    expect(sent.at(-1)).toMatchObject({ type: 'chunk', last: true });
  });

  test('refuses a chunk that is not its own', () => {
    const recorder = createRecorder(
      portFor(() => {}),
      2,
      48000,
    );
    expect(() => returnChunk(recorder, 99, [])).toThrow('Chunk 99 came back with 0 channels');
    expect(() => returnChunk(recorder, 0, [new Float32Array(1)])).toThrow('Chunk 0 came back with 1 channels');
  });
});
