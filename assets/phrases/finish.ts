import { filterLoop, highpass, SAMPLE_RATE_HZ } from './loop.ts';
import { createRandom } from './random.ts';

/** Peak of every file, in dB below full scale, before dither. */
const PEAK_DB = -1;

/** The loop as 16-bit samples: no DC, peak at −1 dBFS, dithered with noise of triangular density, 2 LSB wide. Channels interleaved. */
export function finish(channels: Float64Array[], seed: number): Int16Array {
  const clean = channels.map((channel) => withoutDc(filterLoop(channel, highpass(24, 0.7))));
  const peak = Math.max(...clean.map((channel) => channel.reduce((most, value) => Math.max(most, Math.abs(value)), 0)));
  const gain = (32768 * 10 ** (PEAK_DB / 20)) / peak;
  const random = createRandom(seed);
  const samples = new Int16Array(clean[0].length * clean.length);
  for (let n = 0; n < samples.length; n++) {
    const value = clean[n % clean.length][Math.floor(n / clean.length)];
    samples[n] = Math.round(gain * value + random.fraction() - random.fraction());
  }
  return samples;
}

function withoutDc(channel: Float64Array): Float64Array {
  const mean = channel.reduce((sum, value) => sum + value, 0) / channel.length;
  return channel.map((value) => value - mean);
}

/** A WAV file of 16-bit samples. Source: Microsoft and IBM, «Multimedia Programming Interface and Data Specifications 1.0», 1991; from memory. */
export function encodeWav(samples: Int16Array, channels: number): Buffer {
  const header = Buffer.alloc(44);
  header.write('RIFF', 0);
  header.writeUInt32LE(36 + samples.length * 2, 4);
  header.write('WAVEfmt ', 8);
  header.writeUInt32LE(16, 16);
  header.writeUInt16LE(1, 20);
  header.writeUInt16LE(channels, 22);
  header.writeUInt32LE(SAMPLE_RATE_HZ, 24);
  header.writeUInt32LE(SAMPLE_RATE_HZ * channels * 2, 28);
  header.writeUInt16LE(channels * 2, 32);
  header.writeUInt16LE(16, 34);
  header.write('data', 36);
  header.writeUInt32LE(samples.length * 2, 40);
  const body = Buffer.alloc(samples.length * 2);
  for (let n = 0; n < samples.length; n++) body.writeInt16LE(samples[n], n * 2);
  return Buffer.concat([header, body]);
}
