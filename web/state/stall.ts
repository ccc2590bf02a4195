/** Sees that sound has stopped coming though nobody stopped it: an output device that is gone need not be told by the browser. */
import type { ReadonlySignal } from '@preact/signals';
import type { SoundState } from './bench.ts';
import type { Notes } from './notes.ts';

const EVERY_MS = 1500;
/** Looks without a report between them; one alone may come right after the tab was frozen. */
const LOOKS = 2;

/** Returns what is to be called with each report. Until the first one it waits. */
export function watchStall(sound: ReadonlySignal<SoundState>, notes: Pick<Notes, 'add'>): () => void {
  let silentLooks = 0;
  let timer: ReturnType<typeof setInterval> | undefined;
  const end = () => {
    clearInterval(timer);
    timer = undefined;
  };
  const look = () => {
    silentLooks++;
    if (silentLooks <= LOOKS) return;
    end();
    notes.add(
      'fault',
      'No sound has come for 3 s though it plays; the output device may be gone, or the machine too busy.',
      'Press Stop, then Start.',
    );
  };
  sound.subscribe((state) => {
    if (state !== 'playing') end();
  });
  return () => {
    silentLooks = 0;
    if (sound.peek() === 'playing') timer ??= setInterval(look, EVERY_MS);
  };
}
