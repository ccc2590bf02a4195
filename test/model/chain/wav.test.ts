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

const DESIGN = '{"title":"Ωmega 6k8 – 10 µF 🎛"}';

test.each(FORMATS)('%s: the design inside is read back, and every byte of the audio is as it is without', (format) => {
  const samples = Float32Array.from({ length: 333 }, (_, i) => Math.sin(i) * 0.9);
  const plain = writeWav([samples], 48000, format).bytes;
  const { bytes } = writeWav([samples], 48000, format, { design: DESIGN });
  const clip = readWav(bytes);
  expect(clip.design).toBe(DESIGN);
  expect(clip.channels).toEqual(readWav(plain).channels);
  expect(bytes.subarray(8, plain.length)).toEqual(plain.subarray(8));
  expect(new DataView(bytes.buffer).getUint32(4, true)).toBe(bytes.length - 8);
  expect(bytes.length % 2).toBe(0);
  expect('design' in readWav(plain)).toBe(false);
  const text = Buffer.from(bytes.subarray(plain.length));
  expect(text.toString('latin1', 0, 4)).toBe('fetl');
  expect(text.toString('utf8', 8, 8 + text.readUInt32LE(4))).toBe(DESIGN);
});

test('a design before the audio is read too; one cut short, not UTF-8 or not Unicode is refused with a sentence', () => {
  const plain = writeWav([Float32Array.of(0.5)], 48000, 'pcm16').bytes;
  const chunk = (stated: number, ...body: number[]) => [...Buffer.from('fetl'), stated, 0, 0, 0, ...body];
  const before = Uint8Array.from([...plain.subarray(0, 36), ...chunk(3, 0xe2, 0x82, 0xac, 0), ...plain.subarray(36)]);
  expect(readWav(before)).toMatchObject({ design: '€', channels: [Float32Array.of(0.5)] });
  expect(() => readWav(Uint8Array.from([...plain, ...chunk(9, 65)]))).toThrow('states 9 bytes of design and holds 1');
  expect(() => readWav(Uint8Array.from([...plain, ...chunk(2, 0xff, 65)]))).toThrow('2 bytes that are not UTF-8');
  expect(() => writeWav([Float32Array.of(0)], 48000, 'pcm16', { design: '\ud800' })).toThrow('half of a surrogate pair');
});

/** Errors of writing and reading, in steps of 16 bits, at one value many times. */
function errorsAt(value: number, dither: 'none' | 'triangular', seed = 1): Float64Array {
  const samples = new Float32Array(40000).fill(value / 32768);
  const [read] = readWav(writeWav([samples], 48000, 'pcm16', { dither, ditherSeed: seed }).bytes).channels;
  return Float64Array.from(read, (q) => q * 32768 - value);
}

const mean = (values: Float64Array) => values.reduce((sum, value) => sum + value, 0) / values.length;

// Lipshitz, Wannamaker & Vanderkooy 1992: with triangular dither 2 steps wide the error's mean is 0 and its variance 1/4 step² for every value.
test.each([0, 0.25, 0.5, -0.125, 100.75])(
  'triangular dither at %s steps: mean error 0 and variance ¼ step², bounds of 5 sigma',
  (value) => {
    const errors = errorsAt(value, 'triangular');
    expect(Math.abs(mean(errors))).toBeLessThan((5 * 0.5) / 200);
    expect(Math.abs(mean(errors.map((e) => e * e)) - 0.25)).toBeLessThan(0.011);
    expect(new Set(errorsAt(value, 'none')).size).toBe(1);
  },
);

test('dither is the same for the same seed, another for another, apart in both channels, and refused where nothing is rounded', () => {
  expect(errorsAt(0.25, 'triangular', 7)).toEqual(errorsAt(0.25, 'triangular', 7));
  expect(errorsAt(0.25, 'triangular', 7)).not.toEqual(errorsAt(0.25, 'triangular', 8));
  const silence = new Float32Array(1000);
  const [left, right] = readWav(writeWav([silence, silence], 48000, 'pcm24', { dither: 'triangular' }).bytes).channels;
  expect(left).not.toEqual(right);
  expect(Math.max(...left.map(Math.abs)) * 8388608).toBe(1);
  expect(() => writeWav([silence], 48000, 'float32', { dither: 'triangular' })).toThrow('dither is triangular; expected none for float32');
});
