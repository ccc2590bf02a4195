import { useBench } from './BenchContext.ts';
import { Note } from './parts/Note.tsx';

/** What a first visitor cannot guess, until it is put away. */
export function Hints() {
  const bench = useBench();
  if (!bench.hints.value) return null;
  return (
    <Note
      kind="hints"
      sentence="What is underlined is changed where it is printed: type, use the arrow keys, or drag."
      advice="The letters A to D are variants of one circuit; an empty letter takes a copy of the one that is heard. A figure is read out where you point, or with the arrow keys once it has the focus."
    >
      <button type="button" class="button small" onClick={bench.putHintsAway}>
        Put the hints away
      </button>
    </Note>
  );
}
