import { spawn, spawnSync } from 'node:child_process';
import { existsSync } from 'node:fs';
import { expect, test } from 'vitest';
import { readWav } from '../../../model/chain/wav.ts';
import type { Variant } from '../../../model/design/types.ts';
import { ended, FETTLE, type Folder, newFolder, straightThrough } from './running.ts';
import { type Kind, soundOf, takeApart, wavOf } from './sound.ts';

const PLAIN: Kind = { bits: 16, float: false, channels: 1, rateHz: 48000 };
const SILENT = { code: 0, signal: null, stdout: '', stderr: '' };

function folderWith(sound: Buffer): Folder {
  const folder = newFolder();
  folder.write('a.json', JSON.stringify(straightThrough()));
  folder.write('in.wav', sound);
  return folder;
}

const KINDS: Kind[] = [
  { bits: 16, float: false, channels: 1, rateHz: 44100 },
  { bits: 16, float: false, channels: 2, rateHz: 8000 },
  { bits: 24, float: false, channels: 1, rateHz: 11025 },
  { bits: 24, float: false, channels: 2, rateHz: 96000 },
  { bits: 32, float: false, channels: 1, rateHz: 48000 },
  { bits: 32, float: false, channels: 2, rateHz: 88200 },
  { bits: 32, float: true, channels: 1, rateHz: 192000 },
  { bits: 32, float: true, channels: 2, rateHz: 44100 },
];

// Bound: the divider loses 1e-9; a sample passes through a 24-bit significand once, so PCM of 16 and 24 bits moves by a step at most.
test.each(KINDS)(
  '$bits bits, float $float, $channels channels at $rateHz Hz come out as they went in, through a cell that lets all pass',
  async (kind) => {
    const samples = soundOf(kind, 4999);
    const folder = folderWith(wavOf(kind, samples));
    expect(await folder.fettle('render', 'a.json', 'in.wav', 'out.wav')).toEqual(SILENT);
    const { samples: result, ...resultKind } = takeApart(folder.read('out.wav'));
    expect(resultKind).toEqual(kind);
    expect(result).toHaveLength(samples.length);
    const step = kind.float ? 6e-8 : kind.bits === 32 ? 256 : 1;
    expect(Math.max(...result.map((value, i) => Math.abs(value - samples[i])))).toBeLessThanOrEqual(step);
  },
);

test.each([
  ['pcm16', 16, false],
  ['pcm24', 24, false],
  ['pcm32', 32, false],
  ['float32', 32, true],
])('--format %s is what OUT has', async (format, bits, float) => {
  const folder = folderWith(wavOf(PLAIN, soundOf(PLAIN, 100)));
  expect(await folder.fettle('render', '--format', format, 'a.json', 'in.wav', 'out.wav')).toEqual(SILENT);
  expect(takeApart(folder.read('out.wav'))).toMatchObject({ bits, float, channels: 1, rateHz: 48000 });
});

test.each([0, 1, 12345])('a clip of %i frames keeps its length and its place at every oversampling', async (frames) => {
  const sound = soundOf(PLAIN, frames);
  const folder = folderWith(wavOf(PLAIN, sound));
  expect(await folder.fettle('render', 'a.json', 'in.wav', 'out.wav', '--set', 'design.oversampling=16')).toEqual(SILENT);
  const { samples } = takeApart(folder.read('out.wav'));
  expect(samples).toHaveLength(frames);
  // 0.01 dB of ripple and what the filters do to a tone that starts at once: 1 % of its 16384 steps, against 7 % for one sample out of place
  const middle = samples.slice(1000, -1000).map((value, i) => Math.abs(value - sound[i + 1000]));
  expect(Math.max(0, ...middle)).toBeLessThan(164);
});

test('the same file gives the same bytes each time', async () => {
  const folder = folderWith(wavOf(PLAIN, soundOf(PLAIN, 20000)));
  const words = ['--set', 'control.controlV=-0.8', '--set', 'cell.seriesOhm=10k', '--set', 'design.oversampling=8'];
  await folder.fettle('render', 'a.json', 'in.wav', 'one.wav', ...words);
  await folder.fettle('render', 'a.json', 'in.wav', 'two.wav', ...words);
  expect(folder.read('one.wav').equals(folder.read('two.wav'))).toBe(true);
  expect(folder.read('one.wav').equals(folder.read('in.wav'))).toBe(false);
});

test('samples beyond full scale are cut, counted and reported; that is no fault, and a float file keeps them', async () => {
  const folder = folderWith(wavOf(PLAIN, [0, 20000, -20000, 8000, 20000]));
  const { code, stderr } = await folder.fettle('render', 'a.json', 'in.wav', 'out.wav', '--set', 'output.gainDb=6');
  expect({ code, stderr }).toEqual({
    code: 0,
    stderr: 'out.wav: 3 samples of 5 lay beyond full scale and were cut to it; a lower output.gainDb or --format float32 keeps them\n',
  });
  expect(takeApart(folder.read('out.wav')).samples).toEqual([0, 32767, -32768, 15962, 32767]);
  expect(await folder.fettle('render', 'a.json', 'in.wav', 'out.wav', '--set', 'output.gainDb=6', '--format', 'float32')).toEqual(SILENT);
  expect(takeApart(folder.read('out.wav')).samples[1]).toBeCloseTo((20000 / 32768) * 10 ** 0.3, 6);
});

test('IN stays as it was and nothing but OUT is left', async () => {
  const sound = wavOf(PLAIN, soundOf(PLAIN, 100));
  const folder = folderWith(sound);
  folder.write('out.wav', 'an older take');
  expect(await folder.fettle('render', 'a.json', 'in.wav', 'out.wav')).toEqual(SILENT);
  expect(folder.names()).toEqual(['a.json', 'in.wav', 'out.wav']);
  expect(folder.read('in.wav').equals(sound)).toBe(true);
  expect(takeApart(folder.read('out.wav')).samples).toHaveLength(100);
});

test('the design is inside OUT, its settings made, the rendered variant first; OUT then stands for the design', async () => {
  const folder = folderWith(wavOf(PLAIN, soundOf(PLAIN, 500)));
  const { variants, ...design } = straightThrough();
  folder.write('two.json', JSON.stringify({ ...design, variants: [...variants, { ...variants[0], name: 'B' }] }));
  const words = ['--variant', 'B', '--set', 'cell.seriesOhm=22k', '--set', 'cell.loadOhm=100k'];
  expect(await folder.fettle('render', 'two.json', 'in.wav', 'out.wav', ...words)).toEqual(SILENT);
  const inside = JSON.parse(readWav(folder.read('out.wav')).design ?? '');
  expect(inside.variants.map(({ name, cell }: Variant) => [name, cell.seriesOhm])).toEqual([
    ['B', 22000],
    ['A', variants[0].cell.seriesOhm],
  ]);
  expect(await folder.fettle('render', 'out.wav', 'in.wav', 'again.wav')).toEqual(SILENT);
  expect(folder.read('again.wav').equals(folder.read('out.wav'))).toBe(true);
  expect(await folder.fettle('measure', 'in.wav')).toMatchObject({
    code: 2,
    stderr: 'in.wav holds sound and no design; expected a design, or a WAV file with one inside\n',
  });
});

test('--dither adds what rounding needs, the same each time, and is refused for float samples', async () => {
  const folder = folderWith(wavOf(PLAIN, Array(5000).fill(0)));
  for (const name of ['one.wav', 'two.wav'])
    expect(await folder.fettle('render', 'a.json', 'in.wav', name, '--dither', 'triangular')).toEqual(SILENT);
  expect(folder.read('one.wav').equals(folder.read('two.wav'))).toBe(true);
  const { samples } = takeApart(folder.read('one.wav'));
  // Triangular dither two steps wide has a variance of 1/6 of a step's square, the rounding after it 1/12 (Lipshitz, Wannamaker & Vanderkooy 1992).
  expect(samples.reduce((sum, x) => sum + x * x, 0) / samples.length).toBeCloseTo(1 / 4, 1);
  const refused = await folder.fettle('render', 'a.json', 'in.wav', 'x.wav', '--dither', 'triangular', '--format', 'float32');
  expect(refused).toMatchObject({
    code: 2,
    stderr: '--dither is triangular, but OUT is float32, which is not rounded; expected a --format of PCM\n',
  });
});

test('--residual gives what the cell adds, and refuses what is no part of it', async () => {
  const folder = folderWith(wavOf(PLAIN, soundOf(PLAIN, 5000)));
  expect(await folder.fettle('render', 'a.json', 'in.wav', 'out.wav', '--residual', 'distortion', '--format', 'float32')).toEqual(SILENT);
  expect(Math.max(...takeApart(folder.read('out.wav')).samples.map(Math.abs))).toBeLessThan(1e-7);
  expect(await folder.fettle('render', 'a.json', 'in.wav', 'out.wav', '--residual', 'hum')).toMatchObject({
    code: 2,
    stderr: '--residual is "hum"; expected distortion, feedthrough or noise\n',
  });
});

const SCRIPT = spawnSync('script', ['--version']).error === undefined;

test.skipIf(!SCRIPT)('on a terminal the render says how far it has come, and wipes it; in a pipe it says nothing', async () => {
  const folder = folderWith(wavOf(PLAIN, soundOf(PLAIN, 40000)));
  const command = `"${process.execPath}" "${FETTLE}" render a.json in.wav out.wav`;
  const shown = await ended(spawn('script', ['-qec', command, '/dev/null'], { cwd: folder.path, stdio: ['ignore', 'pipe', 'pipe'] }));
  expect(shown.code).toBe(0);
  const wipe = '\r\x1b[K';
  expect(shown.stdout).toContain(`${wipe}Rendering: 100 %${wipe}`);
  expect(shown.stdout.endsWith(wipe)).toBe(true);
  expect(await folder.fettle('render', 'a.json', 'in.wav', 'out.wav')).toEqual(SILENT);
});

test.each([
  [
    'is no WAV file',
    Buffer.from('not a sound'),
    'in.wav: the file does not begin as a WAV file; expected RIFF and WAVE in its first 12 bytes',
  ],
  [
    'is cut short',
    wavOf(PLAIN, [1, 2, 3]).subarray(0, 46),
    'in.wav: the file states 6 bytes of audio and holds 2; expected all of them: it was cut short',
  ],
  [
    'has a rate that no converter has',
    wavOf({ ...PLAIN, rateHz: 100 }, [1, 2]),
    'in.wav cannot be rendered with variant A: the sample rate is 100 Hz; expected 8000 to 384000 Hz',
  ],
  [
    'holds what is no number',
    wavOf({ ...PLAIN, bits: 32, float: true }, [0, Number.NaN]),
    'in.wav: frame 2 holds a sample of NaN; expected at most 10000 times full scale',
  ],
  [
    'holds what is no sound',
    wavOf({ ...PLAIN, bits: 32, float: true }, [2e9]),
    'in.wav: frame 1 holds a sample of 2000000000; expected at most 10000 times full scale',
  ],
])('a sound that %s is refused with exit code 2', async (_, sound, sentence) => {
  const folder = folderWith(sound);
  expect(await folder.fettle('render', 'a.json', 'in.wav', 'out.wav')).toEqual({ ...SILENT, code: 2, stderr: `${sentence}\n` });
  expect(folder.names()).toEqual(['a.json', 'in.wav']);
});

test('an unknown format is refused with those there are', async () => {
  const folder = folderWith(wavOf(PLAIN, []));
  const { code, stderr } = await folder.fettle('render', 'a.json', 'in.wav', 'out.wav', '--format', 'mp3');
  expect({ code, stderr }).toEqual({ code: 2, stderr: '--format is "mp3"; expected pcm16, pcm24, pcm32 or float32\n' });
});

// Cell A with the gate held at 0 V by its recording: 250 Ω under 10 kΩ, −32.26 dB; off while the recording stands at −1.
test('a recorded control moves the gate, in time with the sound', async () => {
  const sound = soundOf(PLAIN, 9600).map((sample) => Math.round(sample / 100));
  const folder = folderWith(wavOf(PLAIN, sound));
  folder.write(
    'control.wav',
    wavOf(
      PLAIN,
      sound.map((_, n) => (n < 4800 ? -32768 : 0)),
    ),
  );
  const control = JSON.stringify({ source: 'external', fullScaleV: 9, offsetV: 0 });
  const words = ['render', 'a.json', 'in.wav', 'out.wav', '--control', 'control.wav', '--format', 'float32'];
  expect(await folder.fettle(...words, '--set', `control=${control}`, '--set', 'cell.seriesOhm=10000')).toEqual(SILENT);
  const { samples } = takeApart(folder.read('out.wav'));
  const power = (from: number, to: number, of: readonly number[]) => of.slice(from, to).reduce((total, v) => total + v * v, 0);
  const levelDb = (from: number, to: number) =>
    10 *
    Math.log10(
      power(from, to, samples) /
        power(
          from,
          to,
          sound.map((v) => v / 32768),
        ),
    );
  expect(levelDb(1000, 4700)).toBeCloseTo(0, 1);
  expect(levelDb(5000, 9600)).toBeCloseTo(-32.26, 1);
});

test.each([
  [
    'has no recording',
    ['--set', 'control.source=external'],
    'control.source of variant A is external; expected --control CONTROL.wav with its recording',
  ],
  [
    'has a recording and no use for it',
    ['--control', 'in.wav'],
    '--control is given, but control.source of variant A is fixed; expected external',
  ],
  [
    'has a recording that ends before the sound',
    ['--set', 'control.source=external', '--control', 'short.wav'],
    'short.wav has 1 frames; expected at least the 3 of in.wav',
  ],
  [
    'has a recording at another rate',
    ['--set', 'control.source=external', '--control', 'other.wav'],
    'other.wav has a sample rate of 44100 Hz; expected that of in.wav, 48000 Hz',
  ],
])('a control that %s is refused', async (_, options, sentence) => {
  const folder = folderWith(wavOf(PLAIN, [0, 0, 0]));
  folder.write('short.wav', wavOf(PLAIN, [0]));
  folder.write('other.wav', wavOf({ ...PLAIN, rateHz: 44100 }, [0, 0, 0]));
  const { code, stderr } = await folder.fettle('render', 'a.json', 'in.wav', 'out.wav', ...options);
  expect({ code, stderr }).toEqual({ code: 2, stderr: `${sentence}\n` });
  expect(existsSync(folder.at('out.wav'))).toBe(false);
});

// Cell A with the gate at 0 V, where the follower's limit is: 250 Ω under 10 kΩ, −32.26 dB; 0.3 dB for the second harmonic in the peak.
test('an envelope is moved by the sound that is rendered', async () => {
  const sound = soundOf(PLAIN, 9600);
  const folder = folderWith(wavOf(PLAIN, sound));
  const envelope = JSON.stringify({ source: 'envelope', restV: -9, limitV: 0, gainVPerV: 1000, thresholdV: 0.01 });
  expect(
    await folder.fettle('render', 'a.json', 'in.wav', 'out.wav', '--set', `control=${envelope}`, '--set', 'cell.seriesOhm=10k'),
  ).toEqual(SILENT);
  const peakDb = 20 * Math.log10(Math.max(...takeApart(folder.read('out.wav')).samples.slice(4800).map(Math.abs)) / 16384);
  expect(Math.abs(peakDb + 32.26)).toBeLessThan(0.3);
});
