import { afterEach, beforeEach, describe, expect, test, vi } from 'vitest';
import { writeWav } from '../../../model/chain/wav.ts';
import type { Bench } from '../../../web/state/bench.ts';
import { assembleBench } from '../../../web/state/createBench.ts';
import { createFakeParts, type FakeParts } from '../state/fakeParts.ts';
import { FakeStore } from './fakeStore.ts';

let store: FakeStore;
let parts: FakeParts;

beforeEach(() => {
  vi.useFakeTimers();
  store = new FakeStore();
});
afterEach(() => {
  vi.useRealTimers();
});

/** A page that is opened in the same browser. */
async function visit(): Promise<Bench> {
  parts = createFakeParts(store);
  const bench = assembleBench(parts);
  await bench.restored;
  await vi.advanceTimersByTimeAsync(0);
  return bench;
}

const seriesOhm = (bench: Bench) => bench.design.value.variants[0].cell.seriesOhm;
const sentences = (bench: Bench) => bench.notes.value.map(({ sentence }) => sentence);
/** Longer than a change waits to be written, and than changes of one path are one to undo. */
const rest = () => vi.advanceTimersByTimeAsync(1000);

async function change(bench: Bench, ohm: number): Promise<void> {
  expect(bench.setValue('cell.seriesOhm', ohm)).toBeNull();
  await rest();
}

describe('design and settings', () => {
  test('come back on the next visit, with undo and redo', async () => {
    const first = await visit();
    const opened = seriesOhm(first);
    await change(first, 12e3);
    await change(first, 15e3);
    await change(first, 18e3);
    first.undo();
    first.hearVariant(1);
    await rest();
    const second = await visit();
    expect([seriesOhm(second), second.heardVariant.value, second.canRedo.value]).toEqual([15e3, 1, true]);
    second.redo();
    expect(seriesOhm(second)).toBe(18e3);
    for (let n = 0; n < 3; n++) second.undo();
    expect([seriesOhm(second), second.canUndo.value]).toEqual([opened, false]);
    expect(sentences(second)).toEqual([]);
  });

  test('what is brought back is no change: there is no setting before it to hear', async () => {
    await change(await visit(), 12e3);
    const bench = await visit();
    expect(bench.previous.value).toBeNull();
    expect(bench.setValue('cell.seriesOhm', 15e3)).toBeNull();
    expect(bench.previous.value?.cell.seriesOhm).toBe(12e3);
  });

  test('levels, what k moves and leaves, the shadow tone, matching and the phrase come back', async () => {
    const first = await visit();
    first.setListenDb(-20);
    first.setCeilingDbfs(-9);
    first.setKeep('control');
    first.setMoves('bothKeepSum');
    first.setToneV(0.1);
    first.setToneHz(440);
    first.setMatched(true);
    await first.choosePhrase('drums');
    await rest();
    const second = await visit();
    await second.start();
    const { listenDb, ceilingDbfs, keep, moves, toneV, toneHz, matched, source } = second;
    expect([listenDb, ceilingDbfs, keep, moves, toneV, toneHz, matched].map(({ value }) => value)).toEqual([
      -20,
      -9,
      'control',
      'bothKeepSum',
      0.1,
      440,
      true,
    ]);
    expect(source.value.title).toBe(first.source.value.title);
    expect(parts.sounds[0].cells[0].gain).toBeCloseTo(0.1, 9);
  });

  test('limits and hints that were put away come back; a limit that is none is refused by name', async () => {
    const first = await visit();
    expect(first.hints.value).toBe(true);
    first.putHintsAway();
    expect([first.limits.thd.set(0.05), first.limits.controlV.set(null), first.limits.reverseV.set(40)]).toEqual([null, null, null]);
    expect(first.limits.thd.set(1.5)).toBe('The limit is 150 %; expected more than 0 and at most 100 %.');
    expect(first.limits.pastOffV.set(-1)).toBe('The limit is -1 V; expected 0 to 100 V, or «none».');
    await rest();
    const { hints, limits } = await visit();
    expect([hints.value, limits.thd.value, limits.controlV.value, limits.reverseV.value, limits.pastOffV.value]).toEqual([
      false,
      0.05,
      null,
      40,
      0.1,
    ]);
  });

  test('the user’s own file is not kept, which is said once by its name', async () => {
    const first = await visit();
    await first.openAudio(new File([writeWav([new Float32Array(4800).fill(0.1)], 48000, 'float32').bytes], 'mine.wav'));
    await rest();
    const second = await visit();
    await second.start();
    expect(second.source.value.kind).toBe('phrase');
    expect(sentences(second)).toEqual(['“mine.wav” was heard at the last visit; recordings of yours are not kept here.']);
    await rest();
    expect(sentences(await visit())).toEqual([]);
  });

  test('a value that is dragged is written a few times a second, and the last one when the page goes', async () => {
    const bench = await visit();
    let writes = 0;
    const put = store.put.bind(store);
    store.put = (key, value) => {
      if (key === 'document') writes++;
      return put(key, value);
    };
    for (let n = 0; n < 60; n++) {
      bench.setValue('cell.seriesOhm', 10e3 + n);
      await vi.advanceTimersByTimeAsync(16);
    }
    expect(writes).toBeGreaterThan(1);
    expect(writes).toBeLessThan(5);
    bench.setValue('cell.seriesOhm', 33e3);
    store.leave();
    expect(seriesOhm(await visit())).toBe(33e3);
  });

  test('what is changed before the kept design has been read is not lost to it', async () => {
    await change(await visit(), 12e3);
    const bench = assembleBench(createFakeParts(store));
    bench.setValue('cell.seriesOhm', 47e3);
    await bench.restored;
    expect(seriesOhm(bench)).toBe(47e3);
    bench.undo();
    bench.undo();
    expect(seriesOhm(bench)).toBe(12e3);
  });

  test('50 steps back and 50 forward are kept', async () => {
    const first = await visit();
    for (let n = 1; n <= 120; n++) await change(first, 10e3 + n);
    for (let n = 1; n <= 55; n++) first.undo();
    await rest();
    const second = await visit();
    const steps = (step: () => void, left: () => boolean) => {
      let count = 0;
      for (; left(); count++) step();
      return count;
    };
    const forward = steps(second.redo, () => second.canRedo.value);
    expect([forward, steps(second.undo, () => second.canUndo.value)]).toEqual([50, 100]);
  });
});

describe('what goes wrong is said, and the rest is there', () => {
  const spoil = (make: (record: Record<string, unknown>) => void) => {
    const record = structuredClone(store.records.get('document')) as Record<string, unknown>;
    make(record);
    store.records.set('document', record);
  };
  const firstCell = (record: Record<string, unknown>) =>
    (record.design as { variants: { cell: Record<string, unknown> }[] }).variants[0].cell;

  test('a faulty design is named by field, value and what was expected, and offered as a file until it is saved', async () => {
    const first = await visit();
    first.setListenDb(-20);
    await change(first, 12e3);
    spoil((record) => {
      firstCell(record).seriesOhm = -5;
    });
    const second = await visit();
    expect(sentences(second)).toEqual([
      'The design of the last visit cannot be used: variants[0].cell.seriesOhm is -5; expected 1 Ω to 100 MΩ. The page opens with an example.',
    ]);
    expect([seriesOhm(second), second.listenDb.value]).toEqual([10e3, -20]);
    await change(second, 22e3);
    const third = await visit();
    expect(seriesOhm(third)).toBe(22e3);
    const [{ offer }] = third.notes.value;
    offer?.run();
    expect(JSON.parse(new TextDecoder().decode(parts.downloads[0].bytes)).design.variants[0].cell.seriesOhm).toBe(-5);
    expect(sentences(await visit())).toEqual([]);
  });

  test.each([
    ['no record at all', 'milk', 'The design of the last visit cannot be used: It is “milk”; expected a design with its history'],
    ['null', null, 'The design of the last visit cannot be used: It is null; expected a design with its history'],
  ])('%s in its place is said', async (_what, value, sentence) => {
    await visit();
    store.records.set('document', value);
    expect(sentences(await visit())[0]).toContain(sentence);
  });

  test('a heard variant that is not there is said', async () => {
    await visit();
    spoil((record) => {
      record.heardVariant = 7;
    });
    expect(sentences(await visit())[0]).toContain('The heard variant is 7; expected 0 to 2');
  });

  test('a faulty step of undo costs that step and those beyond it, no more', async () => {
    const first = await visit();
    for (const ohm of [11e3, 12e3, 13e3]) await change(first, ohm);
    spoil((record) => {
      (record.past as unknown[])[1] = { fettle: 1 };
    });
    const second = await visit();
    expect(sentences(second)).toEqual(['Part of the history of undo could not be read; the rest is there.']);
    second.undo();
    expect([seriesOhm(second), second.canUndo.value]).toEqual([12e3, false]);
  });

  test('a record that the browser cannot read is said, and the others are read', async () => {
    const first = await visit();
    first.setListenDb(-20);
    await rest();
    store.unreadable.set('document', 'it was damaged');
    const second = await visit();
    expect(sentences(second)).toEqual(['The design of the last visit cannot be read: it was damaged. The page opens with an example.']);
    expect(second.listenDb.value).toBe(-20);
  });

  test('settings that are refused are listed; the others are taken', async () => {
    await visit();
    store.records.set('settings', { listenDb: 12, ceilingDbfs: null, keep: 'both', toneHz: 440, phrase: 5 });
    const bench = await visit();
    expect(bench.notes.value).toMatchObject([
      {
        sentence: 'Some settings of the last visit could not be taken:',
        list: [
          'The listening level is 12 dB; expected −60 to 0 dB.',
          'The ceiling is null; expected a number.',
          'What setting k leaves alone is “both”; expected “gate” or “control”.',
          'The phrase is 5; expected a name.',
        ],
      },
    ]);
    expect([bench.listenDb.value, bench.toneHz.value]).toEqual([-12, 440]);
  });

  test('a browser that keeps nothing says so once, and the page works', async () => {
    store.readRefusal = 'it keeps nothing for pages in this window';
    const bench = await visit();
    expect(sentences(bench)).toEqual([
      'This browser keeps nothing here: it keeps nothing for pages in this window. Design and takes last until the page is closed.',
    ]);
    await change(bench, 12e3);
    await bench.start();
    expect(bench.sound.value).toBe('playing');
    expect(sentences(bench)).toHaveLength(1);
  });

  test('a write that is refused is said once, and again only after one was taken', async () => {
    const bench = await visit();
    store.writeRefusal = 'it has no more room for this page';
    await change(bench, 11e3);
    await change(bench, 12e3);
    expect(sentences(bench)).toEqual(['The browser did not keep the last change: it has no more room for this page.']);
    bench.dismiss(bench.notes.value[0].id);
    await change(bench, 13e3);
    expect(sentences(bench)).toEqual([]);
    store.writeRefusal = null;
    await change(bench, 14e3);
    store.writeRefusal = 'it has no more room for this page';
    await change(bench, 15e3);
    expect(sentences(bench)).toHaveLength(1);
  });

  test('records that the browser removes while the page is open are written anew', async () => {
    const bench = await visit();
    await change(bench, 12e3);
    store.records.clear();
    store.lost();
    await vi.advanceTimersByTimeAsync(0);
    expect(seriesOhm(await visit())).toBe(12e3);
  });
});

describe('two tabs', () => {
  test('the second says that another keeps, shows the kept design and writes nothing', async () => {
    await change(await visit(), 12e3);
    store.holdElsewhere();
    const second = await visit();
    expect(sentences(second)).toEqual([
      'Another tab has Fettle open and keeps design and takes; what you do here lasts until this tab is closed.',
    ]);
    expect(seriesOhm(second)).toBe(12e3);
    const before = JSON.stringify([...store.records]);
    await change(second, 15e3);
    expect(JSON.stringify([...store.records])).toBe(before);
  });

  test('when the first is closed the second keeps its own design, and offers the other one', async () => {
    const first = await visit();
    const close = store.holdElsewhere();
    const second = await visit();
    await change(first, 12e3);
    await change(second, 15e3);
    close();
    await vi.advanceTimersByTimeAsync(0);
    expect(sentences(second)[1]).toBe(
      'The other tab is closed; this one keeps from now on, and the design that the other one ended with, “Harbour tremolo”, stands aside.',
    );
    second.notes.value[1].offer?.run();
    expect(JSON.parse(new TextDecoder().decode(parts.downloads[0].bytes)).variants[0].cell.seriesOhm).toBe(12e3);
    store.holds = Promise.resolve(true);
    expect(seriesOhm(await visit())).toBe(15e3);
  });
});
