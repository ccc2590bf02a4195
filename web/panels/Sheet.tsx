import { computed, useSignal } from '@preact/signals';
import { useEffect, useMemo } from 'preact/hooks';
import type { Bench } from '../state/bench.ts';
import { BenchContext } from './BenchContext.ts';
import { Blocks } from './Blocks.tsx';
import { Conditions } from './Conditions.tsx';
import { Foot } from './Foot.tsx';
import { Heading } from './Heading.tsx';
import { Heard } from './Heard.tsx';
import { KeysDialog } from './KeysDialog.tsx';
import { Notes } from './Notes.tsx';
import { OpenDialog } from './OpenDialog.tsx';
import { sampled } from './parts/sampled.ts';
import { Ruler } from './Ruler.tsx';
import { SoundButtons } from './SoundButtons.tsx';
import { SourceScale } from './SourceScale.tsx';
import { runShortcut } from './shortcuts.ts';
import { createRateTap } from './tap.ts';
import { useFileDrop } from './useFileDrop.ts';
import { useLayout } from './useLayout.ts';

const CALM_EVERY_MS = 250;

/** The page «Listen»: one design, heard and measured. */
export function Sheet({ bench }: { readonly bench: Bench }) {
  const layout = useLayout();
  const dialog = useSignal<'open' | 'keys' | null>(null);
  const dropping = useFileDrop(bench);
  const slow = useMemo(() => sampled(bench.moment, matchMedia('(prefers-reduced-motion: reduce)').matches ? CALM_EVERY_MS : 0), [bench]);
  useEffect(() => slow.end, [slow]);
  const view = useMemo(
    () => ({
      bench,
      moment: slow.copy,
      slowLive: computed(() => slow.copy.value?.levels ?? null),
      tapRate: createRateTap(bench),
    }),
    [bench, slow],
  );
  useEffect(() => {
    const onKeyDown = (event: KeyboardEvent) => {
      if (runShortcut(event, { bench, open: () => (dialog.value = 'open'), tapRate: view.tapRate })) event.preventDefault();
    };
    window.addEventListener('keydown', onKeyDown);
    return () => window.removeEventListener('keydown', onKeyDown);
  }, [bench, dialog, view]);

  const close = () => {
    dialog.value = null;
  };
  return (
    <BenchContext.Provider value={view}>
      <div class={`sheet ${layout} ${bench.sound.value === 'playing' ? 'is-live' : ''} ${dropping ? 'dropping' : ''}`}>
        <Heading onOpen={() => (dialog.value = 'open')} onKeys={() => (dialog.value = 'keys')} />
        <main>
          <section class="sound" aria-label="Sound">
            <SoundButtons />
            <div class="sentences">
              <Conditions />
              <Heard />
            </div>
            <Ruler />
            <SourceScale />
          </section>
          <Notes />
          <Blocks layout={layout} />
        </main>
        <Foot />
        {dialog.value === 'open' && <OpenDialog onClose={close} />}
        {dialog.value === 'keys' && <KeysDialog onClose={close} />}
        {dropping && <p class="drop-word">Drop a recording to hear it through the cell, or a design to open it.</p>}
      </div>
    </BenchContext.Provider>
  );
}
