import { afterEach, beforeEach, describe, expect, test, vi } from 'vitest';
import { renderClip } from '../../../model/chain/render.ts';
import { readWav, writeWav } from '../../../model/chain/wav.ts';
import { loudnessOf } from '../../../model/measure/loudness.ts';
import type { Bench } from '../../../web/state/bench.ts';
import { assembleBench } from '../../../web/state/createBench.ts';
import type { Chunk, Report } from '../../../worklet/protocol.ts';
import { createNoise } from '../../support/noise.ts';
import { createFakeParts, type FakeParts, type FakeSound, runLoudness, runRender } from './fakeParts.ts';

let parts: FakeParts;
let bench: Bench;

beforeEach(() => {
  vi.useFakeTimers();
  parts = createFakeParts();
  bench = assembleBench(parts);
});
afterEach(() => {
  vi.useRealTimers();
});

async function startSound(): Promise<FakeSound> {
  await bench.start();
  return parts.sounds[parts.sounds.length - 1];
}

const sentences = () => bench.notes.value.map(({ sentence }) => sentence);

function fileOf(samples: Float32Array[], rate: number, name: string): File {
  return new File([writeWav(samples, rate, 'float32').bytes], name);
}

function chunk(frame: number, samples: Float32Array<ArrayBuffer>, last: boolean): Chunk {
  return { type: 'chunk', slot: 0, frame, frames: samples.length, channels: [samples], last };
}

describe('starting and stopping', () => {
  test('starts muted at the phrase’s own rate, loops it, then unmutes', async () => {
    expect(bench.sound.value).toBe('idle');
    const started = bench.start();
    expect(bench.sound.value).toBe('starting');
    await started;
    const [sound] = parts.sounds;
    expect(bench.sound.value).toBe('playing');
    expect(sound.cells[0]).toMatchObject({ channels: 1, muted: true, heard: 'cell' });
    expect(sound.cells[0].chains[0]?.sampleRateHz).toBe(48000);
    expect(sound.loops.map(({ title }) => title)).toEqual([bench.source.value.title]);
    expect(bench.source.value).toMatchObject({ kind: 'phrase', seconds: 8 });
    expect(sound.last('mute')).toEqual({ type: 'mute', on: false });
    expect(bench.latencySec.value).toBe(0.001);
  });

  test('stays muted when it was muted before', async () => {
    bench.setMuted(true);
    const sound = await startSound();
    expect(sound.told.filter(({ type }) => type === 'mute')).not.toContainEqual({ type: 'mute', on: false });
    bench.setMuted(false);
    expect(sound.last('mute')).toEqual({ type: 'mute', on: false });
  });

  test('stopping mutes first and rests the context once the ramp is over; starting again goes on with the same sound', async () => {
    const sound = await startSound();
    bench.stop();
    expect(bench.sound.value).toBe('stopped');
    expect(sound.last('mute')).toEqual({ type: 'mute', on: true });
    expect(sound.state).toBe('running');
    vi.advanceTimersByTime(100);
    expect(sound.state).toBe('suspended');
    await bench.start();
    expect(sound.state).toBe('running');
    expect(parts.sounds).toHaveLength(1);
    expect(sound.last('mute')).toEqual({ type: 'mute', on: false });
  });

  test('stop pressed while sound is being opened wins', async () => {
    const started = bench.start();
    bench.stop();
    await started;
    expect(bench.sound.value).toBe('stopped');
    expect(parts.sounds[0].state).toBe('suspended');
    expect(parts.sounds[0].told).not.toContainEqual({ type: 'mute', on: false });
  });

  test('a browser that lacks something is told so in a sentence, and so is one that refuses', async () => {
    parts.missing = 'This browser has no audio worklet, so Fettle cannot play here.';
    await bench.start();
    expect(bench.sound.value).toBe('failed');
    parts.missing = null;
    parts.refusal = new Error('The browser would not let sound start. Press Start once more.');
    await bench.start();
    expect(sentences()).toEqual(['This browser has no audio worklet, so Fettle cannot play here.', parts.refusal.message]);
    parts.refusal = null;
    await bench.start();
    expect(bench.sound.value).toBe('playing');
    bench.dismiss(bench.notes.value[0].id);
    expect(bench.notes.value).toHaveLength(1);
  });

  test('a pause by the system is told, and Start goes on', async () => {
    const sound = await startSound();
    sound.events.paused(true);
    expect(bench.sound.value).toBe('stopped');
    expect(sentences()).toEqual(['The system has paused the sound.']);
    await bench.start();
    expect(bench.sound.value).toBe('playing');
  });
});

describe('changing values while sound plays', () => {
  test('new numbers go out once for all changes in a frame, to each variant that they are about', async () => {
    const sound = await startSound();
    vi.advanceTimersByTime(50);
    const moved = () => sound.told.flatMap((message) => (message.type === 'move' ? [message] : []));
    for (const ohm of [5000, 6000, 6800]) expect(bench.setValue('cell.seriesOhm', ohm)).toBeNull();
    vi.advanceTimersByTime(50);
    expect(moved().map(({ slot }) => slot)).toEqual([0]);
    expect(JSON.stringify(moved()[0].numbers.cells)).not.toBe(JSON.stringify(sound.cells[0].chains[0]?.cells));
    expect(bench.setDesignValue('tempC', 40)).toBeNull();
    vi.advanceTimersByTime(50);
    expect(moved().map(({ slot }) => slot)).toEqual([0, 0, 1, 2]);
  });

  test('level and ceiling are checked and sent as ratios', async () => {
    const sound = await startSound();
    expect(bench.setListenDb(-20)).toBeNull();
    expect(sound.last('gain')?.gain).toBeCloseTo(0.1, 12);
    expect(bench.setCeilingDbfs(-40)).toBeNull();
    expect(sound.last('ceiling')?.peak).toBeCloseTo(0.01, 12);
    expect(bench.setListenDb(3)).toBe('The listening level is 3 dB; expected −60 to 0 dB.');
    expect(bench.setCeilingDbfs(-41)).toBe('The ceiling is −41 dBFS; expected −40 to 0 dBFS.');
    expect(bench.listenDb.value).toBe(-20);
    expect(bench.ceilingDbfs.value).toBe(-40);
  });

  test('bypass and another variant are heard at once, and nothing is computed anew for it', async () => {
    const sound = await startSound();
    const { chains, focus } = sound.cells[0];
    expect(chains.map((numbers) => numbers !== null)).toEqual([true, true, true, false, false].slice(0, 5));
    expect(focus).toBe(0);
    bench.hear('bypass');
    expect(sound.last('hear')).toEqual({ type: 'hear', heard: 'bypass' });
    vi.advanceTimersByTime(50);
    const before = sound.told.length;
    bench.hearVariant(2);
    vi.advanceTimersByTime(50);
    expect(sound.told.slice(before)).toEqual([{ type: 'focus', slot: 2 }]);
  });

  test('a variant that is edited, added or taken back moves its own chain and no other', async () => {
    const sound = await startSound();
    const told = (work: () => void) => {
      const before = sound.told.length;
      work();
      vi.advanceTimersByTime(50);
      return sound.told.slice(before).map((message) => ('slot' in message ? [message.type, message.slot] : message.type));
    };
    expect(told(() => bench.addVariant())).toEqual([
      ['move', 3],
      ['focus', 3],
    ]);
    expect(told(() => bench.setValue('cell.seriesOhm', 4700))).toEqual([['move', 3]]);
    expect(told(() => bench.setDesignValue('title', 'Another'))).toEqual([]);
    expect(told(() => bench.undo())).toEqual([]);
    expect(told(() => bench.undo())).toEqual([['move', 3]]);
    expect(told(() => bench.undo())).toEqual([
      ['focus', 2],
      ['drop', 3],
    ]);
  });

  test('the residual is computed while it is heard, of the part that is chosen; for noise the heard variant’s parts hiss', async () => {
    const sound = await startSound();
    expect(bench.hear('residual')).toBeNull();
    expect(sound.told.slice(-2)).toEqual([
      { type: 'residual', residual: { part: 'distortion', gain: 10 } },
      { type: 'hear', heard: 'residual' },
    ]);
    expect(bench.setResidualGainDb(81)).toBe('The gain of the residual is 81 dB; expected 0 to 80 dB.');
    expect(bench.setResidualGainDb(60)).toBeNull();
    expect(sound.last('residual')?.residual).toEqual({ part: 'distortion', gain: 1000 });
    bench.setResidualPart('noise');
    expect(sound.told.slice(-2)).toMatchObject([
      { type: 'move', slot: 0, numbers: { noiseSeed: 1 } },
      { type: 'residual', residual: { part: 'noise', gain: 1000 } },
    ]);
    bench.hear('cell');
    expect(sound.told.slice(-3)).toMatchObject([
      { type: 'move', slot: 0, numbers: { noiseSeed: null } },
      { type: 'residual', residual: { part: null, gain: 1000 } },
      { type: 'hear', heard: 'cell' },
    ]);
  });

  test('the setting before the last change is heard, run from then on, and left when there is none', async () => {
    const sound = await startSound();
    expect(bench.hear('previous')).toBe('Variant A has not been changed yet; there is nothing before it to hear.');
    const first = bench.design.value.variants[0];
    for (const ohm of [5000, 6000, 6800]) {
      bench.setValue('cell.seriesOhm', ohm);
      vi.advanceTimersByTime(100);
    }
    expect(bench.previous.value).toBe(first);
    const before = sound.told.length;
    expect(bench.hear('previous')).toBeNull();
    expect(sound.told.slice(before)).toMatchObject([
      { type: 'move', slot: 4 },
      { type: 'hear', heard: 'previous' },
    ]);
    vi.advanceTimersByTime(1000);
    bench.setValue('cell.seriesOhm', 10_000);
    vi.advanceTimersByTime(50);
    expect(bench.previous.value?.cell.seriesOhm).toBe(6800);
    expect(sound.last('move')).toMatchObject({ slot: 4 });
    bench.hearVariant(1);
    expect(bench.hearing.value).toBe('cell');
    expect(sound.last('hear')).toEqual({ type: 'hear', heard: 'cell' });
  });

  test('variants and previous setting at the loudness of the source: measured on renders, within 0.05 LU', async () => {
    const sound = await startSound();
    const tone = Float32Array.from({ length: 96_000 }, (_, n) => 0.3 * Math.sin((2 * Math.PI * 440 * n) / 48000));
    await bench.openAudio(fileOf([tone], 48000, 'tone.wav'));
    bench.setValue('cell.seriesOhm', 22_000);
    expect(parts.loudnessWorkers).toEqual([]);
    bench.setMatched(true);
    for (let n = 0; n < parts.loudnessWorkers.length; n++) runLoudness(parts.loudnessWorkers[n]);
    expect(parts.loudnessWorkers.every(({ ended }) => ended)).toBe(true);
    const { variants, previous } = bench.matchDb.value;
    expect(variants).toHaveLength(bench.design.value.variants.length);
    const { slots, bypass } = sound.last('match')?.match ?? { slots: [], bypass: 0 };
    expect(bypass).toBe(1);
    const wanted = loudnessOf([tone], 48000);
    for (const [index, db] of [...variants, previous].entries()) {
      const slot = index === variants.length ? 4 : index;
      expect(slots[slot]).toBeCloseTo(10 ** ((db ?? Number.NaN) / 20), 9);
      if (slot === 4) continue;
      const [heard] = renderClip(bench.design.value, index, [tone], 48000);
      const lufs = loudnessOf([heard.map((x) => x * slots[slot])], 48000);
      expect(Math.abs(lufs - wanted)).toBeLessThan(0.05);
    }
    expect(previous).not.toBeNull();
    bench.setMatched(false);
    expect(sound.last('match')?.match).toEqual({ slots: [1, 1, 1, 1, 1], bypass: 1 });
  });
});

describe('sources', () => {
  test('a file at another rate opens sound anew at that rate; one with other channels only makes the processor anew', async () => {
    const first = await startSound();
    await bench.openAudio(fileOf([createNoise(1, 4410, 0.5), createNoise(2, 4410, 0.5)], 44100, 'loop.wav'));
    expect(first.state).toBe('closed');
    const second = parts.sounds[1];
    expect(second.sampleRateHz).toBe(44100);
    expect(second.cells[0].channels).toBe(2);
    expect(second.last('mute')).toEqual({ type: 'mute', on: false });
    expect(bench.source.value).toEqual({ title: 'loop.wav', seconds: 0.1, kind: 'file' });
    await bench.openAudio(fileOf([createNoise(1, 4410, 0.5)], 44100, 'mono.wav'));
    expect(parts.sounds).toHaveLength(2);
    expect(second.cells[1].channels).toBe(1);
    expect(second.loops.at(-1)?.channels).toEqual([createNoise(1, 4410, 0.5)]);
  });

  test('a value changed while the processor is made anew reaches the new one', async () => {
    const sound = await startSound();
    await bench.choosePhrase('band');
    const { rebuild } = sound;
    sound.rebuild = async (cell) => {
      bench.setValue('cell.seriesOhm', 6800);
      vi.advanceTimersByTime(50);
      await rebuild.call(sound, cell);
    };
    await bench.choosePhrase('guitar');
    const [numbers] = sound.cells[2].chains;
    expect(sound.last('move')?.numbers.cells).toHaveLength(1);
    expect(JSON.stringify(sound.last('move')?.numbers)).not.toBe(JSON.stringify(numbers));
    expect(sentences()).toEqual([]);
  });

  test('a file that is no sound is named, and what plays goes on', async () => {
    const sound = await startSound();
    await bench.openAudio(new File([new Uint8Array(0)], 'nothing.wav'));
    await bench.choosePhrase('kazoo');
    await bench.openAudio(fileOf([createNoise(1, 400, 0.5)], 4000, 'phone.wav'));
    expect(sentences()[2]).toBe('“phone.wav” cannot be played: the sample rate is 4000 Hz; expected 8000 to 384000 Hz.');
    expect(bench.source.value.title).toBe('Guitar chords');
    expect(sentences()[0]).toBe('“nothing.wav” is empty; expected a sound file.');
    expect(sentences()[1]).toContain('There is no phrase “kazoo”; expected one of guitar');
    expect(sound.loops).toHaveLength(1);
    expect(bench.sound.value).toBe('playing');
  });

  test('of several files that are dropped the first is opened, and that is said', async () => {
    const files = ['one.wav', 'two.wav'].map((name) => fileOf([createNoise(1, 4800, 0.5)], 48000, name));
    await bench.openDropped(files);
    expect(bench.source.value.title).toBe('one.wav');
    expect(sentences()).toEqual(['2 files were dropped; “one.wav” is opened, the others are not.']);
  });

  test('of sources chosen while another is being loaded the last one counts, the first phrase too', async () => {
    const { fetchBytes } = parts;
    const waiting: (() => void)[] = [];
    parts.fetchBytes = async (path) => {
      if (path.endsWith('.wav')) await new Promise<void>((go) => waiting.push(go));
      return fetchBytes(path);
    };
    bench = assembleBench(parts);
    await vi.waitUntil(() => waiting.length === 1);
    await bench.openAudio(fileOf([createNoise(1, 4800, 0.5)], 48000, 'mine.wav'));
    waiting[0]();
    await vi.advanceTimersByTimeAsync(100);
    expect(bench.source.value.title).toBe('mine.wav');
  });

  test('a machine that cannot run at the source’s rate says that it resamples', async () => {
    parts.onlyRateHz = 44100;
    await bench.start();
    expect(sentences()[0]).toContain('This machine plays at 44100 Hz; “Guitar chords” (48000 Hz) is resampled to be heard');
  });
});

describe('faults of the processor', () => {
  test('a processor that dies is made anew and unmuted, three times in ten seconds and no more', async () => {
    const sound = await startSound();
    for (let i = 1; i <= 3; i++) {
      sound.events.broken();
      await vi.advanceTimersByTimeAsync(100);
      expect(sound.cells).toHaveLength(1 + i);
      expect(sound.last('mute')).toEqual({ type: 'mute', on: false });
    }
    expect(sentences()).toEqual(['The audio processor failed and was started again.']);
    sound.events.broken();
    await vi.advanceTimersByTimeAsync(100);
    expect(bench.sound.value).toBe('failed');
    expect(sound.state).toBe('closed');
    expect(sentences()[1]).toContain('failed four times in ten seconds');
    await bench.start();
    expect(bench.sound.value).toBe('playing');
  });

  test('failures far apart are mended for ever', async () => {
    const sound = await startSound();
    for (let i = 0; i < 8; i++) {
      sound.events.broken();
      await vi.advanceTimersByTimeAsync(4000);
    }
    expect(bench.sound.value).toBe('playing');
    expect(sound.cells).toHaveLength(9);
  });

  test('a message that was refused is shown', async () => {
    const sound = await startSound();
    sound.events.message({ type: 'fault', sentence: 'The ceiling is 3; expected 0.01 to 1' });
    expect(sentences()).toEqual(['The ceiling is 3; expected 0.01 to 1']);
  });
});

describe('readings', () => {
  test('every change asks the worker again, and only answers to the latest question count', async () => {
    const { readingWorker } = parts;
    const [first] = readingWorker.posted;
    expect(first).toMatchObject({ type: 'question', question: { toneHz: 1000, variantIndex: 0 } });
    bench.setValue('cell.seriesOhm', 6800);
    const latest = readingWorker.posted.findLast((message) => message.type === 'question');
    expect(latest?.question.design).toBe(bench.design.value);
    const reading = { fault: 'none yet' };
    readingWorker.answer({ type: 'reading', id: first.id, reading, thdBand: null, path: null });
    expect(bench.moment.value).toBeNull();
    readingWorker.answer({ type: 'reading', id: latest?.id ?? 0, reading, thdBand: null, path: null });
    expect(bench.moment.value).toEqual({ levels: null, reading, thdBand: null, path: null });
    const worst = { thdFundamental: 0.02, gainDb: -6, gateV: -1 };
    const asked = () => readingWorker.posted.filter(({ type }) => type === 'swing').length;
    expect(asked()).toBe(1);
    readingWorker.answer({ type: 'worst', id: first.id, swing: { worst, points: [] } });
    expect(bench.worst.value).toEqual(worst);
    expect(asked()).toBe(2);
    expect(bench.setToneV(-1)).toBe('The shadow tone is −1 V peak; expected 0.0001 to 100 V peak.');
    expect(bench.setToneHz(440)).toBeNull();
    expect(readingWorker.posted.findLast((message) => message.type === 'question')?.question.toneHz).toBe(440);
  });

  test('while sound plays a report and the reading at its gate voltage come out together, 10 to 15 times a second', async () => {
    const { readingWorker } = parts;
    const sound = await startSound();
    const report = (gateSourceV: number): Report => ({
      ...{ type: 'report', slot: 0, frame: 0, input: new Float32Array(100), output: new Float32Array(100) },
      ...{
        inputPeak: 0,
        outputPeak: 0,
        heardPeak: 0,
        outputSquare: 0,
        heardSquare: 0,
        residualSquare: 0,
        inputPeakV: 0,
        drainPeakV: 0,
        feedthroughPeakV: 0,
      },
      ...{ slotPeaks: new Float64Array(5), slotFaults: new Float64Array(5), latencySamples: 48, loadFraction: 0.1 },
      ...{ faults: 0, ceilingFrames: 0, lagMs: 0, controlV: 2 * gateSourceV, gateSourceV, gateLowV: gateSourceV, gateHighV: gateSourceV },
    });
    const asked = () => readingWorker.posted.filter((message) => message.type === 'moment');
    const answer = () => {
      const { id = 0, gateV } = asked().at(-1) ?? {};
      readingWorker.answer({ type: 'reading', id, reading: { fault: `at ${gateV}` }, thdBand: null, path: null });
    };
    answer();
    answer();
    const before = asked().length;
    for (let i = 1; i <= 30; i++) {
      sound.events.message(report(-i / 10));
      vi.advanceTimersByTime(10);
      if (asked().length > before) answer();
      const moment = bench.moment.value;
      if (moment?.levels) expect(moment.reading).toEqual({ fault: `at ${moment.levels.gateSourceV}` });
      vi.advanceTimersByTime(23);
    }
    expect(sound.last('return report')).toMatchObject({ slot: 0 });
    expect(asked().length - before).toBeGreaterThanOrEqual(10);
    expect(asked().length - before).toBeLessThanOrEqual(16);
    const curve = readingWorker.posted.findLast((message) => message.type === 'curve');
    expect(curve?.gateV).toBeNull();
    readingWorker.answer({ type: 'curve', id: 1, curve: null });
    const again = readingWorker.posted.findLast((message) => message.type === 'curve');
    expect(again?.gateV).toBe(bench.moment.value?.levels?.gateSourceV);
    const own = { gateV: -1.23, points: [] };
    readingWorker.answer({ type: 'curve', id: again?.id ?? 0, curve: own });
    readingWorker.answer({ type: 'curve', id: again?.id ?? 0, curve: { gateV: -2, points: [] } });
    const curvesAsked = () => readingWorker.posted.filter(({ type }) => type === 'curve').length;
    const askedSoFar = curvesAsked();
    vi.advanceTimersByTime(100);
    sound.events.message(report(-1.2334));
    expect(bench.feedbackCurve.value?.gateV).toBe(-2);
    answer();
    expect(bench.feedbackCurve.value).toBe(own);
    expect(bench.moment.value?.levels?.gateSourceV).toBe(-1.2334);
    expect(curvesAsked()).toBe(askedSoFar);
  });

  test('when the worker fails the levels go on, with a sentence for the reading', async () => {
    parts.readingWorker.fail('The page’s worker failed.');
    expect(bench.moment.value?.reading).toEqual({ fault: 'The page’s worker failed.' });
  });
});

describe('takes', () => {
  test('what the processor sends becomes a take, sample by sample, and a WAV', async () => {
    const sound = await startSound();
    const line = createNoise(1, 20000, 0.9);
    bench.startTake();
    expect(sound.last('record')).toMatchObject({ type: 'record', on: true });
    sound.events.message(chunk(0, line.slice(0, 8192), false));
    sound.events.message(chunk(8192, line.slice(8192, 16384), false));
    expect(bench.taking.value?.seconds).toBeCloseTo(16384 / 48000, 9);
    bench.endTake();
    expect(sound.last('record')).toEqual({ type: 'record', on: false });
    sound.events.message(chunk(16384, line.slice(16384), true));
    expect(bench.taking.value).toBeNull();
    expect(bench.takes.value).toMatchObject([{ name: 'Take 1', variant: 'A', how: 'heard', sampleRateHz: 48000, seconds: 20000 / 48000 }]);
    bench.renameTake(1, 'with / slash');
    await bench.saveTake(1, 'float32');
    const [saved] = parts.downloads;
    expect(saved.name).toBe('with slash.wav');
    const file = readWav(saved.bytes);
    expect(file).toMatchObject({ sampleRateHz: 48000, channels: [line], float: true });
    expect(JSON.parse(file.design ?? '')).toEqual(bench.design.value);
    await bench.saveTake(1, 'pcm16 dithered');
    const { channels } = readWav(parts.downloads[1].bytes);
    expect(channels[0].every((x, n) => Math.abs(x - line[n]) <= 1.51 / 32768)).toBe(true);
    expect(channels[0].some((x, n) => Math.abs(x - line[n]) > 0.51 / 32768)).toBe(true);
    bench.setValue('cell.seriesOhm', 4700);
    const take = new File([new Uint8Array(saved.bytes)], 'with slash.wav');
    await bench.openDesign(take);
    expect(bench.design.value.variants[0].cell.seriesOhm).toBe(10000);
    await bench.openDesign(fileOf([line], 48000, 'plain.wav'));
    expect(sentences()).toEqual(['“plain.wav” holds sound and no design. Expected a design, or a saved take with one inside.']);
  });

  test('samples past full scale are cut in 16 bits, and that is said', async () => {
    const sound = await startSound();
    bench.startTake();
    sound.events.message(chunk(0, Float32Array.from([0.5, 1.5, -2]), true));
    await bench.saveTake(1, 'pcm16');
    expect(sentences()).toEqual(['2 samples of “Take 1” lie past full scale and were cut.']);
  });

  test('a take that is cut off by another source is kept up to there', async () => {
    const sound = await startSound();
    bench.startTake();
    sound.events.message(chunk(0, createNoise(1, 8192, 0.5), false));
    await bench.openAudio(fileOf([createNoise(1, 4410, 0.5)], 44100, 'other.wav'));
    expect(bench.taking.value).toBeNull();
    expect(bench.takes.value).toMatchObject([{ seconds: 8192 / 48000, sampleRateHz: 48000 }]);
  });

  test('rendering takes the whole source through the heard variant in a worker, with progress', async () => {
    await startSound();
    await bench.openAudio(fileOf([createNoise(3, 9600, 0.5)], 48000, 'short.wav'));
    const done = bench.renderClip();
    expect(bench.rendering.value).toEqual({ fraction: 0 });
    runRender(parts.renderWorkers[0]);
    await done;
    expect(parts.renderWorkers[0].ended).toBe(true);
    expect(bench.rendering.value).toBeNull();
    expect(bench.takes.value).toMatchObject([{ how: 'rendered', seconds: 0.2 }]);
  });

  test('rendering can be ended, and a fault in it is told', async () => {
    await startSound();
    const ended = bench.renderClip();
    bench.endRender();
    await ended;
    const faulty = bench.renderClip();
    parts.renderWorkers[1].answer({ type: 'fault', sentence: 'cell.seriesOhm is 0' });
    await faulty;
    expect(sentences()).toEqual(['cell.seriesOhm is 0']);
    const broken = bench.renderClip();
    parts.renderWorkers[2].fail('The worker failed.');
    await broken;
    expect(sentences()).toEqual(['cell.seriesOhm is 0', 'The worker failed.']);
    expect(bench.takes.value).toEqual([]);
    expect(parts.renderWorkers.every((worker) => worker.ended)).toBe(true);
  });

  test('a take is played in place of the chain, and what was heard before comes back', async () => {
    const sound = await startSound();
    bench.startTake();
    sound.events.message(chunk(0, createNoise(1, 1000, 0.5), true));
    bench.hear('bypass');
    await bench.playTake(1);
    expect(bench.playingTake.value).toBe(1);
    expect(sound.last('hear')).toEqual({ type: 'hear', heard: 'aside' });
    sound.events.takeEnded();
    expect(bench.playingTake.value).toBeNull();
    expect(sound.last('hear')).toEqual({ type: 'hear', heard: 'bypass' });
    await bench.playTake(1);
    bench.deleteTake(1);
    expect(sound.played.at(-1)).toBeNull();
    expect(bench.playingTake.value).toBeNull();
    expect(bench.takes.value[0].deleted).toBe(true);
    bench.restoreTake(1);
    expect(bench.takes.value[0].deleted).toBe(false);
  });

  test('a row says what was heard, one after the other, and has a k only where it began with the cell', async () => {
    const sound = await startSound();
    const take = async (work: () => unknown) => {
      bench.startTake();
      await work();
      sound.events.message(chunk(0, createNoise(1, 1000, 0.5), true));
      return bench.takes.value.at(-1);
    };
    expect(await take(() => bench.hearVariant(1))).toMatchObject({ variant: 'A then B', k: expect.any(Number) });
    bench.hear('bypass');
    expect(await take(() => {})).toMatchObject({ variant: 'bypass', k: null });
    expect(await take(() => bench.playTake(1))).toMatchObject({ variant: 'bypass then Take 1' });
    sound.events.takeEnded();
    const letters = () => [0, 1, 2, 0, 1].map((index) => bench.hearVariant(index));
    bench.hear('cell');
    expect((await take(letters))?.variant).toBe('B then A then B then C and on');
  });

  test('of deleted takes the last three can be brought back; those before are gone', async () => {
    const sound = await startSound();
    for (let n = 1; n <= 5; n++) {
      bench.startTake();
      sound.events.message(chunk(0, createNoise(n, 1000, 0.5), true));
    }
    for (const id of [2, 1, 4, 3]) bench.deleteTake(id);
    expect(bench.takes.value.map(({ id, deleted }) => [id, deleted])).toEqual([
      [1, true],
      [3, true],
      [4, true],
      [5, false],
    ]);
    bench.restoreTake(1);
    bench.deleteTake(5);
    expect(bench.takes.value.map(({ id }) => id)).toEqual([1, 3, 4, 5]);
    await bench.saveTake(2, 'pcm16');
    expect(sentences()).toEqual(['There is no take 2 to save.']);
  });

  test('where there are no files, takes fill the memory that is kept for them and no more; deleted ones make room first', async () => {
    parts.store.filesRefusal = 'it has no files for pages';
    bench = assembleBench(parts);
    const sound = await startSound();
    expect(bench.takesLast.value).toBe('page');
    expect(sentences()).toEqual(['This browser keeps no audio here: it has no files for pages. Takes last until this page closes.']);
    bench.dismiss(bench.notes.value[0].id);
    const big = new Float32Array(30e6);
    for (let n = 1; n <= 4; n++) {
      bench.startTake();
      sound.events.message(chunk(0, big, true));
      if (n === 1) bench.deleteTake(1);
    }
    expect(bench.takes.value.map(({ id }) => id)).toEqual([1, 2, 3, 4]);
    bench.startTake();
    expect(bench.takes.value.map(({ id }) => id)).toEqual([2, 3, 4]);
    sound.events.message(chunk(0, big, false));
    expect(sentences()).toEqual([]);
    sound.events.message(chunk(30e6, big.subarray(0, 8192), false));
    expect(sentences()).toEqual(['The take has been ended: it fills the 480 MB that are kept for takes.']);
    expect(sound.last('record')).toEqual({ type: 'record', on: false });
    sound.events.message(chunk(30e6 + 8192, big.subarray(0, 1), true));
    bench.startTake();
    expect(bench.taking.value).toBeNull();
    expect(sentences().at(-1)).toBe('The 480 MB that are kept for takes are full.');
  });

  test('without sound there is nothing to take or to play it with', async () => {
    await bench.openAudio(fileOf([createNoise(3, 4800, 0.5)], 48000, 'short.wav'));
    const done = bench.renderClip();
    runRender(parts.renderWorkers[0]);
    await done;
    bench.startTake();
    await bench.playTake(1);
    await bench.playTake(2);
    expect(bench.taking.value).toBeNull();
    expect(sentences()).toEqual([
      'There is no sound to take. Press Start first.',
      'A take is heard through the sound that plays. Press Start first.',
      'There is no take 2 to play.',
    ]);
  });
});

describe('designs', () => {
  test('the page opens with an example; another is opened by name, saved, and read again as the same', async () => {
    await vi.advanceTimersByTimeAsync(0);
    expect(bench.examples.value.length).toBeGreaterThan(1);
    const first = bench.design.value;
    await bench.openExample('stage-box-pad');
    const opened = bench.design.value;
    expect(opened.title).not.toBe(first.title);
    bench.saveDesign();
    const [saved] = parts.downloads;
    expect(saved.mediaType).toBe('application/json');
    await bench.openDesign(new File([saved.bytes as Uint8Array<ArrayBuffer>], saved.name));
    expect(bench.design.value).toEqual(opened);
    while (bench.canUndo.value) bench.undo();
    expect(bench.design.value).toEqual(first);
  });

  test('a faulty file is refused whole, with the file’s name and every fault in one note', async () => {
    const before = bench.design.value;
    await bench.openDesign(new File(['{ "fettle": 1, "variants": [ { "cell": { "seriesOhm": -5 } } ] }'], 'bad.json'));
    expect(bench.notes.value).toHaveLength(1);
    expect(sentences()).toEqual(['“bad.json” was not opened; its faults:']);
    expect(bench.notes.value[0].list?.some((sentence) => /seriesOhm is .5; expected/.test(sentence))).toBe(true);
    const extras = Object.fromEntries(Array.from({ length: 24 }, (_, n) => [`extra${n}`, 1]));
    const many = { fettle: 1, variants: [{ name: 'A', cell: { circuit: 'shunt', ...extras } }] };
    await bench.openDesign(new File([JSON.stringify(many)], 'many.json'));
    expect(bench.notes.value).toHaveLength(2);
    expect(bench.notes.value[1].list?.filter((sentence) => sentence.includes('.extra'))).toHaveLength(24);
    await bench.openDesign(new File(['{'], 'worse.json'));
    expect(sentences().at(-1)).toMatch(/^“worse.json”: /);
    expect(bench.design.value).toBe(before);
  });
});

describe('the load', () => {
  const report = (frame: number, loadFraction: number): Report => ({
    ...{ type: 'report', slot: 0, frame, input: new Float32Array(100), output: new Float32Array(100), loadFraction },
    ...{ inputPeak: 0, outputPeak: 0, heardPeak: 0, outputSquare: 0, heardSquare: 0, residualSquare: 0, inputPeakV: 0, drainPeakV: 0 },
    ...{ feedthroughPeakV: 0, faults: 0, slotPeaks: new Float64Array(5), slotFaults: new Float64Array(5) },
    ...{ latencySamples: 48, ceilingFrames: 0, lagMs: 0, controlV: -1, gateSourceV: -1, gateLowV: -1, gateHighV: -1 },
  });

  test('that lasts and leaves little of the time is said once, and again after it was low', async () => {
    const sound = await startSound();
    let frame = 0;
    const play = (seconds: number, load: number) => {
      for (let n = 0; n < 30 * seconds; n++) {
        sound.events.message(report(frame, load));
        frame += 1600;
      }
    };
    play(2, 0.95);
    expect(sentences()).toEqual([]);
    play(20, 0.95);
    expect(sentences()).toEqual(['The 3 variants take 95 % of the time that this machine has for sound; there may be gaps.']);
    bench.dismiss(bench.notes.value[0].id);
    play(20, 0.95);
    expect(sentences()).toEqual([]);
    play(20, 0.2);
    play(30, 0.95);
    expect(sentences()).toHaveLength(1);
  });
});
