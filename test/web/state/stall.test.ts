import { signal } from '@preact/signals';
import { afterEach, beforeEach, expect, test, vi } from 'vitest';
import type { SoundState } from '../../../web/state/bench.ts';
import { createNotes } from '../../../web/state/notes.ts';
import { watchStall } from '../../../web/state/stall.ts';

beforeEach(() => {
  vi.useFakeTimers();
});
afterEach(() => {
  vi.useRealTimers();
});

test('reports that stay away while sound plays are said once, and again after they came back', () => {
  const notes = createNotes();
  const sound = signal<SoundState>('playing');
  const noteAlive = watchStall(sound, notes);
  const said = () => notes.notes.value.filter(({ sentence }) => sentence.startsWith('No sound has come for 3 s')).length;
  vi.advanceTimersByTime(10_000);
  expect(said()).toBe(0);
  for (let n = 0; n < 100; n++) {
    noteAlive();
    vi.advanceTimersByTime(100);
  }
  expect(said()).toBe(0);
  vi.advanceTimersByTime(6000);
  expect(said()).toBe(1);
  notes.dismiss(notes.notes.value[0].id);
  vi.advanceTimersByTime(60_000);
  expect(said()).toBe(0);
  noteAlive();
  vi.advanceTimersByTime(6000);
  expect(said()).toBe(1);
});

test('nothing is said of sound that was stopped', () => {
  const notes = createNotes();
  const sound = signal<SoundState>('playing');
  const noteAlive = watchStall(sound, notes);
  noteAlive();
  sound.value = 'stopped';
  noteAlive();
  vi.advanceTimersByTime(60_000);
  expect(notes.notes.value).toEqual([]);
});
