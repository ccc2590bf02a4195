/** Sources other than phrases and files, and the place in them. */
import { afterEach, beforeEach, describe, expect, test, vi } from 'vitest';
import { writeWav } from '../../../model/chain/wav.ts';
import type { Bench } from '../../../web/state/bench.ts';
import { assembleBench } from '../../../web/state/createBench.ts';
import { createNoise } from '../../support/noise.ts';
import { createFakeParts, type FakeParts } from './fakeParts.ts';

let parts: FakeParts;
let bench: Bench;

beforeEach(async () => {
  vi.useFakeTimers();
  parts = createFakeParts();
  bench = assembleBench(parts);
  await bench.start();
});
afterEach(() => {
  vi.useRealTimers();
});

const sentences = () => bench.notes.value.map(({ sentence }) => sentence);
const lastSound = () => parts.sounds[parts.sounds.length - 1];
const fileOf = (samples: Float32Array, name: string) => new File([writeWav([samples], 48000, 'float32').bytes], name);

describe('live input', () => {
  test('begins muted, in a context of low latency at the input’s own rate, and a recording goes back', async () => {
    parts.inputs.rate = 44100;
    await bench.openInput('interface');
    expect(parts.sounds[0].state).toBe('closed');
    expect(lastSound()).toMatchObject({ latency: 'interactive', sampleRateHz: 44100 });
    expect(lastSound().cells[0].channels).toBe(2);
    expect(bench.muted.value).toBe(true);
    expect(lastSound().last('mute')).toEqual({ type: 'mute', on: true });
    expect(bench.source.value).toEqual({ kind: 'live', title: 'Two-channel interface', seconds: 0 });
    expect(bench.input.value).toMatchObject({ deviceId: 'interface', sampleRateHz: 44100, channels: 2, latencySec: 0.01 });
    expect(bench.inputs.value).toHaveLength(2);
    await bench.choosePhrase('guitar');
    expect(parts.inputs.opened[0].ended).toBe(true);
    expect(lastSound()).toMatchObject({ latency: 'playback', sampleRateHz: 48000 });
    expect(bench.input.value).toBeNull();
    expect(sentences()).toEqual([]);
  });

  test('from another device lets go of the first', async () => {
    await bench.openInput();
    await bench.openInput('interface');
    expect(parts.inputs.opened.map(({ ended }) => ended)).toEqual([true, false]);
    expect(bench.input.value?.deviceId).toBe('interface');
  });

  test('that is refused is said, and what plays goes on', async () => {
    parts.inputs.refusal = new Error('The browser was not allowed to listen to an input.');
    await bench.openInput();
    expect(sentences()).toEqual(['The browser was not allowed to listen to an input.']);
    expect(bench.source.value.kind).toBe('phrase');
    expect(bench.sound.value).toBe('playing');
    expect(bench.muted.value).toBe(false);
  });

  test('that the design cannot run at is let go', async () => {
    parts.inputs.rate = 4000;
    await bench.openInput();
    expect(sentences()[0]).toContain('the sample rate is 4000 Hz; expected 8000 to 384000 Hz');
    expect(parts.inputs.opened[0].ended).toBe(true);
    expect(bench.source.value.kind).toBe('phrase');
  });

  test('that is unplugged stops the sound, says so, and gives way to what was chosen before', async () => {
    await bench.openAudio(fileOf(createNoise(1, 4800, 0.5), 'mine.wav'));
    await bench.openInput();
    parts.inputs.opened[0].unplug();
    await vi.advanceTimersByTimeAsync(200);
    expect(sentences()).toEqual(['The input “Built-in microphone” is gone; sound was stopped.']);
    expect(bench.sound.value).toBe('stopped');
    expect(bench.source.value.title).toBe('mine.wav');
    await bench.start();
    expect(bench.sound.value).toBe('playing');
    expect(lastSound().latency).toBe('playback');
  });

  test('that is unplugged while sound is opened for it is said too', async () => {
    const { open } = parts.inputs;
    parts.inputs.open = async (id, unplug) => {
      const input = await open.call(parts.inputs, id, unplug);
      queueMicrotask(() => unplug(input));
      return input;
    };
    await bench.openInput();
    await vi.advanceTimersByTimeAsync(200);
    expect(sentences()).toEqual(['The input “Built-in microphone” is gone; sound was stopped.']);
    expect(bench.source.value.kind).toBe('phrase');
    expect(parts.inputs.opened[0].ended).toBe(true);
  });

  test('whose rate changes is opened again at the new one, muted', async () => {
    await bench.openInput('interface');
    bench.setMuted(false);
    parts.inputs.rate = 96000;
    parts.inputs.changed();
    await vi.advanceTimersByTimeAsync(10);
    expect(sentences()).toEqual(['The input “Two-channel interface” now runs at 96000 Hz; it was opened again, muted.']);
    expect(lastSound().sampleRateHz).toBe(96000);
    expect(bench.muted.value).toBe(true);
    expect(parts.inputs.opened.map(({ ended }) => ended)).toEqual([true, false]);
  });

  test('another device that comes shows in the list, and what is heard stays', async () => {
    await bench.openInput();
    parts.inputs.devices = [...parts.inputs.devices, { id: 'usb', title: 'USB' }];
    parts.inputs.changed();
    await vi.advanceTimersByTimeAsync(10);
    expect(bench.inputs.value).toHaveLength(3);
    expect(parts.inputs.opened).toHaveLength(1);
  });

  test('overtaken by another choice while it opens is let go', async () => {
    const { open } = parts.inputs;
    let go = () => {};
    parts.inputs.open = async (...of) => {
      await new Promise<void>((resolve) => {
        go = resolve;
      });
      return open.apply(parts.inputs, of);
    };
    const opening = bench.openInput();
    await bench.choosePhrase('bass');
    go();
    await opening;
    expect(parts.inputs.opened[0].ended).toBe(true);
    expect(bench.source.value.kind).toBe('phrase');
    expect(bench.muted.value).toBe(false);
  });

  test('with processing that the browser keeps on is said', async () => {
    parts.inputs.keptOn = ['echo cancellation'];
    await bench.openInput();
    expect(sentences()[0]).toContain('keeps echo cancellation on');
  });

  test('has no part to loop, no other place and nothing to render whole', async () => {
    await bench.openInput();
    expect(bench.setRegion({ fromSec: 0, toSec: 1 })).toContain('Live input has no part to loop');
    expect(bench.seek(1)).toContain('no other place');
    await bench.renderClip();
    expect(sentences()).toEqual(['There is no whole to render; live input has no end.']);
    expect(parts.renderWorkers).toHaveLength(0);
    bench.startTake();
    expect(bench.taking.value).not.toBeNull();
  });
});

describe('the test tone', () => {
  test('has its volts at the cell’s input whatever full scale is, and changes while it plays', async () => {
    await bench.chooseTestTone();
    bench.setTestToneV(0.5);
    bench.setDesignValue('fullScaleV', 2);
    await vi.advanceTimersByTimeAsync(10);
    const peak = () => Math.max(...(lastSound().loops.at(-1)?.channels[0] ?? []));
    expect(bench.source.value).toMatchObject({ kind: 'tone', title: 'Test tone' });
    expect(peak()).toBeCloseTo(0.25, 5);
    bench.setTestToneHz(100);
    await vi.advanceTimersByTimeAsync(10);
    expect(lastSound().loops.at(-1)?.channels[0]).toHaveLength(48000);
    expect(parts.sounds).toHaveLength(1);
  });

  test('refuses what it cannot be, naming it', () => {
    expect(bench.setTestToneHz(0)).toBe('The test tone is 0 Hz; expected 1 to 20000 Hz.');
    expect(bench.setTestToneV(1000)).toContain('The test tone is 1000 V peak; expected');
  });
});

describe('the place', () => {
  test('is asked of what plays, moved by a press, and kept where sound is stopped', () => {
    expect(bench.seek(3)).toBeNull();
    expect(lastSound().feeds.at(-1)).toMatchObject({ kind: 'clip', atSec: 3 });
    lastSound().playedSec = 4.5;
    expect(bench.positionSec()).toBe(4.5);
    expect(bench.seek(9)).toBe('The place to play from is 9.00 s; expected 0.00 s to 8.00 s, where it loops.');
  });

  test('chosen before the first start is where it starts', async () => {
    bench = assembleBench(parts);
    await vi.advanceTimersByTimeAsync(10);
    bench.seek(2);
    expect(bench.positionSec()).toBe(2);
    await bench.start();
    expect(lastSound().feeds.at(-1)).toMatchObject({ atSec: 2 });
  });

  test('goes on inside a new loop, else moves to its beginning; ends that are dragged are cut once they rest', async () => {
    lastSound().playedSec = 3;
    const { length } = lastSound().feeds;
    bench.setRegion({ fromSec: 2, toSec: 4 });
    bench.setRegion({ fromSec: 2, toSec: 4.1 });
    expect(lastSound().feeds).toHaveLength(length);
    await vi.advanceTimersByTimeAsync(150);
    expect(lastSound().feeds).toHaveLength(length + 1);
    expect(lastSound().feeds.at(-1)).toMatchObject({ atSec: 1 });
    expect(lastSound().loops.at(-1)?.channels[0]).toHaveLength(Math.round(2.1 * 48000));
    expect(bench.positionSec()).toBe(3);
    expect(bench.seek(5)).toContain('expected 2.00 s to 4.10 s, where it loops');
    bench.setRegion({ fromSec: 6, toSec: 7 });
    await vi.advanceTimersByTimeAsync(150);
    expect(bench.positionSec()).toBe(6);
    bench.setRegion(null);
    await vi.advanceTimersByTimeAsync(150);
    expect(bench.positionSec()).toBe(6);
    expect(lastSound().loops.at(-1)?.channels[0]).toHaveLength(8 * 48000);
  });

  test('of a loop outside the source or too short is refused by its numbers', () => {
    expect(bench.setRegion({ fromSec: 7, toSec: 9 })).toBe(
      'The loop is 7.00 s to 9.00 s; expected 0.05 s or more, within the 8.00 s of “Guitar chords”.',
    );
    expect(bench.setRegion({ fromSec: 1, toSec: 1.01 })).toContain('expected 0.05 s or more');
    expect(bench.setRegion({ fromSec: Number.NaN, toSec: 1 })).toContain('expected');
    expect(bench.region.value).toBeNull();
  });

  test('another source is heard whole and from its beginning', async () => {
    bench.setRegion({ fromSec: 2, toSec: 4 });
    await bench.choosePhrase('bass');
    expect(bench.region.value).toBeNull();
    await vi.advanceTimersByTimeAsync(150);
    expect(lastSound().feeds.at(-1)).toMatchObject({ atSec: 0 });
  });
});

test('an output that is gone stops the sound and says so; Start goes on', async () => {
  lastSound().events.outputLost();
  expect(bench.sound.value).toBe('stopped');
  expect(sentences()).toEqual(['The sound output is gone; sound was stopped.']);
  await vi.advanceTimersByTimeAsync(200);
  await bench.start();
  expect(bench.sound.value).toBe('playing');
});

test('a file that cannot be read, or is too large, is named', async () => {
  const folder = new File([], 'folder.wav');
  folder.arrayBuffer = () => Promise.reject(new DOMException('no', 'NotReadableError'));
  await bench.openAudio(folder);
  const large = new File([], 'large.wav');
  Object.defineProperty(large, 'size', { value: 2.5e9 });
  await bench.openAudio(large);
  expect(sentences()).toEqual([
    '“folder.wav” cannot be read: it is a folder, was moved, or may not be opened.',
    '“large.wav” is 2.5 GB large; expected at most 1 GB.',
  ]);
});
