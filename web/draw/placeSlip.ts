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
  /** Wires, symbols, rules: crossed only when nothing better is left. */
  readonly lines: readonly Box[];
}

const GAP = 2;

/**
 * Tries below, above, right and left of the anchor, slid along it, and further off; takes the first of the cheapest. All boxes in pixels of
 * one coordinate system; the answer is the slip's top left corner, kept inside `bounds` sideways.
 */
export function placeSlip(
  anchor: Box,
  slip: { readonly width: number; readonly height: number },
  obstacles: Obstacles,
  bounds: Box,
): { left: number; top: number } {
  let best = { left: anchor.left, top: anchor.top + anchor.height };
  let bestCost = Number.POSITIVE_INFINITY;
  for (const [left, top, distance] of candidates(anchor, slip)) {
    const box = {
      left: Math.max(bounds.left, Math.min(left, bounds.left + bounds.width - slip.width)),
      top,
      width: slip.width,
      height: slip.height,
    };
    const cost = costOf(box, anchor, obstacles, bounds) + distance;
    if (cost < bestCost) {
      bestCost = cost;
      best = { left: box.left, top: box.top };
    }
  }
  return best;
}

function candidates(anchor: Box, slip: { width: number; height: number }): [left: number, top: number, distance: number][] {
  const right = anchor.left + anchor.width;
  const middle = anchor.left + anchor.width / 2 - slip.width / 2;
  const across = [anchor.left, middle, right - slip.width, anchor.left - slip.width * 0.25, anchor.left - slip.width * 0.75];
  const found: [number, number, number][] = [];
  for (const away of [0, 1, 2, 3, 4]) {
    const shift = away * slip.height * 0.5;
    across.forEach((left, order) => {
      found.push([left, anchor.top + anchor.height + GAP + shift, away + order / 100]);
      found.push([left, anchor.top - slip.height - GAP - shift, away + 0.05 + order / 100]);
    });
  }
  const level = anchor.top + anchor.height / 2 - slip.height / 2;
  found.push([right + 3 * GAP, level, 0.5], [anchor.left - slip.width - 3 * GAP, level, 0.5]);
  return found;
}

function costOf(box: Box, anchor: Box, obstacles: Obstacles, bounds: Box): number {
  const hidden = obstacles.values.filter((other) => overlap(box, other)).length;
  const crossed = obstacles.lines.filter((other) => overlap(box, other)).length;
  const outside = box.top < bounds.top || box.top + box.height > bounds.top + bounds.height ? 1 : 0;
  return 10000 * (overlap(box, anchor) ? 1 : 0) + 1000 * hidden + 500 * outside + 10 * crossed;
}

export function overlap(a: Box, b: Box): boolean {
  return a.left < b.left + b.width && b.left < a.left + a.width && a.top < b.top + b.height && b.top < a.top + a.height;
}
