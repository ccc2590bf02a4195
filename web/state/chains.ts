/** Which chains the processor holds: one for each variant, and the setting before the last change while it is wanted. */
import { compileChain } from '../../model/chain/compile.ts';
import { withNoise } from '../../model/chain/residual.ts';
import type { CellOptions, ToCell } from '../../worklet/protocol.ts';
import { PREVIOUS_SLOT, SLOTS } from '../../worklet/protocol.ts';
import type { DocumentState } from './document.ts';
import type { Notes } from './notes.ts';
import { sentenceOf } from './notes.ts';
import type { Before } from './previous.ts';
import { assignSlots, soundingText } from './sounding.ts';

export interface Chains {
  /** For a processor that is made now. Throws a RangeError with a sentence where the heard variant cannot sound. */
  options(sampleRateHz: number, channels: number): Pick<CellOptions, 'chains' | 'focus'>;
  /** The processor of the last options is there now, and has heard of nothing since they were made. */
  renewed(): void;
  /** Tells the processor what has changed since. */
  update(sampleRateHz: number, channels: number): void;
  /** By variant: the slot that its chain is in. */
  slots(): readonly number[];
}

export interface ChainsNeeds {
  readonly document: Pick<DocumentState, 'design' | 'heardVariant'>;
  readonly notes: Notes;
  /** What the last slot shall hold. */
  previous(): Before | null;
  /** Whether the heard variant's parts must hiss, whatever the design says. */
  wantsNoise(): boolean;
  send(message: ToCell): void;
}

export function createChains({ document, notes, previous, wantsNoise, send }: ChainsNeeds): Chains {
  let slots: readonly number[] = [];
  let texts: readonly string[] = [];
  /** By slot, what the processor has; null for nothing. */
  let held: (string | null)[] = [];
  let focus = -1;
  let made: { readonly held: readonly (string | null)[]; readonly focus: number } = { held: [], focus };

  const wanted = () => {
    const design = document.design.peek();
    const next = design.variants.map((_, index) => soundingText(design, index));
    slots = assignSlots(slots, texts, next);
    texts = next;
    const all: (Before | null)[] = Array.from({ length: SLOTS }, () => null);
    for (const [index, slot] of slots.entries()) {
      const hisses = index === document.heardVariant.peek() && wantsNoise();
      all[slot] = { design: hisses ? withNoise(design) : design, index };
    }
    all[PREVIOUS_SLOT] = previous();
    return all;
  };

  const compile = (about: Before, hz: number, channels: number) => compileChain(about.design, about.index, hz, channels, 'lowLatency');
  const textOf = (about: Before | null) => (about === null ? null : soundingText(about.design, about.index));
  const heardSlot = () => slots[document.heardVariant.peek()];

  /** One that is not heard is left out, and that is said. */
  const orSaid = <T>(about: Before, make: () => T): T | null => {
    try {
      return make();
    } catch (error) {
      notes.fault(`Variant ${about.design.variants[about.index].name} cannot be heard: ${sentenceOf(error)}.`);
      return null;
    }
  };

  return {
    slots: () => slots,
    options(hz, channels) {
      const all = wanted();
      focus = heardSlot();
      const chains = all.map((about, slot) => {
        if (about === null) return null;
        const make = () => compile(about, hz, channels);
        return slot === focus ? make() : orSaid(about, make);
      });
      held = all.map((about, slot) => (chains[slot] === null ? null : textOf(about)));
      made = { held: [...held], focus };
      return { chains, focus };
    },
    renewed() {
      held = [...made.held];
      focus = made.focus;
    },
    update(hz, channels) {
      const all = wanted();
      for (const [slot, about] of all.entries()) {
        if (about === null || held[slot] === textOf(about)) continue;
        const numbers = orSaid(about, () => compile(about, hz, channels));
        if (numbers === null) continue;
        send({ type: 'move', slot, numbers });
        held[slot] = textOf(about);
      }
      if (heardSlot() !== focus && held[heardSlot()] !== null) {
        focus = heardSlot();
        send({ type: 'focus', slot: focus });
      }
      for (const [slot, about] of all.entries()) {
        if (about !== null || held[slot] === null || slot === focus) continue;
        send({ type: 'drop', slot });
        held[slot] = null;
      }
    },
  };
}
