import { effect } from '@preact/signals';
import { expect, test } from 'vitest';
import { defaultDesign } from '../../../model/design/defaults.ts';
import { createSummaries } from '../../../web/state/summaries.ts';
import type { ToneQuestion } from '../../../web/state/workers.ts';

const [variant] = defaultDesign().variants;
const design = { ...defaultDesign(), variants: [variant, { ...variant, name: 'B' }] };
const question: ToneQuestion = { design, variantIndex: 0, moves: 'drainOhm', toneHz: 1000, toneV: 0.5 };
const summary = (restThd: number) => ({ restThd, worstThd: 2 * restThd, gainDb: [-28, 0] as const });

test('variants are asked for one at a time, and again only when they or the tone change', () => {
  const asked: number[] = [];
  const summaries = createSummaries((index) => asked.push(index));
  summaries.ask(question);
  expect(asked).toEqual([0]);
  summaries.note(0, summary(0.1));
  summaries.note(1, summary(0.2));
  expect(asked).toEqual([0, 1]);
  expect(summaries.all.value).toEqual([summary(0.1), summary(0.2)]);
  summaries.ask({ ...question, variantIndex: 1 });
  expect(asked).toEqual([0, 1]);
  const moved = { ...variant, name: 'B', cell: { ...variant.cell, seriesOhm: 6800 } };
  summaries.ask({ ...question, design: { ...design, variants: [variant, moved] } });
  expect(asked).toEqual([0, 1, 1]);
  expect(summaries.all.value).toEqual([summary(0.1), null]);
  summaries.ask({ ...question, toneV: 1 });
  summaries.note(1, summary(0.3));
  expect(summaries.all.value).toEqual([null, null]);
  expect(asked).toEqual([0, 1, 1, 0]);
});

test('what cannot be read is asked for once', () => {
  const asked: number[] = [];
  const summaries = createSummaries((index) => asked.push(index));
  summaries.ask({ ...question, design: { ...design, variants: [variant] } });
  summaries.note(0, null);
  expect(asked).toEqual([0]);
  expect(summaries.all.value).toEqual([null]);
});

test('asked in an effect they do not make it run again with each answer', () => {
  const summaries = createSummaries(() => {});
  let runs = 0;
  const end = effect(() => {
    runs++;
    summaries.ask(question);
  });
  summaries.note(0, summary(0.1));
  summaries.note(1, summary(0.2));
  expect(runs).toBe(1);
  end();
});
