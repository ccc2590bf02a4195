/** Where the slip of a value being edited goes, so that it hides no other value and, where it can, crosses no wire. */

export interface Box {
  readonly left: number;
  readonly top: number;
  readonly width: number;
  readonly height: number;
}

export interface Obstacles {
  /** Values, readings and labels: never hidden if there is any other place. */
  readonly values: readonly Box[];
  /** Wires, symbols, rules: crossed only when nothing nearer is free. */
  readonly lines: readonly Box[];
}

/** Room between the slip and its value, and the search's grid and reach. All in pixels. */
const GAP = 2;
const GRID = 6;
const REACH_ACROSS = 300;
const REACH_DOWN = 160;

/** What each fault of a place costs, in pixels of distance that would be walked to avoid it. */
const HIDES = 1000;
const OUTSIDE = 3000;
const CROSSES = 14;

/**
 * Searches the places round the anchor for the cheapest one, nearest first below it. All boxes in pixels of one coordinate system; the answer is
 * the slip's top left corner.
 */
export function placeSlip(
  anchor: Box,
  slip: { readonly width: number; readonly height: number },
  obstacles: Obstacles,
  bounds: Box,
): { left: number; top: number } {
  const { width, height } = slip;
  const below = anchor.top + anchor.height + GAP;
  const above = anchor.top - height - GAP;
  const near = (box: Box) => box.left < anchor.left + REACH_ACROSS + width && box.left + box.width > anchor.left - REACH_ACROSS - width;
  const values = [...obstacles.values.filter(near), anchor];
  const lines = obstacles.lines.filter(near);
  let best = { left: anchor.left, top: below };
  let bestCost = Number.POSITIVE_INFINITY;
  for (let across = -REACH_ACROSS; across <= REACH_ACROSS; across += GRID) {
    for (let down = 0; down <= REACH_DOWN; down += GRID) {
      for (const top of [below + down, above - down]) {
        const box = { left: anchor.left + across, top, width, height };
        const walked = down + 0.5 * gapAcross(box, anchor) + 0.02 * Math.abs(across) + (top < anchor.top ? 1 : 0);
        if (walked >= bestCost) continue;
        const cost = walked + faults(box, values, lines, bounds);
        if (cost < bestCost) [best, bestCost] = [{ left: box.left, top }, cost];
      }
    }
  }
  return best;
}

function gapAcross(a: Box, b: Box): number {
  return Math.max(0, a.left - (b.left + b.width), b.left - (a.left + a.width));
}

function faults(box: Box, values: readonly Box[], lines: readonly Box[], bounds: Box): number {
  const inside =
    box.left >= bounds.left &&
    box.top >= bounds.top &&
    box.left + box.width <= bounds.left + bounds.width &&
    box.top + box.height <= bounds.top + bounds.height;
  return count(box, values) * HIDES + count(box, lines) * CROSSES + (inside ? 0 : OUTSIDE);
}

function count(box: Box, others: readonly Box[]): number {
  let overlapping = 0;
  for (const other of others) if (overlap(box, other)) overlapping++;
  return overlapping;
}

export function overlap(a: Box, b: Box): boolean {
  return a.left < b.left + b.width && b.left < a.left + a.width && a.top < b.top + b.height && b.top < a.top + a.height;
}
