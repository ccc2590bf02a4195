import { createHash } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { describe, expect, test } from 'vitest';
import { PHRASES } from '../../assets/phrases/phrases.ts';

interface Entry {
  name: string;
  file: string;
  channels: number;
  sampleRateHz: number;
  lengthSec: number;
  loopStartSample: number;
  loopEndSample: number;
  bars: number;
  beatsPerBar: number;
  beatsPerMinute: number;
  bytes: number;
  sha256: string;
}

const folder = fileURLToPath(new URL('../../assets/phrases/', import.meta.url));
const manifest: { licence: string; phrases: Entry[] } = JSON.parse(readFileSync(`${folder}manifest.json`, 'utf8'));

test('the manifest names every phrase that the script makes', () => {
  expect(manifest.phrases.map(({ name }) => name)).toEqual(PHRASES.map(({ name }) => name));
});

describe.each(manifest.phrases)('phrase $name', (entry) => {
  const data = readFileSync(folder + entry.file);
  const samples = new Int16Array(data.buffer.slice(data.byteOffset + 44, data.byteOffset + data.length));
  const channels = Array.from({ length: entry.channels }, (_, c) =>
    Float64Array.from({ length: samples.length / entry.channels }, (_, n) => samples[n * entry.channels + c] / 32768),
  );

  test('is the file of the manifest, 16-bit PCM at 48 kHz, and below 0.8 MB a channel', () => {
    expect(data.length).toBe(entry.bytes);
    expect(data.length).toBeLessThan(800_000 * entry.channels);
    expect(createHash('sha256').update(data).digest('hex')).toBe(entry.sha256);
    expect(data.toString('latin1', 0, 4) + data.toString('latin1', 8, 16)).toBe('RIFFWAVEfmt ');
    const format = [data.readUInt16LE(20), data.readUInt16LE(22), data.readUInt32LE(24), data.readUInt16LE(34), data.readUInt32LE(40)];
    expect(format).toEqual([1, entry.channels, 48_000, 16, data.length - 44]);
    expect(entry.sampleRateHz).toBe(48_000);
  });

  test('is a whole number of bars from its loop start to its loop end', () => {
    const barsSec = (entry.bars * entry.beatsPerBar * 60) / entry.beatsPerMinute;
    expect(entry.loopStartSample).toBe(0);
    expect(entry.loopEndSample).toBe(channels[0].length);
    expect(entry.loopEndSample / entry.sampleRateHz).toBe(barsSec);
    expect(entry.lengthSec).toBe(barsSec);
  });

  test('goes round without a click: the seam steps and bends no more than the 10 ms about it', () => {
    for (const channel of channels) {
      const about = [...channel.slice(-480), ...channel.slice(0, 480)];
      const steps = differences(about);
      expect(steps[479]).toBeLessThanOrEqual(Math.max(...steps.slice(0, 479), ...steps.slice(480)));
      const bends = differences(steps.map((_, n) => about[n + 1] - about[n]));
      expect(Math.max(bends[478], bends[479])).toBeLessThanOrEqual(Math.max(...bends.slice(0, 478), ...bends.slice(480)));
    }
  });

  test('has no DC above −70 dBFS, its peak between −3 and −0.5 dBFS, and no sample at full scale', () => {
    for (const channel of channels) {
      expect(Math.abs(channel.reduce((sum, value) => sum + value, 0) / channel.length)).toBeLessThan(10 ** (-70 / 20));
    }
    const peakDb =
      20 * Math.log10(Math.max(...channels.map((channel) => channel.reduce((most, value) => Math.max(most, Math.abs(value)), 0))));
    expect(peakDb).toBeGreaterThan(-3);
    expect(peakDb).toBeLessThan(-0.5);
  });

  test('is as loud as unsqueezed music: −24 to −14 LUFS, and its loudness moves by more than 8 dB', () => {
    const blocks = blockLoudness(channels);
    const mean = integrated(blocks);
    expect(mean).toBeGreaterThan(-24);
    expect(mean).toBeLessThan(-14);
    expect(Math.max(...blocks) - Math.min(...blocks)).toBeGreaterThan(8);
  });

  // One step: the sine of another engine may differ in its last bit, and the rounding to 16 bits then by one.
  test('is what the script makes, to one step of 16 bits', () => {
    const made = (PHRASES.find(({ name }) => name === entry.name) as (typeof PHRASES)[number]).render();
    expect(made.length).toBe(samples.length);
    expect(made.reduce((most, value, n) => Math.max(most, Math.abs(value - samples[n])), 0)).toBeLessThanOrEqual(1);
  });
});

test('the loudness used here reads 997 Hz at full scale in one channel as −3.01 LUFS (ITU-R BS.1770-4)', () => {
  const tone = Float64Array.from({ length: 96_000 }, (_, n) => Math.sin((2 * Math.PI * 997 * n) / 48_000));
  expect(integrated(blockLoudness([tone]))).toBeCloseTo(-3.01, 1);
});

function differences(values: number[]): number[] {
  return values.slice(1).map((value, n) => Math.abs(value - values[n]));
}

/** Loudness of 400 ms blocks that overlap by 75 %, of a loop. Source: ITU-R BS.1770-4, coefficients for 48 kHz. */
function blockLoudness(channels: Float64Array[]): number[] {
  const weighted = channels.map((channel) => {
    const shelf = biquad(channel, [1.53512485958697, -2.69169618940638, 1.19839281085285], [-1.69065929318241, 0.73248077421585]);
    return biquad(shelf, [1, -2, 1], [-1.99004745483398, 0.99007225036621]);
  });
  const starts = Array.from({ length: Math.floor((channels[0].length - 19_200) / 4800) + 1 }, (_, index) => index * 4800);
  return starts.map((start) => {
    const power = weighted.reduce(
      (sum, channel) => sum + channel.subarray(start, start + 19_200).reduce((s, value) => s + value * value, 0),
      0,
    );
    return -0.691 + 10 * Math.log10(power / 19_200);
  });
}

/** Gated at −70 LUFS and 10 LU below the mean. Source: ITU-R BS.1770-4. */
function integrated(blocks: number[]): number {
  const mean = (chosen: number[]) => 10 * Math.log10(chosen.reduce((sum, lufs) => sum + 10 ** (lufs / 10), 0) / chosen.length);
  const heard = blocks.filter((lufs) => lufs > -70);
  return mean(heard.filter((lufs) => lufs > mean(heard) - 10));
}

function biquad(signal: Float64Array, [b0, b1, b2]: number[], [a1, a2]: number[]): Float64Array {
  let s1 = 0;
  let s2 = 0;
  return signal.map((x) => {
    const y = b0 * x + s1;
    s1 = b1 * x - a1 * y + s2;
    s2 = b2 * x - a2 * y;
    return y;
  });
}
