/** Points to the `d` of an SVG path. */

export interface Point {
  readonly x: number;
  readonly y: number;
}

const round = (pixels: number): number => Math.round(pixels * 100) / 100;

/** A run of points joined by straight lines; a point that is not finite breaks the line. */
export function linePath(points: readonly Point[]): string {
  let path = '';
  let pen = 'M';
  for (const { x, y } of points) {
    if (!Number.isFinite(x) || !Number.isFinite(y)) {
      pen = 'M';
      continue;
    }
    path += `${pen}${round(x)} ${round(y)}`;
    pen = 'L';
  }
  return path;
}
