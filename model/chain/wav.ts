/**
 * WAV files of plain PCM and float, read and written to the bit, with the design that made them inside.
 *
 * Law      a PCM sample q of b bits stands for q/2^(b−1); writing takes the nearest q, halves upwards, and refuses nothing but a value that is
 *          not a number: what lies beyond full scale is cut to it and counted. Triangular dither adds noise of that density, 2 steps wide, to the
 *          value before: the error's mean and power then no longer depend on the signal. The design stands in a chunk `fetl` after the audio,
 *          UTF-8, which other readers pass over
 * Valid    16, 24 and 32-bit PCM and 32-bit float, 1 or 2 channels, any rate, in RIFF files with a fmt chunk before the data
 * Source   Multimedia Programming Interface and Data Specifications 1.0 (1991); WAVE_FORMAT_EXTENSIBLE (from memory); dither: Lipshitz,
 *          Wannamaker & Vanderkooy, J. Audio Eng. Soc. 40 (1992) 355 (from memory)
 */
import { createGaussian, type GaussianSource, nextTriangular } from '../device/random.ts';

export type WavFormat = 'pcm16' | 'pcm24' | 'pcm32' | 'float32';

export interface WavClip {
  readonly sampleRateHz: number;
  readonly channels: Float32Array[];
  readonly bits: 16 | 24 | 32;
  readonly float: boolean;
  /** Text of the design inside; absent where there is none. */
  readonly design?: string;
}

export type Dither = 'none' | 'triangular';

export interface WavOptions {
  /** 'none' when left out. */
  readonly dither?: Dither;
  /** Of the dither, a whole number; 1 when left out. */
  readonly ditherSeed?: number;
  /** Text of the design to put inside. */
  readonly design?: string;
}

/** The file may be in order, but its audio is coded as this reader does not know it. */
export class UnknownCodingError extends RangeError {}

interface Layout {
  readonly sampleRateHz: number;
  readonly channelCount: number;
  readonly bits: 16 | 24 | 32;
  readonly float: boolean;
}

const RIFF = 0x46464952;
const WAVE = 0x45564157;
const FMT = 0x20746d66;
const DATA = 0x61746164;
const FETL = 0x6c746566;
/** Four bytes for each character that a design may have. */
const MOST_DESIGN_BYTES = 20_000_000;
const EXTENSIBLE = 0xfffe;
const PCM = 1;
const FLOAT = 3;

/** Reads a whole file. Throws a RangeError that says what was found and what was expected. 32-bit PCM is rounded to the nearest float. */
export function readWav(bytes: Uint8Array): WavClip {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  if (bytes.length < 12 || view.getUint32(0, true) !== RIFF || view.getUint32(8, true) !== WAVE) {
    throw new RangeError('the file does not begin as a WAV file; expected RIFF and WAVE in its first 12 bytes');
  }
  let layout: Layout | null = null;
  let channels: Float32Array[] | null = null;
  let design: string | null = null;
  for (let at = 12; at + 8 <= bytes.length; ) {
    const id = view.getUint32(at, true);
    const size = view.getUint32(at + 4, true);
    if (id === FMT) layout ??= readLayout(view, at + 8, size);
    if (id === DATA && !channels) {
      if (!layout) throw new RangeError('the file has its data before its format; expected a fmt chunk first');
      channels = readSamples(view, at + 8, wholeSize(bytes.length, at + 8, size, 'audio'), layout);
    }
    if (id === FETL) design ??= readText(bytes.subarray(at + 8, at + 8 + wholeSize(bytes.length, at + 8, size, 'design')));
    at += 8 + size + (size % 2);
  }
  if (!layout || !channels) throw new RangeError(`the file has no ${layout ? 'data' : 'fmt'} chunk; expected one`);
  return { ...describe(layout), channels, ...(design === null ? {} : { design }) };
}

function describe({ sampleRateHz, bits, float }: Layout): Omit<WavClip, 'channels'> {
  return { sampleRateHz, bits, float };
}

function wholeSize(fileBytes: number, at: number, stated: number, what: string): number {
  if (at + stated > fileBytes) {
    throw new RangeError(`the file states ${stated} bytes of ${what} and holds ${fileBytes - at}; expected all of them: it was cut short`);
  }
  return stated;
}

function readLayout(view: DataView, at: number, size: number): Layout {
  if (size < 16 || at + size > view.byteLength)
    throw new RangeError(`the fmt chunk is ${size} bytes; expected at least 16, inside the file`);
  const code = view.getUint16(at, true);
  const kind = code === EXTENSIBLE && size >= 26 ? view.getUint16(at + 24, true) : code;
  const channelCount = view.getUint16(at + 2, true);
  const sampleRateHz = view.getUint32(at + 4, true);
  const bits = view.getUint16(at + 14, true);
  const plain = kind === PCM && (bits === 16 || bits === 24 || bits === 32);
  if (!plain && !(kind === FLOAT && bits === 32)) {
    throw new UnknownCodingError(`the audio is coded as ${kind} with ${bits} bits; expected PCM of 16, 24 or 32 bits, or 32-bit float`);
  }
  if (channelCount !== 1 && channelCount !== 2) throw new RangeError(`the file has ${channelCount} channels; expected 1 or 2`);
  if (sampleRateHz === 0) throw new RangeError('the sample rate is 0 Hz; expected a positive rate');
  return { sampleRateHz, channelCount, bits: bits as 16 | 24 | 32, float: kind === FLOAT };
}

function readSamples(view: DataView, at: number, size: number, layout: Layout): Float32Array[] {
  const { channelCount, bits, float } = layout;
  const width = bits / 8;
  const frames = Math.floor(size / (width * channelCount));
  const channels = Array.from({ length: channelCount }, () => new Float32Array(frames));
  for (let channel = 0; channel < channelCount; channel++) {
    const samples = channels[channel];
    for (let frame = 0; frame < frames; frame++) {
      const p = at + (frame * channelCount + channel) * width;
      if (float) samples[frame] = view.getFloat32(p, true);
      else if (width === 2) samples[frame] = view.getInt16(p, true) / 32768;
      else if (width === 3) samples[frame] = (view.getInt16(p + 1, true) * 256 + view.getUint8(p)) / 8388608;
      else samples[frame] = view.getInt32(p, true) / 2147483648;
    }
  }
  return channels;
}

/**
 * Writes channels of equal length. `cut` counts samples beyond full scale. Throws a RangeError when a sample is not a number, the text of the design
 * is not Unicode, or dither is asked for in float samples, which are not rounded.
 */
export function writeWav(
  channels: readonly Float32Array[],
  sampleRateHz: number,
  format: WavFormat,
  options: WavOptions = {},
): { bytes: Uint8Array<ArrayBuffer>; cut: number } {
  const { dither = 'none', ditherSeed = 1, design } = options;
  const float = format === 'float32';
  if (float && dither !== 'none') throw new RangeError(`dither is ${dither}; expected none for float32, whose samples are not rounded`);
  const width = format === 'pcm16' ? 2 : format === 'pcm24' ? 3 : 4;
  const frames = channels[0].length;
  const dataSize = frames * channels.length * width;
  const designAt = 44 + dataSize + (dataSize % 2);
  const designBytes = design === undefined ? null : utf8Of(design);
  const designSize = designBytes ? 8 + designBytes.length + (designBytes.length % 2) : 0;
  const bytes = new Uint8Array(designAt + designSize);
  const view = new DataView(bytes.buffer);
  view.setUint32(0, RIFF, true);
  view.setUint32(4, bytes.length - 8, true);
  view.setUint32(8, WAVE, true);
  view.setUint32(12, FMT, true);
  view.setUint32(16, 16, true);
  view.setUint16(20, float ? FLOAT : PCM, true);
  view.setUint16(22, channels.length, true);
  view.setUint32(24, sampleRateHz, true);
  view.setUint32(28, sampleRateHz * channels.length * width, true);
  view.setUint16(32, channels.length * width, true);
  view.setUint16(34, width * 8, true);
  view.setUint32(36, DATA, true);
  view.setUint32(40, dataSize, true);
  if (designBytes) {
    view.setUint32(designAt, FETL, true);
    view.setUint32(designAt + 4, designBytes.length, true);
    bytes.set(designBytes, designAt + 8);
  }
  const noise = dither === 'triangular' ? createGaussian(ditherSeed) : null;
  let cut = 0;
  channels.forEach((samples, channel) => {
    for (let frame = 0; frame < frames; frame++) {
      const at = 44 + (frame * channels.length + channel) * width;
      cut += writeSample(view, at, samples[frame], format, noise);
    }
  });
  return { bytes, cut };
}

function writeSample(view: DataView, at: number, sample: number, format: WavFormat, noise: GaussianSource | null): number {
  if (Number.isNaN(sample)) throw new RangeError('a sample is not a number; expected finite samples');
  if (format === 'float32') {
    view.setFloat32(at, sample, true);
    return 0;
  }
  const full = format === 'pcm16' ? 32768 : format === 'pcm24' ? 8388608 : 2147483648;
  const value = noise ? sample * full + nextTriangular(noise) : sample * full;
  const nearest = Math.floor(value + 0.5);
  const q = Math.min(full - 1, Math.max(-full, nearest));
  if (format === 'pcm16') view.setInt16(at, q, true);
  else if (format === 'pcm32') view.setInt32(at, q, true);
  else {
    view.setUint8(at, q & 0xff);
    view.setInt16(at + 1, q >> 8, true);
  }
  return q === nearest ? 0 : 1;
}

/** By the language's own percent coding, since a worklet has no text coder. */
function utf8Of(text: string): Uint8Array {
  const coded = percentCoded(text);
  const bytes: number[] = [];
  for (let i = 0; i < coded.length; i++) {
    const escaped = coded[i] === '%';
    bytes.push(escaped ? Number.parseInt(coded.slice(i + 1, i + 3), 16) : coded.charCodeAt(i));
    if (escaped) i += 2;
  }
  return Uint8Array.from(bytes);
}

function percentCoded(text: string): string {
  try {
    return encodeURIComponent(text);
  } catch {
    throw new RangeError('the text of the design holds half of a surrogate pair; expected Unicode');
  }
}

function readText(bytes: Uint8Array): string {
  if (bytes.length > MOST_DESIGN_BYTES) {
    throw new RangeError(`the design inside the file is ${bytes.length} bytes long; expected at most ${MOST_DESIGN_BYTES}`);
  }
  const coded = Array.from(bytes, (byte) => `%${byte.toString(16).padStart(2, '0')}`).join('');
  try {
    return decodeURIComponent(coded);
  } catch {
    throw new RangeError(`the design inside the file is ${bytes.length} bytes that are not UTF-8; expected text`);
  }
}
