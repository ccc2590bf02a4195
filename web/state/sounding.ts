/** What of a design decides how a variant sounds, and which of the processor's slots each variant has. */
import type { Design } from '../../model/design/types.ts';

/** Equal for two that sound the same. */
export function soundingText(design: Design, index: number): string {
  const { variants, fullScaleV, tempC, oversampling, noise } = design;
  const { name: _, ...values } = variants[index];
  return JSON.stringify([values, fullScaleV, tempC, oversampling, noise]);
}

/**
 * A slot for each of `texts`: one that sounds as before keeps its slot wherever it stands now, one that was edited keeps that of its place, a new
 * one gets a free one. `slots` and `before` are those of the design before.
 */
export function assignSlots(slots: readonly number[], before: readonly string[], texts: readonly string[]): number[] {
  const next = texts.map(() => -1);
  const taken = new Set<number>();
  const give = (index: number, slot: number | undefined) => {
    if (next[index] >= 0 || slot === undefined || taken.has(slot)) return;
    next[index] = slot;
    taken.add(slot);
  };
  for (const [i, text] of texts.entries()) if (before[i] === text) give(i, slots[i]);
  for (const [i, text] of texts.entries()) {
    give(
      i,
      slots.find((slot, j) => before[j] === text && !taken.has(slot)),
    );
  }
  for (const i of texts.keys()) give(i, slots[i]);
  for (const i of texts.keys()) {
    give(
      i,
      texts.map((_, slot) => slot).find((slot) => !taken.has(slot)),
    );
  }
  return next;
}
