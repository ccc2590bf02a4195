import { afterEach, beforeEach, describe, expect, test, vi } from 'vitest';
import { readWav, writeWav } from '../../../model/chain/wav.ts';
import { createNoise } from '../../support/noise.ts';
import { runRender } from '../state/fakeParts.ts';
import { FakeStore } from './fakeStore.ts';
import { chunk, sentencesOf, type Visit, visit } from './visits.ts';

let store: FakeStore;

beforeEach(() => {
  vi.useFakeTimers();
  store = new FakeStore();
});
afterEach(() => {
  vi.useRealTimers();
});

const rest = () => vi.advanceTimersByTimeAsync(1000);

async function begin({ bench, parts }: Visit): Promise<(samples: Float32Array<ArrayBuffer>, last?: boolean) => void> {
  await bench.start();
  bench.startTake();
  const sound = parts.sounds[0];
  return (samples, last = false) => sound.events.message(chunk([samples], last));
}

async function take(at: Visit, samples: Float32Array<ArrayBuffer>): Promise<void> {
  (await begin(at))(samples, true);
  await rest();
}

async function saved({ bench, parts }: Visit, id: number): Promise<Float32Array[]> {
  await bench.saveTake(id, 'float32');
  const last = parts.downloads.at(-1);
  if (last === undefined) throw new Error('nothing was saved');
  return readWav(last.bytes).channels;
}

const idsAndNames = ({ bench }: Visit) => bench.takes.value.map(({ id, name }) => `${id} ${name}`);

describe('takes', () => {
  test('are there on the next visit, sample by sample, with name, variant and k', async () => {
    const first = await visit(store);
    const samples = createNoise(1, 20_000, 0.9);
    const send = await begin(first);
    send(samples.slice(0, 8192));
    send(samples.slice(8192, 16_384));
    send(samples.slice(16_384), true);
    first.bench.renameTake(1, 'with the equal pair');
    await rest();
    const second = await visit(store);
    expect(second.bench.takes.value).toEqual(first.bench.takes.value);
    expect(await saved(second, 1)).toEqual([samples]);
    await take(second, createNoise(2, 100, 0.9));
    expect(idsAndNames(second)).toEqual(['1 with the equal pair', '2 Take 2']);
    expect(sentencesOf(second)).toEqual([]);
  });

  test('are written while they are taken, with a record from the first samples on', async () => {
    const send = await begin(await visit(store));
    send(createNoise(1, 8192, 0.9));
    await rest();
    expect(store.files.bytes()).toBe(4 * 8192);
    expect([...store.records.keys()].filter((key) => key.startsWith('take '))).toHaveLength(1);
  });

  test('go from the processor straight into the file, past the page, and what the file refuses goes on in memory', async () => {
    const at = await visit(store);
    await at.bench.start();
    vi.useRealTimers();
    at.bench.startTake();
    const to = at.parts.sounds[0].last('record')?.to;
    const samples = createNoise(1, 24_000, 0.9);
    store.files.roomBytes = 4 * 10_000;
    for (let frame = 0; frame < 24_000; frame += 8000) {
      to?.postMessage(chunk([samples.slice(frame, frame + 8000)], frame === 16_000));
    }
    await expect.poll(() => at.bench.takes.value.length).toBe(1);
    expect(at.bench.taking.value).toBeNull();
    expect(store.files.bytes()).toBe(4 * 8000);
    expect(sentencesOf(at)[0]).toContain('refuses to keep more of “Take 1”');
    expect(await saved(at, 1)).toEqual([samples]);
  });

  test('a stereo render is kept whole, and asks once that nothing be removed', async () => {
    const first = await visit(store);
    expect(first.bench.takesLast.value).toBe('browser');
    const stereo = writeWav([createNoise(1, 9600, 0.5), createNoise(2, 9600, 0.5)], 48000, 'float32').bytes;
    await first.bench.openAudio(new File([stereo], 'stereo.wav'));
    for (let n = 0; n < 2; n++) {
      const done = first.bench.renderClip();
      runRender(first.parts.renderWorkers[n]);
      await done;
    }
    await rest();
    expect([store.persistAsked, first.bench.takesLast.value]).toEqual([1, 'lasting']);
    const second = await visit(store);
    expect(second.bench.takesLast.value).toBe('lasting');
    expect(await saved(second, 2)).toEqual(await saved(first, 2));
  });

  test('a take that was under way when the page was killed is kept up to its last write, and that is said', async () => {
    const samples = createNoise(1, 16_384, 0.9);
    const send = await begin(await visit(store));
    send(samples.slice(0, 8192));
    send(samples.slice(8192));
    await rest();
    const second = await visit(store);
    expect(sentencesOf(second)).toEqual(['“Take 1” was being taken when the page went away; 0.3 s of it are kept.']);
    expect(await saved(second, 1)).toEqual([samples]);
    expect(sentencesOf(await visit(store))).toEqual([]);
  });

  test('what was heard meanwhile stands in the record as it happens', async () => {
    const first = await visit(store);
    const send = await begin(first);
    send(createNoise(1, 8192, 0.9));
    first.bench.hearVariant(1);
    await rest();
    expect((await visit(store)).bench.takes.value[0].variant).toBe('A then B');
  });

  test('a frame that was cut in half is left out', async () => {
    await take(await visit(store), createNoise(1, 100, 0.9));
    const [[name, bytes]] = store.files.contents;
    store.files.contents.set(name, bytes.slice(0, 4 * 60 + 3));
    const second = await visit(store);
    expect(sentencesOf(second)).toEqual(['Of “Take 1” only 0.0 s of 0.0 s are kept.']);
    expect(second.bench.takes.value[0].seconds * 48000).toBeCloseTo(60, 6);
  });

  test('deleted takes can still be brought back on the next visit; those before the last three are gone from the disk', async () => {
    const first = await visit(store);
    for (let n = 1; n <= 5; n++) await take(first, createNoise(n, 1000, 0.9));
    for (const id of [2, 1, 4, 3]) first.bench.deleteTake(id);
    await rest();
    expect(store.files.contents.size).toBe(4);
    const second = await visit(store);
    expect(second.bench.takes.value.map(({ id, deleted }) => [id, deleted])).toEqual([
      [1, true],
      [3, true],
      [4, true],
      [5, false],
    ]);
    second.bench.restoreTake(3);
    expect(await saved(second, 3)).toEqual([createNoise(3, 1000, 0.9)]);
    second.bench.deleteTake(5);
    second.bench.deleteTake(3);
    expect(second.bench.takes.value.map(({ id }) => id)).toEqual([3, 4, 5]);
  });
});

describe('what goes wrong with takes is said, and the others are there', () => {
  const takeRecords = () => [...store.records].filter(([key]) => key.startsWith('take ')) as [string, Record<string, unknown>][];

  test('a file that the browser has removed, and a record that is faulty', async () => {
    const first = await visit(store);
    for (let n = 1; n <= 3; n++) await take(first, createNoise(n, 4800, 0.9));
    const [[, one], [keyOfTwo, two]] = takeRecords();
    store.files.contents.delete(String(one.file));
    store.records.set(keyOfTwo, { ...two, k: 3 });
    const second = await visit(store);
    expect(second.bench.notes.value).toMatchObject([
      {
        sentence: 'Not all takes of the last visit are whole:',
        list: [
          'The audio of “Take 1” is gone: the browser has removed it.',
          'A take was found without a record that can be read (k is 3; expected 0 to 1, or null); it is “Take 4”, 0.1 s long.',
        ],
      },
    ]);
    expect(idsAndNames(second)).toEqual(['3 Take 3', '4 Take 4']);
    expect(await saved(second, 4)).toEqual([createNoise(2, 4800, 0.9)]);
    const third = await visit(store);
    expect([idsAndNames(third), sentencesOf(third)]).toEqual([['3 Take 3', '4 Take 4'], []]);
  });

  test('with every record lost the audio is found by its files alone', async () => {
    const first = await visit(store);
    for (let n = 1; n <= 2; n++) await take(first, createNoise(n, 4800, 0.9));
    store.records.clear();
    const second = await visit(store);
    expect(second.bench.takes.value).toMatchObject([
      { id: 1, variant: 'unknown', seconds: 0.1, sampleRateHz: 48000 },
      { id: 2, variant: 'unknown', seconds: 0.1, sampleRateHz: 48000 },
    ]);
    expect(await saved(second, 2)).toEqual([createNoise(2, 4800, 0.9)]);
  });

  test('a file that disappears while the page is open is said when it is asked for', async () => {
    const first = await visit(store);
    await take(first, createNoise(1, 4800, 0.9));
    store.files.contents.clear();
    await first.bench.playTake(1);
    await first.bench.saveTake(1, 'pcm24');
    expect(sentencesOf(first)).toEqual(['“Take 1” cannot be read: it is no longer there.']);
    expect(first.bench.playingTake.value).toBeNull();
  });

  test('with no more room a take goes on in memory, whole until the page closes; the next visit has what the file holds', async () => {
    const first = await visit(store);
    store.files.roomBytes = 4 * 10_000;
    const samples = createNoise(1, 24_000, 0.9);
    const send = await begin(first);
    for (let at = 0; at < samples.length; at += 8000) {
      send(samples.slice(at, at + 8000), at + 8000 === samples.length);
      await rest();
    }
    expect(sentencesOf(first)).toEqual([
      'The browser refuses to keep more of “Take 1”: it has no more room for this page. The rest of it is in memory until this page closes.',
    ]);
    expect(await saved(first, 1)).toEqual([samples]);
    const second = await visit(store);
    expect(sentencesOf(second)).toEqual(['Of “Take 1” only 0.2 s of 0.5 s are kept.']);
    expect(await saved(second, 1)).toEqual([samples.slice(0, 8000)]);
  });

  test('for want of room deleted takes go first, the one that was deleted first before the others', async () => {
    const first = await visit(store);
    for (let n = 1; n <= 3; n++) await take(first, createNoise(n, 8000, 0.9));
    first.bench.deleteTake(2);
    first.bench.deleteTake(1);
    store.files.roomBytes = 4 * 25_000;
    await take(first, createNoise(4, 8000, 0.9));
    expect(sentencesOf(first)).toEqual([]);
    expect(first.bench.takes.value.map(({ id, deleted }) => [id, deleted])).toEqual([
      [1, true],
      [3, false],
      [4, false],
    ]);
    expect(await saved(first, 4)).toEqual([createNoise(4, 8000, 0.9)]);
  });
});

test('a second tab takes in memory; when the first is closed its takes are kept beside the other’s, under numbers of their own', async () => {
  const first = await visit(store);
  await take(first, createNoise(1, 4800, 0.9));
  const close = store.holdElsewhere();
  const second = await visit(store);
  await take(second, createNoise(2, 9600, 0.9));
  expect([idsAndNames(second), second.bench.takesLast.value, store.files.contents.size]).toEqual([['1 Take 1'], 'page', 1]);
  const send = await begin(second);
  send(createNoise(3, 4800, 0.9));
  close();
  await rest();
  send(createNoise(4, 4800, 0.9), true);
  await rest();
  expect([idsAndNames(second), second.bench.takesLast.value]).toEqual([['1 Take 1', '2 Take 2', '3 Take 1'], 'lasting']);
  store.holds = Promise.resolve(true);
  const third = await visit(store);
  expect(idsAndNames(third)).toEqual(['1 Take 1', '2 Take 2', '3 Take 1']);
  expect(await saved(third, 3)).toEqual([createNoise(2, 9600, 0.9)]);
  expect(await saved(third, 2)).toEqual([Float32Array.of(...createNoise(3, 4800, 0.9), ...createNoise(4, 4800, 0.9))]);
});
