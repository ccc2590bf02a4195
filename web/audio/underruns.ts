/** Counts gaps in the sound: by the browser's own count where there is one, else by the wall clock against the audio clock. */

/** Of the Web Audio specification, not yet in the standard type library. */
interface PlaybackStats {
  readonly underrunEvents: number;
}

export interface UnderrunCounter {
  /** `lagMs`: how far the audio clock is behind the wall clock now, up to a constant. Called with each report. */
  note(lagMs: number): void;
  /** Gaps since the counter was made. */
  count(): number;
}

export function countUnderruns(context: AudioContext): UnderrunCounter {
  const { playbackStats } = context as AudioContext & { playbackStats?: PlaybackStats };
  if (playbackStats === undefined) return createLagCounter();
  const before = playbackStats.underrunEvents;
  return { note() {}, count: () => playbackStats.underrunEvents - before };
}

const WINDOW_REPORTS = 15;
const STEP_MS = 8;

/**
 * Frames that are missed never come back, so after a gap the audio clock stays behind for good: the smallest lag of each half second
 * steps up. 8 ms stand well above a clock's drift and jitter and below one block of any output buffer that drops out audibly.
 */
export function createLagCounter(): UnderrunCounter {
  let before: number | null = null;
  let least = Number.POSITIVE_INFINITY;
  let reports = 0;
  let gaps = 0;
  return {
    note(lagMs) {
      least = Math.min(least, lagMs);
      reports++;
      if (reports < WINDOW_REPORTS) return;
      if (before !== null && least - before > STEP_MS) gaps++;
      before = least;
      least = Number.POSITIVE_INFINITY;
      reports = 0;
    },
    count: () => gaps,
  };
}
