import { feedbackFraction, type Moves } from '../../model/design/feedback.ts';
import { formatQuantity, parseQuantity } from '../../model/design/values.ts';
import type { Keep } from '../state/bench.ts';
import { useBench, useVariant } from './BenchContext.ts';
import { CircuitValue } from './CircuitValue.tsx';
import { FeedbackChoice } from './FeedbackChoice.tsx';
import { Choice, chosen } from './parts/Choice.tsx';
import { EditableValue } from './parts/EditableValue.tsx';
import { Sym } from './parts/Symbol.tsx';

const KEEPS: readonly { value: Keep; words: string }[] = [
  { value: 'gate', words: 'gate bias and swing' },
  { value: 'control', words: 'the control voltage' },
];

const MOVES: readonly { value: Moves; words: string }[] = [
  { value: 'drainOhm', words: 'R2' },
  { value: 'controlOhm', words: 'R3' },
  { value: 'bothKeepSum', words: 'both, sum kept' },
  { value: 'bothKeepParallel', words: 'both, parallel kept' },
];

/** Eq. (1): the feedback fraction and what makes it, each changed where it stands. */
export function Equation() {
  const bench = useBench();
  const { cell } = useVariant();
  const kind = cell.feedback.kind;
  return (
    <section class="equation" aria-label="Equation 1, the feedback fraction k">
      <div class="display">
        <i>k</i>
        <span>=</span>
        {kind === 'resistor' && <Fraction />}
        {kind === 'none' ? <span class="k-value">0</span> : <KValue k={feedbackFraction(cell)} />}
        <span class="equation-number">(1)</span>
      </div>
      <p class="aside">
        {kind === 'none' ? (
          <>
            Nothing of the drain reaches the gate. Feedback: <FeedbackChoice />.
          </>
        ) : (
          <>
            Setting <i>k</i> moves{' '}
            {kind === 'resistor' ? (
              <Choice label="What setting k moves" value={bench.moves.value} options={MOVES} onChoose={chosen(bench.setMoves)} />
            ) : (
              'the buffer’s share'
            )}{' '}
            and keeps <Choice label="What setting k keeps" value={bench.keep.value} options={KEEPS} onChoose={chosen(bench.setKeep)} />.
          </>
        )}
      </p>
    </section>
  );
}

function KValue({ k }: { readonly k: number }) {
  const bench = useBench();
  return (
    <span class="k-value">
      <EditableValue
        label="k, the fraction of the drain’s voltage at the gate"
        short="k"
        value={k}
        stepping={{ kind: 'linear', step: 0.001 }}
        format={(value) => value.toFixed(3)}
        read={(text) => parseQuantity(text, '')}
        min={0}
        max={1}
        onSet={(value) => bench.setFeedbackFraction(value as number)}
      />
    </span>
  );
}

/** R3 over the sum, in symbols (where there is room) and in values. */
function Fraction() {
  return (
    <>
      <span class="fraction symbolic" aria-hidden="true">
        <span>
          <Sym of="R" sub="3" />
        </span>
        <span>
          <Sym of="R" sub="2" /> + <Sym of="R" sub="3" />
        </span>
      </span>
      <span class="symbolic">=</span>
      <span class="fraction">
        <span>
          <CircuitValue path="cell.controlOhm" label="R3, control to gate" short="R3" />
        </span>
        <span>
          <CircuitValue path="cell.feedback.drainOhm" label="R2, drain to gate" short="R2" /> + <SameAgain />
        </span>
      </span>
      <span>=</span>
    </>
  );
}

/** R3 once more, printed only: it is changed above the line. */
function SameAgain() {
  const { cell } = useVariant();
  return <span>{formatQuantity(cell.controlOhm, 'Ω')}</span>;
}
