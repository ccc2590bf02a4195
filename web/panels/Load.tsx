import { decimals } from '../draw/words.ts';
import { useBenchView, usePlaying } from './BenchContext.ts';

/** What the sound costs this machine, while it plays. */
export function Load() {
  const { bench, slowLive } = useBenchView();
  const live = slowLive.value;
  if (!usePlaying() || live === null) return null;
  const latencySec = bench.latencySec.value;
  const outputSec = bench.outputLatencySec.value;
  const { underruns } = live;
  return (
    <p class="load">
      <b>This machine.</b> The variants take{' '}
      <span class="live">
        {decimals(100 * live.loadFraction, 0)}
        {'\u2009'}%
      </span>{' '}
      of the time that there is for sound
      {latencySec !== null && (
        <>
          , and delay it by {decimals(1000 * latencySec, 1)}
          {'\u2009'}ms
          {outputSec !== null && (
            <>
              ; browser and device add {decimals(1000 * outputSec, 0)}
              {'\u2009'}ms
            </>
          )}
        </>
      )}
      {underruns > 0 && <>; {underruns === 1 ? 'one gap' : `${underruns} gaps`} since the start</>}.
    </p>
  );
}
