import { percentText } from '../draw/words.ts';
import { useBench, usePlaying, useReading } from './BenchContext.ts';
import { feedbackFraction } from '../../model/design/feedback.ts';
import { overLimit, useThdLimit } from './sheetLimits.ts';

/** Start or Stop, and Mute: a row on a wide sheet, a bar under the thumb on a phone, there with the readings that matter most. */
export function SoundButtons() {
  const bench = useBench();
  const sound = bench.sound.value;
  const running = sound === 'playing' || sound === 'starting';
  const muted = bench.muted.value;
  return (
    <div class="sound-bar">
      <BarReadings />
      <div class="sound-buttons">
        <button type="button" class="button solid" onClick={() => (running ? bench.stop() : void bench.start())}>
          <svg viewBox="0 0 12 12" aria-hidden="true">
            <path d={running ? 'M0 0H12V12H0Z' : 'M0 0 12 6 0 12Z'} fill="currentColor" />
          </svg>
          {startWords[sound]}
        </button>
        <button type="button" class={muted ? 'button solid' : 'button'} aria-pressed={muted} onClick={() => bench.setMuted(!muted)}>
          {muted ? 'Muted' : 'Mute'}
        </button>
      </div>
    </div>
  );
}

const startWords = { idle: 'Start', starting: 'Starting', playing: 'Stop', stopped: 'Start', failed: 'Start again' } as const;

/** k, THD and the worst over the swing; before starting, the caution in their place. */
function BarReadings() {
  const bench = useBench();
  const limit = useThdLimit();
  const reading = useReading();
  const worst = bench.worst.value;
  const variant = bench.design.value.variants[bench.heardVariant.value];
  if (!usePlaying()) return <p class="bar-readings">Start low. Loudness at your ears: unknown.</p>;
  return (
    <p class="bar-readings">
      <span>
        <i>k</i> <b>{feedbackFraction(variant.cell).toFixed(3)}</b>
      </span>
      {reading !== null && <span class="live">THD {percentText(reading.thdFundamental)} %</span>}
      {worst !== null && (
        <span>
          worst <span class={overLimit(worst.thdFundamental, limit.value) ? 'over' : 'live'}>{percentText(worst.thdFundamental)} %</span>
        </span>
      )}
    </p>
  );
}
