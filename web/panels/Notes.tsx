import { useBench } from './BenchContext.ts';
import { Hints } from './Hints.tsx';
import { Note } from './parts/Note.tsx';

/** What the user must be told, in place under the sound row. */
export function Notes() {
  const bench = useBench();
  const notes = bench.notes.value;
  const failed = bench.sound.value === 'failed';
  if (notes.length === 0 && !bench.hints.value) return null;
  return (
    <div class="notes">
      <Hints />
      {notes.map(({ id, kind, sentence, advice, list, offer }, index) => (
        <Note key={id} kind={kind} sentence={sentence} advice={advice} list={list}>
          {failed && kind === 'fault' && index === notes.length - 1 && (
            <button type="button" class="button small" onClick={() => void bench.start()}>
              Start again
            </button>
          )}
          {offer !== undefined && (
            <button
              type="button"
              class="button small"
              onClick={() => {
                offer.run();
                bench.dismiss(id);
              }}
            >
              {offer.words}
            </button>
          )}
          <button type="button" class="button small" onClick={() => bench.dismiss(id)}>
            Put away
          </button>
        </Note>
      ))}
    </div>
  );
}
