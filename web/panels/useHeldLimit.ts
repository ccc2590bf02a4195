import { useRef } from 'preact/hooks';
import type { Passed } from '../draw/limits.ts';

const HOLD_MS = 1500;

/** The worst of the last second and a half, so that a limit passed in each turn of an LFO is a sentence and not a flicker. */
export function useHeldLimit(passed: Passed | null, nowMs: number): Passed | null {
  const held = useRef<{ readonly passed: Passed; readonly atMs: number } | null>(null);
  const old = held.current !== null && nowMs - held.current.atMs > HOLD_MS;
  if (passed !== null && (held.current === null || old || passed.size >= held.current.passed.size)) held.current = { passed, atMs: nowMs };
  else if (old) held.current = null;
  return held.current?.passed ?? null;
}
