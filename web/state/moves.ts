/** Tells of changes of the design, all those of about a frame together. */
import type { DocumentState } from './document.ts';

const EVERY_MS = 16;

/** Calls `move` once the frame is over in which the design or the heard variant became another. */
export function watchMoves({ design, heardVariant }: DocumentState, move: () => void): void {
  let due = false;
  const later = () => {
    if (due) return;
    due = true;
    setTimeout(() => {
      due = false;
      move();
    }, EVERY_MS);
  };
  design.subscribe(later);
  heardVariant.subscribe(later);
}
