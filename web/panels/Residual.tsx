import { RESIDUAL_PARTS, type ResidualPart } from '../../model/chain/residual.ts';
import { parseQuantity } from '../../model/design/values.ts';
import { decimals } from '../draw/words.ts';
import { useBench, useBenchView } from './BenchContext.ts';
import { Choice } from './parts/Choice.tsx';
import { EditableValue } from './parts/EditableValue.tsx';

const PARTS = RESIDUAL_PARTS.map((part) => ({ value: part, words: part }));
const WHOLE_DB = { kind: 'linear', step: 1 } as const;

/** What the cell adds, heard alone: the part of it, its gain, and how far it lies under the programme. */
export function Residual() {
  const bench = useBench();
  return (
    <>
      {': '}
      <Choice
        label="Part of the residual"
        value={bench.residualPart.value}
        options={PARTS}
        onChoose={(part) => bench.setResidualPart(part as ResidualPart)}
      />{' '}
      <Level /> raised by{' '}
      <EditableValue
        label="Gain of the residual"
        short="Gain"
        value={bench.residualGainDb.value}
        stepping={WHOLE_DB}
        format={(db) => `${decimals(db, 0)}\u2009dB`}
        read={(text) => parseQuantity(text, 'dB')}
        min={0}
        max={80}
        onSet={(db) => bench.setResidualGainDb(db as number)}
      />
      ,
    </>
  );
}

function Level() {
  const db = useBenchView().slowLive.value?.residualDb ?? null;
  if (db === null) return null;
  return (
    <span class="live">
      {decimals(Math.abs(db), 1)}&#8201;dB {db <= 0 ? 'under' : 'over'} the programme,
    </span>
  );
}
