/** The design being edited: every change is checked, then kept for undo. */
import type { ReadonlySignal } from '@preact/signals';
import { batch, computed, signal } from '@preact/signals';
import { type Moves, withFeedbackFraction } from '../../model/design/feedback.ts';
import { setAt } from '../../model/design/path.ts';
import { checkDesign } from '../../model/design/read.ts';
import type { Design, Variant } from '../../model/design/types.ts';
import type { DesignPath, Keep } from './bench.ts';
import { sentenceOf } from './notes.ts';

const MOST_UNDO = 200;
/** Of them, how many are kept between visits: writing them with every change must stay a matter of a few milliseconds. */
const MOST_KEPT = 50;
const MOST_VARIANTS = 4;
const LETTERS = ['A', 'B', 'C', 'D'];
/** Changes of one path that follow each other sooner than this undo as one. */
const SAME_CHANGE_MS = 800;

export interface DocumentState {
  readonly design: ReadonlySignal<Design>;
  readonly heardVariant: ReadonlySignal<number>;
  readonly variant: ReadonlySignal<Variant>;
  readonly keep: ReadonlySignal<Keep>;
  readonly moves: ReadonlySignal<Moves>;
  readonly canUndo: ReadonlySignal<boolean>;
  readonly canRedo: ReadonlySignal<boolean>;
  hearVariant(index: number): void;
  addVariant(): string | null;
  setKeep(keep: Keep): void;
  setMoves(moves: Moves): void;
  setValue(path: string, value: unknown): string | null;
  setValues(changes: readonly (readonly [path: string, value: unknown])[]): string | null;
  setDesignValue(path: DesignPath, value: unknown): string | null;
  setFeedbackFraction(k: number): string | null;
  undo(): void;
  redo(): void;
  /** Takes the place of the whole document; can be undone. */
  replace(design: Design): string | null;
  /** What is kept of it between visits. */
  readonly record: ReadonlySignal<DocumentRecord>;
  /** Puts a kept document in place; what was changed before that stays, and the kept one becomes its past. */
  restore(record: DocumentRecord): string | null;
  /** Counts the documents that were put in place: what came before them is no earlier setting of theirs. */
  readonly restores: ReadonlySignal<number>;
}

/** The nearest steps of undo and redo, the nearest one last. */
export interface DocumentRecord {
  readonly design: Design;
  readonly heardVariant: number;
  readonly past: readonly Design[];
  readonly future: readonly Design[];
}

/** `tryOut` throws a RangeError with a sentence where a design cannot be made to sound; such a change is refused. */
export function createDocument(first: Design, tryOut: (design: Design, variantIndex: number) => void): DocumentState {
  const design = signal(first);
  const heard = signal(0);
  const keep = signal<Keep>('gate');
  const moves = signal<Moves>('drainOhm');
  const past = signal<readonly Design[]>([]);
  const future = signal<readonly Design[]>([]);
  const restores = signal(0);
  let lastKey = '';
  let lastMs = 0;

  const refusal = (next: Design, heardNext: number): string | null => {
    try {
      tryOut(next, heardNext);
    } catch (error) {
      return sentenceOf(error);
    }
    return null;
  };

  const put = (next: Design, key: string, heardNext = heard.value): string | null => {
    const refused = refusal(next, heardNext);
    if (refused !== null) return refused;
    const now = Date.now();
    const sameChange = key === lastKey && now - lastMs < SAME_CHANGE_MS;
    lastKey = key;
    lastMs = now;
    if (!sameChange) past.value = [...past.value.slice(1 - MOST_UNDO), design.value];
    future.value = [];
    batch(() => {
      design.value = next;
      heard.value = heardNext;
    });
    return null;
  };

  /** Checks what `make` gives and puts it in place; its RangeErrors are the sentence. */
  const change = (key: string, make: () => unknown, heardNext = heard.value): string | null => {
    let value: unknown;
    try {
      value = make();
    } catch (error) {
      return sentenceOf(error);
    }
    const result = checkDesign(value);
    return 'faults' in result ? result.faults[0].sentence : put(result.design, key, heardNext);
  };

  const withVariant = (make: (variant: Variant) => unknown): unknown => ({
    ...design.value,
    variants: design.value.variants.map((variant, i) => (i === heard.value ? make(variant) : variant)),
  });

  const setValues: DocumentState['setValues'] = (changes) => {
    const key = [heard.value, ...changes.map(([path]) => path)].join(' ');
    return change(key, () => withVariant((variant) => changes.reduce((so, [path, value]) => setAt(so, path, value), variant)));
  };

  const step = (from: typeof past, to: typeof past) => {
    const next = from.value.at(-1);
    if (next === undefined) return;
    from.value = from.value.slice(0, -1);
    to.value = [...to.value, design.value];
    lastKey = '';
    batch(() => {
      design.value = next;
      heard.value = Math.min(heard.value, next.variants.length - 1);
    });
  };

  return {
    design,
    heardVariant: heard,
    variant: computed(() => design.value.variants[heard.value]),
    keep,
    moves,
    canUndo: computed(() => past.value.length > 0),
    canRedo: computed(() => future.value.length > 0),
    hearVariant(index) {
      if (design.value.variants[index] === undefined)
        throw new RangeError(`There is no variant ${index}; expected 0 to ${design.value.variants.length - 1}`);
      heard.value = index;
    },
    addVariant() {
      const { variants } = design.value;
      if (variants.length >= MOST_VARIANTS) return 'A design holds at most four variants, and this one has four.';
      const name = LETTERS.find((letter) => !variants.some((variant) => variant.name === letter)) ?? LETTERS[variants.length];
      const copy = { ...variants[heard.value], name };
      return change('variants', () => ({ ...design.value, variants: [...variants, copy] }), variants.length);
    },
    setKeep(value) {
      keep.value = value;
    },
    setMoves(value) {
      moves.value = value;
    },
    setValue: (path, value) => setValues([[path, value]]),
    setValues,
    setDesignValue: (path, value) => change(path, () => setAt(design.value, path, value)),
    setFeedbackFraction: (k) =>
      change(`${heard.value} k`, () => withVariant((variant) => withFeedbackFraction(variant, k, keep.value, moves.value))),
    undo: () => step(past, future),
    redo: () => step(future, past),
    replace: (next) => put(next, '', 0),
    record: computed(() => ({
      design: design.value,
      heardVariant: heard.value,
      past: past.value.slice(-MOST_KEPT),
      future: future.value.slice(-MOST_KEPT),
    })),
    restores,
    restore(kept) {
      const refused = refusal(kept.design, kept.heardVariant);
      if (refused !== null) return refused;
      const untouched = design.value === first && past.value.length === 0 && future.value.length === 0;
      batch(() => {
        if (untouched) {
          restores.value++;
          design.value = kept.design;
          heard.value = kept.heardVariant;
          future.value = kept.future;
        }
        past.value = untouched ? kept.past : [...kept.past, kept.design, ...past.value];
      });
      return null;
    },
  };
}
