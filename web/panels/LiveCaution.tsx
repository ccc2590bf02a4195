import { useBench } from './BenchContext.ts';
import { Note } from './parts/Note.tsx';

/** Asked before live input is opened. */
export function LiveCaution({ onDone }: { readonly onDone: () => void }) {
  const bench = useBench();
  return (
    <Note
      kind="caution"
      sentence="A loudspeaker near the microphone howls; use headphones, and start low."
      advice="Live input begins muted: press Muted to hear it. The browser may ask whether this page may listen."
    >
      <button
        type="button"
        class="button small"
        onClick={() => {
          onDone();
          void bench.openInput();
        }}
      >
        Open the input
      </button>
      <button type="button" class="button small" onClick={onDone}>
        Leave it
      </button>
    </Note>
  );
}
