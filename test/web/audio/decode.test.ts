import { describe, expect, test } from 'vitest';
import { writeWav } from '../../../model/chain/wav.ts';
import { decodeAudio } from '../../../web/audio/decode.ts';
import { createNoise } from '../../support/noise.ts';

const wav = (samples: Float32Array[], format: 'pcm16' | 'float32' = 'float32') => writeWav(samples, 48000, format).bytes;
const decode = (bytes: Uint8Array<ArrayBuffer>) => decodeAudio(bytes.slice().buffer, 'a.wav');

describe('sound files', () => {
  test('a float WAV comes back to the bit', async () => {
    const line = createNoise(1, 1000, 0.9);
    await expect(decode(wav([line, line]))).resolves.toEqual({ title: 'a.wav', sampleRateHz: 48000, channels: [line, line] });
  });

  test('a WAV that is cut short is refused and not mended in silence', async () => {
    const bytes = wav([createNoise(1, 1000, 0.9)]).slice(0, 600);
    await expect(decode(bytes)).rejects.toThrow(/^“a.wav” could not be read: the file states 4000 bytes of audio and holds \d+; expected/);
  });

  test('a sample that is no sound is refused, with its place', async () => {
    for (const bad of [Number.NaN, Number.POSITIVE_INFINITY, 1e30]) {
      const bytes = wav([new Float32Array(100)]);
      new DataView(bytes.buffer).setFloat32(bytes.length - 4 * 40, bad, true);
      await expect(decode(bytes)).rejects.toThrow(/^“a.wav”: frame 61 holds a sample of .*; expected at most 10000 times full scale\.$/);
    }
  });

  test('no samples, and nothing at all, are said', async () => {
    await expect(decode(wav([new Float32Array(0)], 'pcm16'))).rejects.toThrow('“a.wav” holds no samples.');
    await expect(decode(new Uint8Array(0))).rejects.toThrow('“a.wav” is empty; expected a sound file.');
  });
});
