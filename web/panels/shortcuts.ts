import type { Bench } from '../state/bench.ts';

interface Shortcut {
  /** As printed. */
  readonly keys: string;
  readonly words: string;
  readonly matches: (event: KeyboardEvent) => boolean;
  readonly run: (bench: Bench, open: () => void, event: KeyboardEvent) => void;
}

const control = (event: KeyboardEvent) => (event.ctrlKey || event.metaKey) && !event.altKey;
const alt = (event: KeyboardEvent) => event.altKey && !event.ctrlKey && !event.metaKey;

/** No bare letters: someone who speaks to the computer must not set them off. */
export const SHORTCUTS: readonly Shortcut[] = [
  {
    keys: 'Alt P',
    words: 'start or stop the sound',
    matches: (event) => alt(event) && event.code === 'KeyP',
    run: (bench) => (bench.sound.peek() === 'playing' ? bench.stop() : void bench.start()),
  },
  {
    keys: 'Alt M',
    words: 'mute',
    matches: (event) => alt(event) && event.code === 'KeyM',
    run: (bench) => bench.setMuted(!bench.muted.peek()),
  },
  {
    keys: 'Alt B',
    words: 'the cell or bypass',
    matches: (event) => alt(event) && event.code === 'KeyB',
    run: (bench) => bench.hear(bench.hearing.peek() === 'cell' ? 'bypass' : 'cell'),
  },
  {
    keys: 'Alt 1 to 4',
    words: 'hear variant A to D',
    matches: (event) => alt(event) && /^Digit[1-4]$/.test(event.code),
    run: (bench, _open, event) => {
      const index = Number(event.code.slice(5)) - 1;
      if (index < bench.design.peek().variants.length) bench.hearVariant(index);
    },
  },
  {
    keys: 'Ctrl Z',
    words: 'undo',
    matches: (event) => control(event) && !event.shiftKey && event.code === 'KeyZ',
    run: (bench) => bench.undo(),
  },
  {
    keys: 'Ctrl Shift Z',
    words: 'redo',
    matches: (event) => control(event) && ((event.shiftKey && event.code === 'KeyZ') || event.code === 'KeyY'),
    run: (bench) => bench.redo(),
  },
  { keys: 'Ctrl O', words: 'open a design', matches: (event) => control(event) && event.code === 'KeyO', run: (_bench, open) => open() },
  {
    keys: 'Ctrl S',
    words: 'save the design',
    matches: (event) => control(event) && event.code === 'KeyS',
    run: (bench) => bench.saveDesign(),
  },
];

/** Runs the shortcut that an event stands for; true when there was one. */
export function runShortcut(event: KeyboardEvent, bench: Bench, open: () => void): boolean {
  const shortcut = SHORTCUTS.find(({ matches }) => matches(event));
  shortcut?.run(bench, open, event);
  return shortcut !== undefined;
}
