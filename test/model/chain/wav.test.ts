import { expect, test } from 'vitest';
import { readWav, type WavFormat, writeWav } from '../../../model/chain/wav.ts';

const FORMATS: [WavFormat, number][] = [
  ['pcm16', 32768],
  ['pcm24', 8388608],
  ['pcm32', 2147483648],
  ['float32', 0],
];

test.each(FORMATS)('%s: what is written is read back to the bit, mono and stereo, at any rate', (format, full) => {
  const samples = Float32Array.from({ length: 999 }, (_, i) => Math.sin(i) * 0.9);
  const grid = full === 0 ? samples : samples.map((v) => Math.round(v * full) / full + 0);
  for (const channels of [[grid], [grid, grid.map((v) => (v === 0 ? 0 : -v))]]) {
    const { bytes, cut } = writeWav(channels, 44100, format);
    const clip = readWav(bytes);
    expect(cut).toBe(0);
    expect(clip.sampleRateHz).toBe(44100);
    expect(clip.channels).toEqual(channels);
    expect(clip.float).toBe(format === 'float32');
  }
});

test('a file written out by hand: 16-bit, one channel, samples −32768, 0, 16384', () => {
  const text = (s: string) => [...s].map((c) => c.charCodeAt(0));
  const bytes = Uint8Array.from([
    ...text('RIFF'),
    42,
    0,
    0,
    0,
    ...text('WAVE'),
    ...text('fmt '),
    16,
    0,
    0,
    0,
    1,
    0,
    1,
    0,
    0x80,
    0xbb,
    0,
    0,
    0,
    0x77,
    1,
    0,
    2,
    0,
    16,
    0,
    ...text('data'),
    6,
    0,
    0,
    0,
    0x00,
    0x80,
    0x00,
    0x00,
    0x00,
    0x40,
  ]);
  const clip = readWav(bytes);
  expect(clip.sampleRateHz).toBe(48000);
  expect(Array.from(clip.channels[0])).toEqual([-1, 0, 0.5]);
});

test('samples beyond full scale are cut and counted', () => {
  expect(writeWav([Float32Array.of(1, -1, 2, 0.5)], 48000, 'pcm16').cut).toBe(2);
});

test.each([
  ['nothing of a WAV file', Uint8Array.of(1, 2, 3), 'does not begin as a WAV file'],
  ['an empty file', new Uint8Array(0), 'does not begin as a WAV file'],
])('%s is refused with a sentence', (_, bytes, sentence) => {
  expect(() => readWav(bytes)).toThrow(sentence);
});

test('a file that lies about its length, has strange coding or too many channels is refused with a sentence', () => {
  const good = () => writeWav([new Float32Array(100)], 48000, 'pcm16').bytes;
  const changed = (at: number, value: number) => {
    const bytes = good();
    bytes[at] = value;
    return bytes;
  };
  expect(() => readWav(changed(41, 2))).toThrow('states 712 bytes of audio and holds 200');
  expect(() => readWav(changed(20, 85))).toThrow('coded as 85');
  expect(() => readWav(changed(22, 8))).toThrow('has 8 channels; expected 1 or 2');
  expect(() => readWav(good().subarray(0, 36))).toThrow('no data chunk');
  expect(() => writeWav([Float32Array.of(Number.NaN)], 48000, 'pcm16')).toThrow('not a number');
});
