import { decimals } from '../draw/words.ts';
import { linearScale, toPixel } from '../draw/scale.ts';
import { useBenchView, usePlaying } from './BenchContext.ts';
import { Caution } from './parts/Note.tsx';

const WIDTH = 304;
const SCALE = linearScale(-60, 0, 28, 270);
const TICKS = [-60, -48, -36, -24, -12, 0];

/** What leaves for the loudspeakers against its ceiling: bar = level, thin tick = peak, heavy bracket = ceiling. */
export function Ruler() {
  const { bench, slowLive } = useBenchView();
  const live = usePlaying() ? slowLive.value : null;
  const peak = live?.heardPeakDbfs ?? Number.NEGATIVE_INFINITY;
  const level = live?.heardRmsDbfs ?? Number.NEGATIVE_INFINITY;
  const ceiling = toPixel(SCALE, bench.ceilingDbfs.value);
  const spoken = Number.isFinite(peak) ? `peak ${decimals(peak, 1)} dBFS, level ${decimals(level, 1)} dBFS` : 'silent';
  return (
    <div class="ruler">
      <svg viewBox={`0 0 ${WIDTH} 32`} role="img" aria-label={`Out: ${spoken}; ceiling ${decimals(bench.ceilingDbfs.value, 1)} dBFS`}>
        <text x={0} y={12} class="note-text">
          out
        </text>
        {level > SCALE.from && <rect class="now-fill" x={SCALE.start} y={7} width={toPixel(SCALE, level) - SCALE.start} height={4} />}
        {peak > SCALE.from && <path class="now-line" d={`M${toPixel(SCALE, Math.min(peak, 0))} 4v8`} />}
        <path class="axis" d={`M${SCALE.start} 12H${SCALE.end}${TICKS.map((db) => `M${toPixel(SCALE, db)} 12v4`).join('')}`} />
        <path class={live?.atCeiling ? 'bracket limit-line' : 'bracket'} d={`M${ceiling + 4} 1.5H${ceiling}V15`} />
        {TICKS.map((db) => (
          <text key={db} x={toPixel(SCALE, db)} y={27} text-anchor={db === 0 ? 'start' : 'middle'} dx={db === 0 ? -8 : 0} class="axis-text">
            {db === 0 ? '0\u2009dBFS' : decimals(db, 0)}
          </text>
        ))}
      </svg>
      <p class={live ? 'caution' : 'caution before'}>
        <Caution /> {live?.atCeiling ? 'The ceiling is turning the sound down.' : 'Start low. Loudness at your ears: unknown.'}
      </p>
    </div>
  );
}
