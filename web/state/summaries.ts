/** The variants side by side: one is asked for at a time, and only when something that it depends on has changed. */
import { signal } from '@preact/signals';
import type { Variant } from '../../model/design/types.ts';
import type { VariantSummary } from './bench.ts';
import type { ToneQuestion } from './workers.ts';

interface About {
  readonly variant: Variant;
  /** Temperature of the circuit and the tone. */
  readonly conditions: string;
}

export function createSummaries(post: (index: number) => void) {
  const all = signal<readonly (VariantSummary | null)[]>([]);
  let wanted: readonly About[] = [];
  let known: readonly (About | undefined)[] = [];
  let asked: About | null = null;

  const askNext = () => {
    if (asked !== null) return;
    const index = wanted.findIndex((about, n) => !same(about, known[n]));
    if (index < 0) return;
    asked = wanted[index];
    post(index);
  };

  return {
    all,
    /** May stand in an effect: what it changes it does not listen to. */
    ask({ design, toneHz, toneV }: ToneQuestion) {
      const conditions = [design.tempC, toneHz, toneV].join(' ');
      wanted = design.variants.map((variant) => ({ variant, conditions }));
      known = known.slice(0, wanted.length);
      all.value = wanted.map((about, n) => (same(about, known[n]) ? (all.peek()[n] ?? null) : null));
      askNext();
    },
    note(index: number, summary: VariantSummary | null) {
      const about = asked;
      asked = null;
      if (about !== null && same(about, wanted[index])) {
        known = wanted.map((_, n) => (n === index ? about : known[n]));
        all.value = wanted.map((_, n) => (n === index ? summary : (all.peek()[n] ?? null)));
      }
      askNext();
    },
  };
}

function same(a: About, b: About | undefined): boolean {
  return b !== undefined && a.variant === b.variant && a.conditions === b.conditions;
}
