import { useSignal } from '@preact/signals';
import { useRef } from 'preact/hooks';
import { clockText } from '../draw/words.ts';
import type { TakeFormat, TakesLast } from '../state/bench.ts';
import { useBench } from './BenchContext.ts';
import { Choice, chosen } from './parts/Choice.tsx';
import { DataTable } from './parts/DataTable.tsx';
import { WordActions } from './parts/WordActions.tsx';
import { TakeRow } from './TakeRow.tsx';

const COLUMNS = [
  { key: 'no', head: 'No.' },
  { key: 'what', head: 'Name' },
  { key: 'variant', head: 'Variant' },
  { key: 'number k', head: <i>k</i> },
  { key: 'number length', head: 'Length' },
  { key: 'actions', head: <span class="offscreen">What can be done</span> },
];

const FORMATS: readonly { value: TakeFormat; words: string }[] = [
  { value: 'pcm16', words: '16-bit WAV' },
  { value: 'pcm16 dithered', words: '16-bit WAV, dithered' },
  { value: 'pcm24', words: '24-bit WAV' },
  { value: 'pcm24 dithered', words: '24-bit WAV, dithered' },
  { value: 'float32', words: '32-bit float WAV' },
];

const KEPT: Readonly<Record<TakesLast, string>> = {
  page: 'Takes, kept until this page closes.',
  browser: 'Takes, kept in this browser, which may remove them when it is short of room.',
  lasting: 'Takes, kept in this browser until they are deleted.',
};

/** Table 2: what was recorded or rendered, newest first. */
export function Takes() {
  const bench = useBench();
  const format = useSignal<TakeFormat>('pcm24');
  const takes = [...bench.takes.value].reverse();
  const { kind } = bench.source.value;
  const busy = bench.taking.value !== null || bench.rendering.value !== null;
  return (
    <section class="takes" aria-label="Takes">
      <DataTable
        number={2}
        className="take-table"
        caption={takes.length === 0 && !busy ? 'Takes: none yet.' : KEPT[bench.takesLast.value]}
        columns={COLUMNS}
      >
        <tbody>
          <UnderWay />
          {takes.map((take) => (
            <TakeRow key={take.id} take={take} format={format.value} />
          ))}
          {takes.length === 0 && !busy && (
            <tr>
              <td colSpan={6} class="aside">
                A take keeps what is heard; a render runs the whole source through the cell.
              </td>
            </tr>
          )}
        </tbody>
      </DataTable>
      <p class="buttons">
        <button
          type="button"
          class="button small"
          disabled={bench.taking.value !== null || bench.sound.value !== 'playing'}
          onClick={bench.startTake}
        >
          Take what is heard
        </button>
        {kind === 'live' ? (
          <span class="aside">Live input has no end, so it is not rendered whole.</span>
        ) : (
          <button type="button" class="button small" disabled={bench.rendering.value !== null} onClick={() => void bench.renderClip()}>
            Render the {kind}
          </button>
        )}
        <span class="aside">
          as{' '}
          <Choice label="Format of saved takes" value={format.value} options={FORMATS} onChoose={chosen((next) => (format.value = next))} />
        </span>
      </p>
    </section>
  );
}

/** A take being recorded, a source being rendered. */
function UnderWay() {
  const bench = useBench();
  const taking = bench.taking.value;
  const rendering = bench.rendering.value;
  return (
    <>
      {taking && (
        <tr>
          <td class="no" />
          <td class="what" colSpan={3}>
            <span class="live">being taken…</span>
          </td>
          <td class="number length">
            <span class="live">{clockText(taking.seconds, true)}</span>
          </td>
          <td class="actions">
            <WordActions actions={[{ words: 'End the take', run: bench.endTake }]} />
          </td>
        </tr>
      )}
      {rendering && (
        <tr>
          <td class="no" />
          <td class="what" colSpan={4}>
            <span class="live">rendering</span> <Progress fraction={rendering.fraction} />
          </td>
          <td class="actions">
            <WordActions actions={[{ words: 'End it', run: bench.endRender }]} />
          </td>
        </tr>
      )}
    </>
  );
}

function Progress({ fraction }: { readonly fraction: number }) {
  const startMs = useRef(performance.now());
  const percent = Math.round(100 * fraction);
  const leftSec = ((performance.now() - startMs.current) / 1000) * (1 / Math.max(fraction, 0.01) - 1);
  return (
    <span class="progress">
      <svg
        viewBox="0 0 120 4"
        preserveAspectRatio="none"
        role="progressbar"
        aria-label="Rendering"
        aria-valuemin={0}
        aria-valuemax={100}
        aria-valuenow={percent}
      >
        <path class="track" d="M0 2H120" />
        <path class="done" d={`M0 2H${120 * fraction}`} />
      </svg>
      {`${percent}\u2009%`}
      {fraction > 0.05 && `, ${Math.ceil(leftSec)} s left`}
    </span>
  );
}
