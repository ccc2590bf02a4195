import { useRef } from 'preact/hooks';
import { useBench } from './BenchContext.ts';
import { Dialog } from './Dialog.tsx';

/** A design from a file of its own or from inside a saved take, or a worked example. */
export function OpenDialog({ onClose }: { readonly onClose: () => void }) {
  const bench = useBench();
  const picker = useRef<HTMLInputElement>(null);
  return (
    <Dialog title="Open a design" onClose={onClose}>
      <p>
        <button type="button" class="button small" onClick={() => picker.current?.click()}>
          Choose a file
        </button>
        <input
          ref={picker}
          type="file"
          hidden
          accept=".json,application/json,.wav,audio/wav"
          onChange={(event) => {
            const file = event.currentTarget.files?.[0];
            if (!file) return;
            void bench.openDesign(file);
            onClose();
          }}
        />
      </p>
      {bench.examples.value.length > 0 && (
        <>
          <h3>Worked examples</h3>
          <ul class="examples">
            {bench.examples.value.map(({ name, title, scenario, listenFor }) => (
              <li key={name}>
                <button
                  type="button"
                  class="word"
                  onClick={() => {
                    void bench.openExample(name);
                    onClose();
                  }}
                >
                  {title}
                </button>
                <p class="aside">
                  {scenario} {listenFor && <i>{listenFor}</i>}
                </p>
              </li>
            ))}
          </ul>
        </>
      )}
    </Dialog>
  );
}
