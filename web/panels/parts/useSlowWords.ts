import { useRef } from 'preact/hooks';

/** Numbers change ten times a second at most, so that they can be read. */
const EVERY_MS = 100;

/** Prints a number that glides into a text of a drawing, outside rendering. */
export function useSlowWords(print: (value: number) => string): (text: Element | null, value: number) => void {
  const saidMs = useRef(Number.NEGATIVE_INFINITY);
  return (text, value) => {
    const nowMs = performance.now();
    if (text === null || (text.textContent !== '' && nowMs - saidMs.current < EVERY_MS)) return;
    saidMs.current = nowMs;
    text.textContent = print(value);
  };
}
