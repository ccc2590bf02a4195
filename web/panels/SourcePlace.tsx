import { useRef } from 'preact/hooks';
import type { Scale } from '../draw/scale.ts';
import { clockText } from '../draw/words.ts';
import type { Region } from '../state/bench.ts';
import { useBench } from './BenchContext.ts';
import { usePlace } from './usePlace.ts';

const STEP_SEC = 0.5;
const PAGE_SEC = 5;

interface SourcePlaceProps {
  readonly time: Scale;
  readonly title: string;
  /** Takes the sentence that refuses what was asked for, or null. */
  readonly say: (refused: string | null) => void;
}

/** Where it plays: a slider over what loops. Its line moves outside rendering. */
export function SourcePlace({ time, title, say }: SourcePlaceProps) {
  const bench = useBench();
  const slider = useRef<HTMLDivElement>(null);
  usePlace(bench, slider, time);
  const region = bench.region.value;
  const [least, most] = [region?.fromSec ?? 0, region?.toSec ?? bench.source.value.seconds];
  const onKeyDown = (event: KeyboardEvent) => {
    const now = bench.positionSec();
    const seeks: Record<string, number> = {
      ArrowRight: now + STEP_SEC,
      ArrowUp: now + STEP_SEC,
      ArrowLeft: now - STEP_SEC,
      ArrowDown: now - STEP_SEC,
      PageUp: now + PAGE_SEC,
      PageDown: now - PAGE_SEC,
      Home: least,
      End: most,
    };
    const regions: Record<string, Region | null> = {
      '[': { fromSec: now, toSec: most },
      ']': { fromSec: least, toSec: now },
      Escape: null,
    };
    if (event.ctrlKey || event.altKey || event.metaKey) return;
    if (event.key in seeks) say(bench.seek(Math.max(least, Math.min(most, seeks[event.key]))));
    else if (event.key in regions) say(bench.setRegion(regions[event.key]));
    else return;
    event.preventDefault();
  };
  return (
    <div
      ref={slider}
      class="source-place"
      role="slider"
      tabIndex={0}
      aria-label={`Place in “${title}”, minutes and seconds`}
      aria-valuemin={least}
      aria-valuemax={most}
      aria-valuenow={least}
      aria-valuetext={clockText(least, true)}
      onKeyDown={onKeyDown}
      onBlur={() => say(null)}
    />
  );
}
