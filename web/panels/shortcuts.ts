import type { Bench } from '../state/bench.ts';

/** What shortcuts act on. */
interface Acts {
  readonly bench: Bench;
  open(): void;
  tapRate(atMs: number): string | null;
}

interface Shortcut {
  /** As printed. */
  readonly keys: string;
  readonly words: string;
  readonly matches: (event: KeyboardEvent) => boolean;
  readonly run: (acts: Acts, event: KeyboardEvent) => void;
}

const control = (event: KeyboardEvent) => (event.ctrlKey || event.metaKey) && !event.altKey;
const alt = (event: KeyboardEvent) => event.altKey && !event.ctrlKey && !event.metaKey;

/** No bare letters: someone who speaks to the computer must not set them off. */
export const SHORTCUTS: readonly Shortcut[] = [
  {
    keys: 'Alt P',
    words: 'start or stop the sound',
    matches: (event) => alt(event) && event.code === 'KeyP',
    run: ({ bench }) => (bench.sound.peek() === 'playing' ? bench.stop() : void bench.start()),
  },
  {
    keys: 'Alt M',
    words: 'mute',
    matches: (event) => alt(event) && event.code === 'KeyM',
    run: ({ bench }) => bench.setMuted(!bench.muted.peek()),
  },
  {
    keys: 'Alt B',
    words: 'the cell or bypass',
    matches: (event) => alt(event) && event.code === 'KeyB',
    run: ({ bench }) => bench.hear(bench.hearing.peek() === 'cell' ? 'bypass' : 'cell'),
  },
  {
    keys: 'Alt T',
    words: 'tap the rate of the LFO',
    matches: (event) => alt(event) && event.code === 'KeyT' && !event.repeat,
    run: ({ tapRate }, event) => void tapRate(event.timeStamp),
  },
  {
    keys: 'Alt 1 to 4',
    words: 'hear variant A to D',
    matches: (event) => alt(event) && /^Digit[1-4]$/.test(event.code),
    run: ({ bench }, event) => {
      const index = Number(event.code.slice(5)) - 1;
      if (index < bench.design.peek().variants.length) bench.hearVariant(index);
    },
  },
  {
    keys: 'Ctrl Z',
    words: 'undo',
    matches: (event) => control(event) && !event.shiftKey && event.code === 'KeyZ',
    run: ({ bench }) => bench.undo(),
  },
  {
    keys: 'Ctrl Shift Z',
    words: 'redo',
    matches: (event) => control(event) && ((event.shiftKey && event.code === 'KeyZ') || event.code === 'KeyY'),
    run: ({ bench }) => bench.redo(),
  },
  { keys: 'Ctrl O', words: 'open a design', matches: (event) => control(event) && event.code === 'KeyO', run: ({ open }) => open() },
  {
    keys: 'Ctrl S',
    words: 'save the design',
    matches: (event) => control(event) && event.code === 'KeyS',
    run: ({ bench }) => bench.saveDesign(),
  },
];

/** Runs the shortcut that an event stands for; true when there was one. */
export function runShortcut(event: KeyboardEvent, acts: Acts): boolean {
  const shortcut = SHORTCUTS.find(({ matches }) => matches(event));
  shortcut?.run(acts, event);
  return shortcut !== undefined;
}
