import { describe, expect, test } from 'vitest';
import { writeWav } from '../../../model/chain/wav.ts';
import { readFileRate } from '../../../web/audio/fileRate.ts';

const ascii = (text: string) => [...text].map((letter) => letter.charCodeAt(0));
const padded = (...parts: number[][]) => Uint8Array.from([...parts.flat(), ...new Array(200).fill(0)]);

describe('the rate in a file’s header is found', () => {
  test.each([8000, 44100, 96000, 192000])('in WAV at %i Hz', (rate) => {
    expect(readFileRate(writeWav([new Float32Array(100)], rate, 'pcm16').bytes)).toBe(rate);
  });

  // Layouts from the formats' specifications, from memory.
  test('in FLAC: 20 bits after the block and frame sizes', () => {
    expect(readFileRate(padded(ascii('fLaC'), [0, 0, 0, 34], [16, 0, 16, 0, 0, 0, 0, 0, 0, 0], [0x0a, 0xc4, 0x42]))).toBe(44100);
    expect(readFileRate(padded(ascii('fLaC'), [0, 0, 0, 34], [16, 0, 16, 0, 0, 0, 0, 0, 0, 0], [0x17, 0x70, 0x02]))).toBe(96000);
  });

  test('in Ogg: Vorbis says its own, Opus always plays at 48 kHz', () => {
    const page = [...ascii('OggS'), ...new Array(22).fill(0), 1, 30];
    expect(readFileRate(padded(page, [1], ascii('vorbis'), [0, 0, 0, 0, 2], [0x44, 0xac, 0, 0]))).toBe(44100);
    expect(readFileRate(padded(page, ascii('OpusHead'), [1, 2, 0, 0], [0x44, 0xac, 0, 0]))).toBe(48000);
  });

  test('in MPEG audio, with and without a tag before it', () => {
    expect(readFileRate(padded([0xff, 0xfb, 0x90, 0x00]))).toBe(44100);
    expect(readFileRate(padded([0xff, 0xfb, 0x94, 0x00]))).toBe(48000);
    expect(readFileRate(padded([0xff, 0xf3, 0x90, 0x00]))).toBe(22050);
    expect(readFileRate(padded(ascii('ID3'), [4, 0, 0, 0, 0, 0, 20], new Array(20).fill(1), [0xff, 0xfb, 0x98, 0]))).toBe(32000);
  });

  test('in MP4: the sample entry', () => {
    const entry = [...ascii('mp4a'), ...new Array(24).fill(0), 0xac, 0x44, 0, 0];
    expect(readFileRate(padded([0, 0, 0, 8], ascii('ftypM4A '), [0, 0, 0, 40], entry))).toBe(44100);
  });

  test('or said to be unknown', () => {
    expect(readFileRate(new Uint8Array(10))).toBeNull();
    expect(readFileRate(new Uint8Array(1000))).toBeNull();
    expect(readFileRate(padded(ascii('RIFF'), [0, 0, 0, 0], ascii('WAVEdata'), [0, 0, 0, 0]))).toBeNull();
  });
});
