import { parseQuantity } from '../../model/design/values.ts';
import { decimals } from '../draw/words.ts';
import type { Hearing } from '../state/bench.ts';
import { useBench } from './BenchContext.ts';
import { Choice } from './parts/Choice.tsx';
import { EditableValue } from './parts/EditableValue.tsx';
import { Residual } from './Residual.tsx';

const WAYS: readonly { which: Hearing; words: string }[] = [
  { which: 'cell', words: 'the cell' },
  { which: 'bypass', words: 'bypass' },
  { which: 'residual', words: 'residual' },
];
const BEFORE = { which: 'previous', words: 'before the last change' } as const;
const OVERSAMPLING = [1, 2, 4, 8, 16].map((factor) => ({
  value: String(factor),
  words: factor === 1 ? 'not oversampled' : `oversampled ${factor}×`,
}));
const HALF_DB = { kind: 'linear', step: 0.5 } as const;

/** What reaches the loudspeakers, how loud, and its ceiling. */
export function Heard() {
  const bench = useBench();
  const hearing = bench.hearing.value;
  return (
    <p class="sentence">
      <i class="lead">Heard:</i> <State />{' '}
      <span class="ways">
        {(bench.previous.value === null ? WAYS : [...WAYS, BEFORE]).map(({ which, words }) => (
          <button key={which} type="button" class="way" aria-pressed={hearing === which} onClick={() => bench.hear(which)}>
            {words}
          </button>
        ))}
      </span>
      {hearing === 'residual' ? <Residual /> : <Matched />} at{' '}
      <EditableValue
        label="Listening level"
        short="Level"
        value={bench.listenDb.value}
        stepping={HALF_DB}
        format={(db) => `${decimals(db, 1)}\u2009dB`}
        read={(text) => parseQuantity(text, 'dB')}
        min={-60}
        max={0}
        onSet={(db) => bench.setListenDb(db as number)}
      />
      , ceiling{' '}
      <EditableValue
        label="Ceiling, full scale"
        short="Ceiling"
        value={bench.ceilingDbfs.value}
        stepping={HALF_DB}
        format={(db) => `${decimals(db, 1)}\u2009dBFS`}
        read={(text) => parseQuantity(text.replace(/dBFS\s*$/i, ''), 'dB')}
        min={-40}
        max={0}
        onSet={(db) => bench.setCeilingDbfs(db as number)}
      />
      ;{' '}
      <Choice
        label="Oversampling"
        value={String(bench.design.value.oversampling)}
        options={OVERSAMPLING}
        onChoose={(factor) => bench.setDesignValue('oversampling', Number(factor))}
      />
      .
    </p>
  );
}

/** Whether all of them are as loud as the source, and the gain that this takes. */
function Matched() {
  const bench = useBench();
  const on = bench.matched.value;
  const { variants, previous } = bench.matchDb.value;
  const db = { cell: variants[bench.heardVariant.value], previous, bypass: 0, residual: 0 }[bench.hearing.value];
  return (
    <>
      <span class="ways">
        <button type="button" class="way" aria-pressed={on} onClick={() => bench.setMatched(!on)}>
          as loud as the source
        </button>
      </span>
      {on &&
        (bench.source.value.kind === 'live'
          ? ' (not live input, which cannot be measured ahead)'
          : db === null
            ? ' (being measured)'
            : ` (${db < 0 ? '' : '+'}${decimals(db, 1)}\u2009dB)`)}
    </>
  );
}

function State() {
  const bench = useBench();
  const sound = bench.sound.value;
  if (sound === 'idle')
    return (
      <>
        <b>nothing yet</b>; then
      </>
    );
  if (sound === 'starting')
    return (
      <>
        <b>starting</b>,
      </>
    );
  if (sound !== 'playing')
    return (
      <>
        <b>nothing</b>; then
      </>
    );
  if (bench.playingTake.value !== null)
    return (
      <>
        <b>a take</b>; then
      </>
    );
  return bench.muted.value ? (
    <>
      <b>muted</b>; else
    </>
  ) : null;
}
