import { useRef } from 'preact/hooks';

const HOLD_MS = 1500;

interface Leaving {
  readonly words: string;
  readonly share: number;
}

/** The worst of the last second and a half, so that a limit passed in each turn of an LFO is a sentence and not a flicker. */
export function useHeldLimit(leaving: Leaving | null, nowMs: number): Leaving | null {
  const held = useRef<{ readonly leaving: Leaving; readonly atMs: number } | null>(null);
  const old = held.current !== null && nowMs - held.current.atMs > HOLD_MS;
  if (leaving !== null && (held.current === null || old || leaving.share >= held.current.leaving.share))
    held.current = { leaving, atMs: nowMs };
  else if (old) held.current = null;
  return held.current?.leaving ?? null;
}
