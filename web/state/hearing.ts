/** The choice of what is heard: the heard variant, what its cell adds, the same before its last change, the bypass, or for a while a take. */
import type { ReadonlySignal } from '@preact/signals';
import { computed, signal } from '@preact/signals';
import type { Heard, ToCell } from '../../worklet/protocol.ts';
import type { Bench, Hearing } from './bench.ts';
import type { DocumentState } from './document.ts';
import type { Before } from './previous.ts';

export interface HearingState extends Pick<Bench, 'hearing' | 'hear' | 'previous'> {
  /** In words: «A», «A before», «bypass», «Take 2». */
  readonly words: ReadonlySignal<string>;
  /** What the processor is to let through now. */
  heard(): Heard;
  /** A take is played in place of everything else; null ends that. */
  setAside(title: string | null): void;
  /** The setting before the last change, once it was asked for: from then on it runs beside the others, so that it is there at once. */
  wantedPrevious(): Before | null;
}

/** `changed` is called before the processor is told of another choice: it may have to hold other chains, or compute a residual. */
export function createHearing(
  document: Pick<DocumentState, 'variant'>,
  before: ReadonlySignal<Before | null>,
  send: (message: ToCell) => void,
  changed: () => void,
): HearingState {
  const hearing = signal<Hearing>('cell');
  const aside = signal<string | null>(null);
  let previousAsked = false;

  const heard = (): Heard => (aside.peek() === null ? hearing.peek() : 'aside');
  const hear = (which: Hearing) => {
    if (which === 'previous' && before.peek() === null) {
      return `Variant ${document.variant.peek().name} has not been changed yet; there is nothing before it to hear.`;
    }
    hearing.value = which;
    if (which === 'previous') previousAsked = true;
    changed();
    if (aside.peek() === null) send({ type: 'hear', heard: which });
    return null;
  };
  // Another variant is heard, or variants came and went: there is nothing before it.
  before.subscribe((value) => {
    if (value === null && hearing.peek() === 'previous') hear('cell');
  });

  return {
    hearing,
    hear,
    heard,
    previous: computed(() => (before.value === null ? null : before.value.design.variants[before.value.index])),
    words: computed(() => {
      if (aside.value !== null) return aside.value;
      if (hearing.value === 'bypass') return 'bypass';
      const { name } = document.variant.value;
      if (hearing.value === 'residual') return `residual of ${name}`;
      return hearing.value === 'cell' ? name : `${name} before`;
    }),
    setAside(title) {
      aside.value = title;
      send({ type: 'hear', heard: heard() });
    },
    wantedPrevious: () => (previousAsked ? before.peek() : null),
  };
}
