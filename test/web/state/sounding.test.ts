import { expect, test } from 'vitest';
import { defaultDesign } from '../../../model/design/defaults.ts';
import { setAt } from '../../../model/design/path.ts';
import type { Design } from '../../../model/design/types.ts';
import { assignSlots, soundingText } from '../../../web/state/sounding.ts';

test('a variant keeps its slot wherever it stands, an edited one that of its place, a new one gets a free one', () => {
  for (const [slots, before, texts, expected] of [
    [[], [], ['a', 'b'], [0, 1]],
    [
      [0, 1],
      ['a', 'b'],
      ['a', 'c'],
      [0, 1],
    ],
    [
      [0, 1, 2],
      ['a', 'b', 'c'],
      ['b', 'c'],
      [1, 2],
    ],
    [
      [1, 2],
      ['b', 'c'],
      ['b', 'c', 'd'],
      [1, 2, 0],
    ],
    [
      [0, 1],
      ['a', 'b'],
      ['b', 'a'],
      [1, 0],
    ],
    [[0], ['a'], ['a', 'a', 'a', 'a'], [0, 1, 2, 3]],
    [
      [0, 1, 2, 3],
      ['a', 'b', 'c', 'd'],
      ['x', 'y', 'z', 'a'],
      [3, 1, 2, 0],
    ],
  ] as const) {
    const given = assignSlots(slots, before, texts);
    expect(new Set(given).size).toBe(texts.length);
    for (const slot of given) expect([0, 1, 2, 3]).toContain(slot);
    expect(given).toEqual(expected);
  }
});

test('a name changes nothing that sounds; a value, the temperature and the oversampling do', () => {
  const design = defaultDesign();
  const text = soundingText(design, 0);
  const changed = (path: string, value: unknown) => soundingText(setAt(design, path, value) as Design, 0);
  expect(changed('variants[0].name', 'Other')).toBe(text);
  expect(changed('title', 'Other')).toBe(text);
  for (const [path, value] of [
    ['variants[0].cell.seriesOhm', 1234],
    ['tempC', 40],
    ['oversampling', 2],
    ['fullScaleV', 2],
  ] as const) {
    expect(changed(path, value)).not.toBe(text);
  }
});
