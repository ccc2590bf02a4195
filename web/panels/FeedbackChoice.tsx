import type { Feedback } from '../../model/design/types.ts';
import { useBench, useVariant } from './BenchContext.ts';
import { Choice } from './parts/Choice.tsx';

const KINDS: readonly { value: Feedback['kind']; words: string }[] = [
  { value: 'none', words: 'none' },
  { value: 'resistor', words: 'resistors' },
  { value: 'buffered', words: 'a buffer' },
];

/** How the drain's voltage reaches the gate. */
export function FeedbackChoice() {
  const bench = useBench();
  const { cell } = useVariant();
  return (
    <Choice
      label="Feedback from drain to gate"
      value={cell.feedback.kind}
      options={KINDS}
      onChoose={(kind) => bench.setValue('cell.feedback.kind', kind)}
    />
  );
}
