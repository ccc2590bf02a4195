/** How far the work has come: one line on a terminal, nothing in a pipe or file. */

export interface Progress {
  show(fraction: number): void;
  clear(): void;
}

const ERASE = '\r\x1b[K';

export function createProgress(): Progress {
  const { stderr } = process;
  let shown = -1;
  return {
    show(fraction) {
      const percent = Math.floor(fraction * 100);
      if (!stderr.isTTY || percent === shown) return;
      shown = percent;
      stderr.write(`${ERASE}Rendering: ${percent} %`);
    },
    clear() {
      if (shown >= 0) stderr.write(ERASE);
    },
  };
}
