/**
 * Files that anybody may have made: WAV files and designs, broken in ways that are seeded, each at least once in a hundred. Every one has a valid file
 * behind it, so that what is wrong is one thing or a few. Runs in Node and in a page.
 */
import { writeWav } from '../../model/chain/wav.ts';
import { Dice } from '../fuzz/dice.ts';

export interface Malformed {
  readonly name: string;
  readonly kind: 'audio' | 'design';
  readonly bytes: Uint8Array<ArrayBuffer>;
}

type Break = (bytes: Uint8Array<ArrayBuffer>, dice: Dice) => Uint8Array<ArrayBuffer>;

/** `design` is the text of a valid design. */
export function malformedFile(seed: number, design: string): Malformed {
  const dice = new Dice(seed);
  if (seed % 3 === 0) {
    const [how, text] = brokenDesign(design, dice);
    return { name: `${seed} ${how}.json`, kind: 'design', bytes: new TextEncoder().encode(text) };
  }
  const names = Object.keys(WAV_BREAKS);
  const how = names[Math.floor(seed / 3) % names.length];
  let bytes = WAV_BREAKS[how](validWav(dice), dice);
  // Every fourth has a second fault.
  if (dice.whole(0, 3) === 0) bytes = WAV_BREAKS[dice.pick(names)](bytes, dice);
  return { name: `${seed} ${how}.wav`, kind: 'audio', bytes };
}

function validWav(dice: Dice): Uint8Array<ArrayBuffer> {
  const channels = 1 + dice.whole(0, 1);
  const frames = 1 + dice.whole(0, 399);
  const lines = Array.from({ length: channels }, () => Float32Array.from({ length: frames }, () => dice.next() - 0.5));
  const rateHz = dice.pick([8000, 44100, 48000, 96000, 384000]);
  return writeWav(lines, rateHz, dice.pick(['pcm16', 'pcm24', 'float32'] as const)).bytes;
}

const viewOf = (bytes: Uint8Array) => new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
const changed =
  (change: (view: DataView, dice: Dice, bytes: Uint8Array<ArrayBuffer>) => void): Break =>
  (bytes, dice) => {
    const copy = bytes.slice();
    if (copy.length >= 44) change(viewOf(copy), dice, copy);
    return copy;
  };
const tag = (bytes: Uint8Array, at: number, text: string) => bytes.set(new TextEncoder().encode(text), at);
const joined = (...parts: Uint8Array[]): Uint8Array<ArrayBuffer> => {
  const whole = new Uint8Array(parts.reduce((sum, { length }) => sum + length, 0));
  let at = 0;
  for (const part of parts) {
    whole.set(part, at);
    at += part.length;
  }
  return whole;
};
/** A size that no honest writer states. */
const wrongSize = (dice: Dice) => dice.pick([0, 1, 7, 0x7fffffff, 0x80000000, 0xfffffffe, 0xffffffff, dice.whole(0, 4999)]);

/** Offsets of a plain file: 4 size, 16 size of fmt, 20 code, 22 channels, 24 rate, 28 bytes a second, 32 block, 34 bits, 36 data, 40 its size. */
const WAV_BREAKS: Readonly<Record<string, Break>> = {
  'cut short': (bytes, dice) => bytes.slice(0, dice.whole(0, bytes.length - 1)),
  'lies about its size': changed((view, dice) => view.setUint32(4, wrongSize(dice), true)),
  'lies about its data': changed((view, dice) => view.setUint32(40, wrongSize(dice), true)),
  'lies about its format': changed((view, dice) => view.setUint32(16, wrongSize(dice), true)),
  'data before format': (bytes) => joined(bytes.slice(0, 12), bytes.slice(36), bytes.slice(12, 36)),
  'no format': (bytes) => joined(bytes.slice(0, 12), bytes.slice(36)),
  'no data': (bytes) => bytes.slice(0, 36),
  'no frames': (bytes, dice) => changed((view) => view.setUint32(40, 0, true))(bytes.slice(0, 44), dice),
  RF64: changed((_, __, bytes) => tag(bytes, 0, 'RF64')),
  'RF64 of unknown size': changed((view, _, bytes) => {
    tag(bytes, 0, 'RF64');
    view.setUint32(4, 0xffffffff, true);
    view.setUint32(40, 0xffffffff, true);
  }),
  RIFX: changed((_, __, bytes) => tag(bytes, 0, 'RIFX')),
  'another form': changed((_, dice, bytes) => tag(bytes, 8, dice.pick(['AVI ', 'WEBP', 'RMID', '\0\0\0\0']))),
  'many channels': changed((view, dice) => view.setUint16(22, dice.pick([0, 3, 6, 8, 255, 65535]), true)),
  'a rate of its own': changed((view, dice) => view.setUint32(24, dice.pick([0, 1, 7999, 384001, 0x7fffffff, 0xffffffff]), true)),
  'bits of its own': changed((view, dice) => view.setUint16(34, dice.pick([0, 1, 7, 8, 12, 20, 33, 64, 65535]), true)),
  'a coding of its own': changed((view, dice) => view.setUint16(20, dice.pick([0, 2, 6, 7, 0x11, 0x55, 0xfffe, 0xffff]), true)),
  'block of its own': changed((view, dice) => view.setUint16(32, dice.whole(0, 65535), true)),
  'samples that are no numbers': changed((view, dice, bytes) => {
    view.setUint16(20, 3, true);
    view.setUint16(34, 32, true);
    view.setUint16(32, 4 * view.getUint16(22, true), true);
    const strange = [Number.NaN, Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY, 3.4e38, -1e20];
    for (let at = 44; at + 4 <= bytes.length; at += 4) view.setFloat32(at, dice.pick(strange), true);
  }),
  'noise after its head': changed((_, dice, bytes) => {
    for (let at = 12; at < bytes.length; at++) bytes[at] = dice.whole(0, 255);
  }),
  'bits turned': changed((_, dice, bytes) => {
    for (let n = 0; n <= dice.whole(0, 7); n++) bytes[dice.whole(0, bytes.length - 1)] ^= 1 << dice.whole(0, 7);
  }),
  'bits of its head turned': changed((_, dice, bytes) => {
    for (let n = 0; n <= dice.whole(0, 7); n++) bytes[dice.whole(0, 43)] ^= 1 << dice.whole(0, 7);
  }),
  'chunks without end': (bytes, dice) =>
    joined(bytes.slice(0, 12), ...Array.from({ length: 500 }, () => chunkOf('junk', dice.whole(0, 2))), bytes.slice(12)),
  'a design inside that is no text': (bytes, dice) =>
    joined(
      bytes,
      chunkOf('fetl', 40).map((byte, n) => (n < 8 ? byte : 128 + dice.whole(0, 127))),
    ),
  'all noise': (bytes, dice) => bytes.map(() => dice.whole(0, 255)),
  'another file’s beginning': (bytes, dice) => {
    const heads = ['fLaC', 'OggS', 'ID3\u0004', '\0\0\0\u0020ftypM4A ', '\u007fELF', '%PDF-1.7', '<html>', 'FORM', '{"fettle":1}', ''];
    return joined(new TextEncoder().encode(dice.pick(heads)), bytes.slice(dice.whole(0, 19)));
  },
  'MPEG’s beginning': (bytes, dice) => joined(Uint8Array.of(0xff, 0xfb, 0x90, 0x64), bytes.slice(dice.whole(0, 43))),
};

function chunkOf(name: string, size: number): Uint8Array<ArrayBuffer> {
  const chunk = new Uint8Array(8 + size + (size % 2));
  tag(chunk, 0, name);
  viewOf(chunk).setUint32(4, size, true);
  return chunk;
}

/** How the design was broken, and its text. */
function brokenDesign(design: string, dice: Dice): readonly [string, string] {
  const at = dice.whole(0, design.length - 1);
  const within = (text: string) => design.slice(0, at) + text + design.slice(at);
  const number = /-?\d+(\.\d+)?(e[+-]?\d+)?/gi;
  const numbers = [...design.matchAll(number)];
  const { index, 0: text } = dice.pick(numbers);
  const instead = (value: string) => design.slice(0, index) + value + design.slice(index + text.length);
  const field = (name: string, value: string) => design.replace('{', `{ ${JSON.stringify(name)}: ${value},`);
  const breaks: readonly (readonly [string, () => string])[] = [
    ['cut short', () => design.slice(0, at)],
    ['with a field called __proto__', () => field('__proto__', '{ "polluted": true }')],
    ['with a field called constructor', () => field('constructor', '{ "prototype": { "polluted": true } }')],
    ['with a field twice', () => field('title', '"twice"')],
    ['too deep', () => field('deep', '['.repeat(100_000) + ']'.repeat(100_000))],
    ['deep and open', () => '{"a":'.repeat(100_000)],
    ['too large', () => field('large', JSON.stringify('x'.repeat(5_100_000)))],
    [
      'with a number of its own',
      () => instead(dice.pick(['1e999', '-1e999', '0', '-1', 'NaN', 'Infinity', '01', '1.', '"5"', 'null', '[]', '1e-320'])),
    ],
    ['with characters put in', () => within(dice.pick(['\u0000', '"', '}', ']', ',', '\\', '\ud800', '//', '\ufeff', "'"]))],
    ['with characters taken out', () => design.slice(0, at) + design.slice(at + 1 + dice.whole(0, 19))],
    ['from the future', () => design.replace(/"fettle": *\d+/, `"fettle": ${dice.pick([0, -1, 1.5, 2, 1e9])}`)],
    [
      'another thing',
      () => dice.pick(['', ' ', 'null', '[]', '{}', '42', '"design"', 'RIFF', '{"fettle":1}', '{"fettle":1,"variants":[]}']),
    ],
    ['with many variants', () => design.replace(/"variants": *\[/, (head) => head + '{},'.repeat(1 + dice.whole(0, 2999)))],
    ['in another coding', () => [...design.slice(0, 200)].map((letter) => `${letter}\u0000`).join('')],
  ];
  const [how, make] = dice.pick(breaks);
  return [how, make()];
}
