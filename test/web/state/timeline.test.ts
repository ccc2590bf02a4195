import { signal } from '@preact/signals';
import { expect, test } from 'vitest';
import { defaultDesign } from '../../../model/design/defaults.ts';
import { createDocument } from '../../../web/state/document.ts';
import { createTimeline } from '../../../web/state/timeline.ts';

function made(...ids: number[]) {
  const list = signal<readonly { readonly id: number; readonly deleted: boolean }[]>(ids.map((id) => ({ id, deleted: false })));
  const mark = (id: number, deleted: boolean) => {
    list.value = list.value.map((take) => (take.id === id ? { ...take, deleted } : take));
  };
  const document = createDocument(defaultDesign(), () => {});
  const timeline = createTimeline(document, {
    // Of a take the timeline needs its number alone.
    takes: list as never,
    deleteTake: (id) => mark(id, true),
    restoreTake: (id) => mark(id, false),
  });
  const gone = () => list.value.filter(({ deleted }) => deleted).map(({ id }) => id);
  return { document, timeline, gone, list };
}

test('a deleted take comes back by undo, in its turn among the changes of the design, and goes by redo', () => {
  const { document, timeline, gone } = made(1, 2);
  document.setValue('cell.seriesOhm', 6800);
  timeline.deleteTake(1);
  document.setValue('cell.loadOhm', 47000);
  timeline.undo();
  expect([document.variant.value.cell.loadOhm === 47000, gone()]).toEqual([false, [1]]);
  timeline.undo();
  expect([document.variant.value.cell.seriesOhm, gone()]).toEqual([6800, []]);
  timeline.undo();
  expect(document.variant.value.cell.seriesOhm).not.toBe(6800);
  expect(timeline.canUndo.value).toBe(false);
  timeline.redo();
  expect([document.variant.value.cell.seriesOhm, gone()]).toEqual([6800, []]);
});

test('a take that the row has given back, or that is no longer kept, is not undone once more', () => {
  const { timeline, gone, list } = made(1, 2);
  timeline.deleteTake(1);
  timeline.restoreTake(1);
  expect([gone(), timeline.canUndo.value]).toEqual([[], false]);
  timeline.deleteTake(2);
  list.value = list.value.filter(({ id }) => id !== 2);
  expect(timeline.canUndo.value).toBe(false);
});
